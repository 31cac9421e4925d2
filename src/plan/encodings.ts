import type { ChannelSpec, Decode, Quantity, SampleType, Unit } from '../image/image.ts';
import { LARGEST_CODE } from '../image/image.ts';
import type { MapName, MapRequest, OutputConventions } from '../sea/sea.ts';
import type { FieldDeviations } from '../waves/field-deviations.ts';
import type { Combine, PlannedChannel, PlannedMap } from './plan.ts';

interface MapContents {
  readonly quantities: readonly Quantity[];
  readonly combine: Combine;
  /** What one unit of the value is measured in. */
  readonly dimension: 'length' | 'speed' | 'number';
}

/** What each map holds and how the cascades' maps add up. */
export const MAP_CONTENTS: Readonly<Record<MapName, MapContents>> = {
  displacement: {
    quantities: ['displacement-east', 'displacement-north', 'displacement-up'],
    combine: 'sum',
    dimension: 'length',
  },
  height: { quantities: ['height'], combine: 'sum', dimension: 'length' },
  velocity: {
    quantities: ['velocity-east', 'velocity-north', 'velocity-up'],
    combine: 'sum',
    dimension: 'speed',
  },
  slope: { quantities: ['slope-east', 'slope-north'], combine: 'sum', dimension: 'number' },
  strain: {
    quantities: ['strain-east-east', 'strain-north-north', 'strain-east-north'],
    combine: 'sum',
    dimension: 'number',
  },
  normal: {
    quantities: ['normal-east', 'normal-north', 'normal-up'],
    combine: 'rebuild',
    dimension: 'number',
  },
  jacobian: { quantities: ['jacobian'], combine: 'rebuild', dimension: 'number' },
  foam: { quantities: ['foam'], combine: 'one-minus-product', dimension: 'number' },
};

/** J is skew: range of its codes in standard deviations of the compression below and above 1. */
export const JACOBIAN_RANGE_SIGMAS = { below: 5.5, above: 7 } as const;

/** One kind of file of a cascade, with the decode rule of every channel. */
export function plannedMap(
  request: MapRequest,
  cascadeId: string,
  deviations: FieldDeviations,
  output: OutputConventions,
): PlannedMap {
  const contents = MAP_CONTENTS[request.map];
  const oriented = orientedQuantities(contents.quantities, output);
  const names = channelNames(request, oriented, output);
  const channels = oriented.map(({ quantity, sign }, c): PlannedChannel => {
    const unit = channelUnit(contents.dimension, output);
    const perSi = unit === 'cm' || unit === 'cm/s' ? 100 : 1;
    const decode = channelDecode(request, quantity, deviations, perSi, sign);
    return { name: names[c], quantity, unit, decode };
  });
  const digits = `%0${output.padding}d`;
  return {
    map: request.map,
    pattern: `${cascadeId}/${request.map}.${digits}.${request.format}`,
    format: request.format,
    sample: request.sample,
    combine: contents.combine,
    dither: request.dither,
    range: request.range,
    channels,
  };
}

interface OrientedQuantity {
  readonly quantity: Quantity;
  /** -1 where the file holds the negative of the quantity. */
  readonly sign: 1 | -1;
}

/**
 * The order and signs of a map's channels. y-up swaps the vertical axis in: X = east, Y = up, Z = -north. Normals are
 * tangent-space and know no world axes; their green channel may be asked to point south.
 */
function orientedQuantities(
  quantities: readonly Quantity[],
  output: OutputConventions,
): readonly OrientedQuantity[] {
  const [first] = quantities;
  if (first === 'normal-east') {
    return quantities.map((quantity) => ({
      quantity,
      sign: quantity === 'normal-north' && output.normalGreen === 'south' ? -1 : 1,
    }));
  }
  const spatial = first === 'displacement-east' || first === 'velocity-east';
  if (!spatial || output.axes === 'z-up') return quantities.map((quantity) => ({ quantity, sign: 1 }));
  const [east, north, up] = quantities;
  return [
    { quantity: east, sign: 1 },
    { quantity: up, sign: 1 },
    { quantity: north, sign: -1 },
  ];
}

/** Layered EXR names by map: `displacement.X`; single channels take the map's name alone. */
const LAYER_COMPONENTS: Readonly<Partial<Record<MapName, readonly string[]>>> = {
  displacement: ['X', 'Y', 'Z'],
  velocity: ['X', 'Y', 'Z'],
  normal: ['X', 'Y', 'Z'],
  slope: ['X', 'Y'],
  strain: ['XX', 'YY', 'XY'],
};

