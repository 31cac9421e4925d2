import type { FieldDeviations, PlannedChannel, Quantity, SampleType, Unit } from '../index.ts';

/** The values a channel can hold, or where it has no limits those it will most likely reach. */
export interface ChannelRange {
  readonly low: number;
  readonly high: number;
  /** Difference of neighbouring stored values, at `high` where it is not the same everywhere. */
  readonly step: number;
  readonly unit: Unit;
  /** Whether `low` and `high` are 4 standard deviations rather than limits. */
  readonly isEstimate: boolean;
}

/** About what the largest value of a tile over its loop is, in standard deviations. */
const LARGEST_SIGMAS = 4;

const LARGEST_CODES: Readonly<Record<SampleType, number | null>> = {
  uint8: 255,
  uint16: 65535,
  half: null,
  float: null,
};

/** Bits of the fraction of a float. */
const FRACTION_BITS = { half: 10, float: 23 } as const;

/** Range and step of a channel, in its own unit. */
export function channelRange(
  channel: PlannedChannel,
  sample: SampleType,
  deviations: FieldDeviations,
): ChannelRange {
  const { quantity, decode, unit } = channel;
  const largestCode = LARGEST_CODES[sample];
  if (largestCode !== null && decode !== null) {
    const ends = [decode.offset, decode.offset + decode.scale];
    const step = Math.abs(decode.scale) / largestCode;
    return { low: Math.min(...ends), high: Math.max(...ends), step, unit, isEstimate: false };
  }
  const { low, high, isEstimate } = likelyRange(quantity, unit, deviations);
  const step =
    largestCode === null
      ? floatStep(high, FRACTION_BITS[sample as 'half' | 'float'])
      : (high - low) / largestCode;
  return { low, high, step, unit, isEstimate };
}

function likelyRange(
  quantity: Quantity,
  unit: Unit,
  deviations: FieldDeviations,
): Pick<ChannelRange, 'low' | 'high' | 'isEstimate'> {
  if (quantity === 'foam') return { low: 0, high: 1, isEstimate: false };
  if (quantity.startsWith('normal')) return { low: -1, high: 1, isEstimate: false };
  const perSi = unit === 'cm' || unit === 'cm/s' ? 100 : 1;
  const extent = LARGEST_SIGMAS * deviations[deviationName(quantity)] * perSi;
  if (quantity === 'jacobian') return { low: 1 - extent, high: 1 + extent, isEstimate: true };
  return { low: -extent, high: extent, isEstimate: true };
}

/** `slope-east` is in `slopeEast`; the vertical displacement is the height, and J varies as the compression does. */
function deviationName(quantity: Quantity): keyof FieldDeviations {
  if (quantity === 'displacement-up') return 'height';
  if (quantity === 'jacobian') return 'compression';
  return quantity.replace(/-[a-z]/g, (part) => part[1].toUpperCase()) as keyof FieldDeviations;
}

/** Distance of a binary float to its neighbour: 2^(exponent - bits of the fraction). */
function floatStep(value: number, fractionBits: number): number {
  return 2 ** (Math.floor(Math.log2(value)) - fractionBits);
}
