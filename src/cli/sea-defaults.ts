import {
  CASCADES_DEFAULTS,
  FOAM_DEFAULTS,
  LOOP_DEFAULTS,
  MAPS_DEFAULTS,
  OUTPUT_DEFAULTS,
  RANGE_DEFAULTS,
  SEA_WATER_DEFAULTS,
  SEED_DEFAULT,
  SHAPING_DEFAULTS,
  SPREADING_DEFAULTS,
} from '../index.ts';
import { fieldLines, indented } from './table.ts';

/** What a sea file may leave out and then gets: help text, from the library's own defaults. */
export function seaDefaultsHelp(): string {
  const [numerator, denominator] = LOOP_DEFAULTS.frameRate;
  const maps = Object.entries(MAPS_DEFAULTS).map(([map, format]) => `${map} ${format}`);
  const { count, resolution, shortestWavelengthM, headRoom } = CASCADES_DEFAULTS;
  const fields: [string, string][] = [
    ['seed', String(SEED_DEFAULT)],
    ['water', settings({ ...SEA_WATER_DEFAULTS, depthM: 'deep' })],
    [
      'spreading',
      `wind seas hasselmann, swell cos-2s with s ${SPREADING_DEFAULTS.swellS}; swellNarrowing ${SPREADING_DEFAULTS.swellNarrowing}`,
    ],
    ['shaping', settings({ ...SHAPING_DEFAULTS, bandGains: 'none' })],
    [
      'loop',
      `${LOOP_DEFAULTS.seconds} s at ${numerator / denominator} frames a second, numbered from ${LOOP_DEFAULTS.firstFrame}`,
    ],
    ['cascades', `auto, ${count} of ${resolution} texels to ${shortestWavelengthM} m, head room ${headRoom}`],
    ['foam', `by the wind, ${settings(FOAM_DEFAULTS)}`],
    ['maps', `${maps.join(', ')}; range of integers ${RANGE_DEFAULTS.sigmas} sigmas`],
    ['output', settings(OUTPUT_DEFAULTS)],
  ];
  return ['What a sea file may leave out:', ...indented(fieldLines(fields))].join('\n');
}

/** `depth deep, gravity 9.80665, ...`: the library's names without their units are the keys of the file. */
function settings(defaults: object): string {
  return Object.entries(defaults)
    .map(([name, value]) => `${name.replace(/(Mps2|Kgpm3|Npm|M)$/, '')} ${value}`)
    .join(', ');
}