function channelNames(
  request: MapRequest,
  oriented: readonly OrientedQuantity[],
  output: OutputConventions,
): readonly string[] {
  if (request.format === 'exr' && output.exrChannels === 'layered') {
    const components = LAYER_COMPONENTS[request.map];
    return components === undefined ? [request.map] : components.map((part) => `${request.map}.${part}`);
  }
  if (oriented.length === 1) return ['Y'];
  // PNG knows two channels only as grey and alpha.
  if (oriented.length === 2 && request.format === 'png') return ['Y', 'A'];
  return ['R', 'G', 'B'].slice(0, oriented.length);
}

function channelUnit(dimension: MapContents['dimension'], output: OutputConventions): Unit {
  if (dimension === 'number') return '1';
  if (dimension === 'length') return output.lengthUnit;
  return output.lengthUnit === 'cm' ? 'cm/s' : 'm/s';
}

function channelDecode(
  request: MapRequest,
  quantity: Quantity,
  deviations: FieldDeviations,
  perSi: number,
  sign: 1 | -1,
): Decode | null {
  if (request.sample === 'half' || request.sample === 'float') return { scale: sign, offset: 0 };
  if (quantity === 'foam') return { scale: 1, offset: 0 };
  if (quantity.startsWith('normal')) return { scale: 2 * sign, offset: -sign };
  const { range } = request;
  if (range.policy === 'survey') return null;
  if (quantity === 'jacobian' && range.policy === 'natural') {
    return jacobianDecode(deviations.compression);
  }
  const extent =
    range.policy === 'extent'
      ? range.extent
      : (range.policy === 'sigmas' ? range.sigmas : 6) * quantityDeviation(quantity, deviations);
  if (quantity === 'jacobian') return spanDecode(1 - extent, 1 + extent);
  return centredDecode(extent * perSi, request.sample, sign);
}

/**
 * Decode rule of a signed quantity of up to `extent` in magnitude, with an exact zero:
 *
 *     value = (code - zero) * step,  zero = 2^(bits - 1)
 *
 * The step is rounded up to five digits, so that it can be copied by hand.
 */
export function centredDecode(extent: number, sample: 'uint8' | 'uint16', sign: 1 | -1): Decode {
  const largest = LARGEST_CODE[sample];
  const zero = (largest + 1) / 2;
  const step = sign * roundedUp(extent / (zero - 1) || 1e-9);
  return { scale: largest * step, offset: -zero * step };
}

/** Decode rule of J from its deviation: 1 - 5.5 sigma .. 1 + 7 sigma. */
export function jacobianDecode(compressionDeviation: number): Decode {
  const sigma = roundedUp(compressionDeviation || 1e-6);
  return spanDecode(1 - JACOBIAN_RANGE_SIGMAS.below * sigma, 1 + JACOBIAN_RANGE_SIGMAS.above * sigma);
}

/**
 * Decode rule of a channel whose largest magnitude a survey of the loop has found.
 *
 * @param extent largest magnitude in the channel's unit; of J - 1 for a Jacobian
 */
export function surveyedDecode(
  quantity: Quantity,
  sample: 'uint8' | 'uint16',
  extent: number,
  output: OutputConventions,
): Decode {
  if (quantity === 'jacobian') return spanDecode(1 - extent, 1 + extent);
  const northward = quantity === 'displacement-north' || quantity === 'velocity-north';
  return centredDecode(extent, sample, northward && output.axes === 'y-up' ? -1 : 1);
}

function spanDecode(low: number, high: number): Decode {
  return { scale: high - low, offset: low };
}

/** The smallest number of five significant digits that is not below `value`. */
function roundedUp(value: number): number {
  const power = 10 ** (4 - Math.floor(Math.log10(value)));
  return Number((Math.ceil(value * power) / power).toPrecision(6));
}

function quantityDeviation(quantity: Quantity, d: FieldDeviations): number {
  const deviations: Readonly<Partial<Record<Quantity, number>>> = {
    'displacement-east': d.displacementEast,
    'displacement-north': d.displacementNorth,
    'displacement-up': d.height,
    height: d.height,
    'velocity-east': d.velocityEast,
    'velocity-north': d.velocityNorth,
    'velocity-up': d.velocityUp,
    'slope-east': d.slopeEast,
    'slope-north': d.slopeNorth,
    'strain-east-east': d.strainEastEast,
    'strain-north-north': d.strainNorthNorth,
    'strain-east-north': d.strainEastNorth,
    jacobian: d.compression,
  };
  return deviations[quantity] ?? 1;
}

/** Whether every decode rule of a map is known. */
export function isSurveyed(
  map: PlannedMap,
): map is PlannedMap & { readonly channels: readonly ChannelSpec[] } {
  return map.channels.every((channel) => channel.decode !== null);
}

/** Integer sample types. */
export function isInteger(sample: SampleType): sample is 'uint8' | 'uint16' {
  return sample === 'uint8' || sample === 'uint16';
}
