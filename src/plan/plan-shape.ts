import type { Decode } from '../image/image.ts';
import type { Current, Water } from '../physics/water.ts';
import { type BandGain, type Loop, MAP_NAMES, type OutputConventions, type Shaping } from '../sea/sea.ts';
import type { Band, BandBorder } from '../waves/band.ts';
import type { FieldDeviations } from '../waves/field-deviations.ts';
import { MAP_CONTENTS } from './encodings.ts';
import {
  type CascadeFoam,
  ENGINE_NAMES,
  type JacobianCodes,
  type Plan,
  type PlannedCascade,
  type PlannedFoam,
  type PlannedMap,
} from './plan.ts';
import { REPORT } from './report-shape.ts';
import {
  FINITE,
  LENGTH_OR_INFINITE,
  listOf,
  numberFrom,
  oneOf,
  openRecord,
  orNull,
  record,
  type Shape,
  type ShapeFault,
  textOf,
  wholeFrom,
  YES_OR_NO,
} from './shape.ts';

/*
 * What a saved plan must look like. The limits are those of sea files: whatever passes can be planned as a sea, so a
 * plan can ask for no more memory, files or names than a sea can.
 */

const POSITIVE = numberFrom(Number.MIN_VALUE, 1e9);
const SHARE = numberFrom(0, 1);
const HASH = textOf(71, /^sha256:[0-9a-f]{64}$/);
const WORDS = textOf(2000);
const MOST_FRAMES = 100_000;
const MOST_CASCADES = 16;
const MOST_SYSTEMS = 256;

const water = record<Water>({
  depthM: LENGTH_OR_INFINITE,
  gravityMps2: POSITIVE,
  densityKgpm3: POSITIVE,
  surfaceTensionNpm: numberFrom(0, 1e3),
});

const current = record<Current>({ eastMps: numberFrom(-1e3, 1e3), northMps: numberFrom(-1e3, 1e3) });

/** The parameters of the published forms are theirs: whether they draw the plan's waves is checked on the waves. */
const system = openRecord({
  name: textOf(200),
  kind: textOf(40),
  basis: WORDS,
  fromRad: FINITE,
  towardRad: FINITE,
  windSpeedMps: orNull(FINITE),
  significantHeightM: FINITE,
  peakPeriodS: FINITE,
  peakWavelengthM: FINITE,
  againstShare: SHARE,
  spectrum: openRecord({ form: textOf(40), energyFactor: FINITE }),
  spreading: openRecord({ form: textOf(40) }),
});

const shaping = record<Shaping>({
  bandGains: listOf(
    record<BandGain>({ shortestWavelengthM: FINITE, longestWavelengthM: FINITE, gain: FINITE }),
    0,
    100,
  ),
  againstWind: SHARE,
  horizontalScale: numberFrom(0, 100),
  matchHeight: YES_OR_NO,
  amplitudes: oneOf('gaussian', 'deterministic'),
});

const frameRate = listOf(wholeFrom(1, 2 ** 31), 2, 2) as Shape<Loop['frameRate']>;

const loop = record<Loop>({
  frameCount: wholeFrom(1, MOST_FRAMES),
  frameRate,
  firstFrame: wholeFrom(0, 10_000_000),
  askedSeconds: orNull(FINITE),
});

const border = record<BandBorder>({ kRadPerM: POSITIVE, fade: numberFrom(1, 1e6) });
const band = record<Band>({ low: orNull(border), high: border });

const deviation = numberFrom(0, 1e9);
const deviations = record<FieldDeviations>({
  height: deviation,
  displacementEast: deviation,
  displacementNorth: deviation,
  velocityEast: deviation,
  velocityNorth: deviation,
  velocityUp: deviation,
  slopeEast: deviation,
  slopeNorth: deviation,
  strainEastEast: deviation,
  strainNorthNorth: deviation,
  strainEastNorth: deviation,
  compression: deviation,
  slopeProduct: FINITE,
});

const range: PlannedMap['range']['policy'][] = ['sigmas', 'extent', 'survey', 'natural'];

