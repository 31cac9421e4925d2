import type { Combine, Plan, PlannedCascade, PlannedMap } from '../index.ts';
import { type ChannelRange, channelRange } from './channel-range.ts';
import type { Section } from './plan-report.ts';
import { type Field, fieldLines, tableLines, words } from './table.ts';
import { rounded } from './wording.ts';

const COMBINE_WORDS: Readonly<Record<Combine, string>> = {
  sum: 'sum the cascades',
  'one-minus-product': 'combine cascades as 1 - product of (1 - map)',
  rebuild: 'of several cascades rebuild it from their summed slope and strain',
};

/** The kinds of files, then the range and step of each cascade's. */
export function mapsSection({ cascades, output }: Plan): Section {
  const kinds = cascades[0].maps.map((map): Field => {
    const parts = [formatWords(map), channelWords(map, output.axes), COMBINE_WORDS[map.combine]];
    return [map.map, parts.join('; ')];
  });
  const ranges = cascades.flatMap((cascade) =>
    cascade.maps.map((map) => [map.pattern, ...rangeWords(map, cascade)]),
  );
  return {
    heading: 'Maps',
    lines: [
      ...fieldLines(kinds),
      '',
      ...tableLines([words('files'), words('largest value'), words('step')], ranges),
    ],
  };
}

/** `16-bit PNG`, `half EXR`, `8-bit PNG, dithered`. */
function formatWords({ format, sample, dither }: PlannedMap): string {
  const bits = { uint8: '8-bit', uint16: '16-bit', half: 'half', float: 'float' }[sample];
  return `${bits} ${format.toUpperCase()}${dither ? ', dithered' : ''}`;
}

/** `R east, G up, B -north`: what each channel holds, the map's own name left out. */
function channelWords({ map, channels }: PlannedMap, axes: Plan['output']['axes']): string {
  return channels
    .map(({ name, quantity, decode }) => {
      const part = quantity === map ? quantity : quantity.slice(map.length + 1);
      // A rule that a survey has yet to find will have the sign that the axes call for.
      const southward = axes === 'y-up' && /^(displacement|velocity)-north$/.test(quantity);
      const isNegative = decode === null ? southward : decode.scale < 0;
      return `${name} ${isNegative ? '-' : ''}${part}`;
    })
    .join(', ');
}

/** Largest value and step of the channel in which they are largest. */
function rangeWords(map: PlannedMap, { deviations }: PlannedCascade): [largest: string, step: string] {
  const ranges = map.channels.map((channel) => channelRange(channel, map.sample, deviations));
  const widest = ranges.reduce((a, b) => (b.high > a.high ? b : a));
  const survey = map.range.policy === 'survey' ? ', to be measured' : '';
  const about = widest.isEstimate ? 'about ' : '';
  const where = map.sample === 'half' || map.sample === 'float' ? ' there' : '';
  return [`${about}${spanWords(widest)}${survey}`, `${about}${stepWords(widest)}${where}`];
}

function spanWords({ low, high, unit }: ChannelRange): string {
  const suffix = unit === '1' ? '' : ` ${unit}`;
  if (low === 0) return `0 to ${rounded(high)}${suffix}`;
  const centred = Math.abs(low + high) < 0.01 * high;
  return centred ? `±${rounded(high)}${suffix}` : `${rounded(low)} to ${rounded(high)}${suffix}`;
}

/** Lengths in mm, speeds in mm/s. */
function stepWords({ step, unit }: ChannelRange): string {
  if (unit === '1') return rounded(step, 2);
  const millimetres = step * (unit.startsWith('cm') ? 10 : 1000);
  return `${rounded(millimetres, 2)} mm${unit.endsWith('/s') ? '/s' : ''}`;
}

/** The conventions of the files. */
export function outputSection({ output, cascades }: Plan): Section {
  const green = cascades.some(({ maps }) => maps.some(({ map }) => map === 'normal'));
  const exr = cascades.some(({ maps }) => maps.some(({ format }) => format === 'exr'));
  return {
    heading: 'Output',
    lines: fieldLines([
      ['axes', output.axes === 'z-up' ? 'z-up (x east, y north)' : 'y-up (x east, z south)'],
      ['row zero', `${output.rowZero} edge`],
      ...(green ? [['normal green', `points ${output.normalGreen}`] as const] : []),
      ['length unit', output.lengthUnit],
      ...(exr ? [['EXR channels', output.exrChannels] as const] : []),
      ['padding', `${output.padding} digits`],
    ]),
  };
}