const map = record<PlannedMap>({
  map: oneOf(...MAP_NAMES),
  pattern: textOf(100),
  format: oneOf('exr', 'png'),
  sample: oneOf('uint8', 'uint16', 'half', 'float'),
  combine: oneOf('sum', 'one-minus-product', 'rebuild'),
  dither: YES_OR_NO,
  range: openRecord({ policy: oneOf(...range) }) as Shape<PlannedMap['range']>,
  channels: listOf(
    record<PlannedMap['channels'][number]>({
      name: textOf(40, /^[A-Za-z][A-Za-z.]*$/),
      quantity: oneOf(...Object.values(MAP_CONTENTS).flatMap(({ quantities }) => quantities)),
      unit: oneOf('m', 'cm', 'm/s', 'cm/s', '1'),
      decode: orNull(record<Decode>({ scale: FINITE, offset: FINITE })),
    }),
    1,
    3,
  ),
});

const foam = record<PlannedFoam>({
  by: oneOf('wind', 'coverage', 'breaking-level'),
  coverage: orNull(SHARE),
  residue: oneOf('remove', 'keep'),
});

const ownFoam = record<CascadeFoam>({
  share: SHARE,
  coverage: orNull(SHARE),
  breakingJ: orNull(FINITE),
  rampJ: POSITIVE,
  decayTimeS: POSITIVE,
  loopResidue: SHARE,
  jacobianCodes: record<JacobianCodes>({ zeroJ: FINITE, stepJ: POSITIVE }),
});

const cascade = record<PlannedCascade>({
  id: textOf(3, /^c\d{1,2}$/),
  patchLengthM: numberFrom(0.01, 1e6),
  resolution: oneOf(16, 32, 64, 128, 256, 512, 1024, 2048, 4096, 8192),
  band,
  loop,
  bandVariancesM2: listOf(FINITE, 0, MOST_SYSTEMS),
  amplitudesHash: HASH,
  expectedHeightDeviationM: deviation,
  deviations,
  maps: listOf(map, 0, MAP_NAMES.length),
  foam: orNull(ownFoam),
});

const output = record<OutputConventions>({
  axes: oneOf('z-up', 'y-up'),
  rowZero: oneOf('north', 'south'),
  normalGreen: oneOf('north', 'south'),
  lengthUnit: oneOf('m', 'cm'),
  exrChannels: oneOf('plain', 'layered'),
  padding: wholeFrom(4, 10),
});

const plan = record<Plan>({
  format: oneOf('loopswell-plan'),
  version: oneOf(1),
  generator: record<Plan['generator']>({
    name: oneOf('loopswell'),
    version: textOf(40),
    outputVersion: wholeFrom(1, 1e6),
  }),
  engine: oneOf(...ENGINE_NAMES),
  title: textOf(1000),
  seed: wholeFrom(0, 2 ** 32 - 1),
  water,
  current,
  systems: listOf(system, 1, MOST_SYSTEMS) as Shape<Plan['systems']>,
  shaping,
  loop,
  cascades: listOf(cascade, 1, MOST_CASCADES),
  foam: orNull(foam),
  output,
  report: REPORT,
  hash: HASH,
});

/** What is wrong with a value that should be a plan; null where nothing is. */
export function planFault(value: unknown): ShapeFault | null {
  return plan(value, '') ?? nameFault(value as Plan);
}

/** Cascades and maps go by their places and kinds: no file of a plan has another name than these. */
function nameFault({ cascades, output: { padding } }: Plan): ShapeFault | null {
  for (const [c, { id, maps }] of cascades.entries()) {
    if (id !== `c${c}`) return { path: `cascades[${c}].id`, expected: `c${c}`, found: id };
    const kinds = new Set<string>();
    for (const [m, { map: kind, pattern, format }] of maps.entries()) {
      const path = `cascades[${c}].maps[${m}]`;
      const named = `${id}/${kind}.%0${padding}d.${format}`;
      if (pattern !== named)
        return { path: `${path}.pattern`, expected: named, found: JSON.stringify(pattern) };
      if (kinds.has(kind)) return { path: `${path}.map`, expected: 'each kind of map once', found: kind };
      kinds.add(kind);
    }
  }
  return null;
}
