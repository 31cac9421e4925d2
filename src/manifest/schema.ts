import { z } from 'zod';
import { MAP_NAMES } from '../sea/sea.ts';
import type { Manifest } from './manifest.ts';

const number = z.number();
const share = z
  .number()
  .min(-1e-9)
  .max(1 + 1e-9);
const count = z
  .number()
  .int()
  .positive()
  .max(2 ** 31);
const frameRate = z.tuple([count, count]).readonly();
const hash = z.string().regex(/^sha256:[0-9a-f]{64}$/);

const loop = z.strictObject({
  seconds: z.number().positive(),
  frameRate: frameRate.describe('frames per second as numerator and denominator'),
  frameCount: count.describe('number of distinct frames; the frame after the last is the first'),
  firstFrame: z.number().int().nonnegative().describe('number of the first file'),
});

/** Parameters of a spectrum or a spreading: the published form's key, and numbers. */
const parameters = z.looseObject({ form: z.string() });

const system = z.strictObject({
  name: z.string(),
  kind: z.string(),
  basis: z.string().describe('what was given and which law made the rest'),
  fromDeg: number.describe('direction the waves come from, degrees clockwise from north'),
  towardRad: number.describe('direction of travel, rad counter-clockwise from east'),
  windSpeedMps: number.nullable(),
  significantHeightM: number,
  peakPeriodS: number,
  peakWavelengthM: number,
  againstShare: share,
  spectrum: parameters,
  spreading: parameters,
});

const gain = z.strictObject({
  shortestWavelengthM: number,
  longestWavelengthM: number,
  gain: number,
});

const sea = z.strictObject({
  seed: z.number().int().nonnegative(),
  water: z.strictObject({
    depthM: z.union([z.number().positive(), z.literal('deep')]),
    gravityMps2: number,
    densityKgpm3: number,
    surfaceTensionNpm: number,
    currentEastMps: number,
    currentNorthMps: number,
  }),
  horizontalScale: number,
  shaping: z.strictObject({
    bandGains: z.array(gain).readonly(),
    againstWind: share,
    matchHeight: z.boolean(),
    amplitudes: z.enum(['gaussian', 'deterministic']),
  }),
  foam: z.strictObject({ by: z.string(), coverage: share.nullable(), residue: z.string() }).nullable(),
  systems: z.array(system).readonly(),
});

const conventions = z.strictObject({
  axes: z.enum(['z-up', 'y-up']),
  rowZero: z.enum(['north', 'south']).describe('which edge of the tile the first row of a file holds'),
  uvOrigin: z.literal('south-west'),
  sampleLocation: z.literal('texel-centre'),
  uv: z.literal('position / patchLength'),
  normalGreen: z.enum(['north', 'south']),
  lengthUnit: z.enum(['m', 'cm']),
  colorSpace: z.literal('data'),
});

const channel = z.strictObject({
  name: z.string(),
  quantity: z.enum([
    'displacement-east',
    'displacement-north',
    'displacement-up',
    'velocity-east',
    'velocity-north',
    'velocity-up',
    'slope-east',
    'slope-north',
    'strain-east-east',
    'strain-north-north',
    'strain-east-north',
    'normal-east',
    'normal-north',
    'normal-up',
    'jacobian',
    'foam',
    'height',
  ]),
  unit: z.enum(['m', 'cm', 'm/s', 'cm/s', '1']),
  decode: z
    .strictObject({ scale: number, offset: number })
    .describe('value = stored * scale + offset; stored is the float, or code / largest code'),
  written: z
    .strictObject({ min: number, max: number, mean: number, deviation: number, clipped: z.number().int() })
    .describe('what the files hold over the whole loop, in the unit of the channel'),
});

const map = z.strictObject({
  pattern: z.string().describe('path below this file, with a printf frame number'),
  format: z.enum(['exr', 'png']),
  sample: z.enum(['uint8', 'uint16', 'half', 'float']),
  combine: z
    .enum(['sum', 'one-minus-product', 'rebuild'])
    .describe('how the maps of the cascades make the map of the sea; see reading'),
  dither: z.boolean(),
  range: z.enum(['sigmas', 'extent', 'survey', 'natural']),
  channels: z.array(channel).readonly(),
});

const slopeFigures = { alongWind: number, acrossWind: number };
const slope = z
  .strictObject(slopeFigures)
  .describe('slope variance along and across the strongest wind, or the highest system');

const border = z.strictObject({
  kRadPerM: z.number().positive(),
  fade: z.number().min(1),
});

const cascade = z.strictObject({
  id: z.string(),
  patchLengthM: z.number().positive(),
  resolution: count.max(8192),
  wavenumberRadPerM: z.tuple([number, number]).readonly(),
  band: z
    .strictObject({ low: border.nullable(), high: border })
    .describe('energy weight: smoothstep in ln k from k/fade to k*fade at each border'),
  loop,
  amplitudesHash: hash,
  statistics: z.strictObject({
    significantHeightM: z.strictObject({ expected: number, measured: number.nullable() }),
    skewness: number.nullable(),
    kurtosis: number.nullable(),
    largestCrestM: number.nullable(),
    deepestTroughM: number.nullable(),
    slopeVariance: slope,
    jacobianDeviation: number.describe('standard deviation of J - 1 to first order'),
    foldedShare: share.nullable().describe('share of the surface with J < 0'),
    heightStepMm: number.nullable(),
  }),
  foam: z
    .strictObject({
      share,
      coverage: z.strictObject({ target: share.nullable(), measured: share }),
      note: z.string().nullable(),
      breakingJ: number,
      rampJ: number,
      decayTimeS: z.number().positive(),
      loopResidue: share,
    })
    .nullable(),
  maps: z.partialRecord(z.enum(MAP_NAMES), map),
});

/** The shape of a manifest; `json-schema.ts` prints it for others. */
export const MANIFEST_SCHEMA: z.ZodType<Manifest> = z.strictObject({
  format: z.literal('loopswell-manifest'),
  version: z.literal(1),
  generator: z.strictObject({
    name: z.literal('loopswell'),
    version: z.string(),
    outputVersion: z.number().int(),
    engine: z.string(),
  }),
  planHash: hash,
  title: z.string(),
  caution: z.string(),
  sea,
  conventions,
  reading: z.record(z.string(), z.string()).describe('the reader’s guide, by topic'),
  loop,
  cascades: z.array(cascade).min(1).readonly(),
  statistics: z.strictObject({
    significantHeightM: z.strictObject({ target: number, expected: number, measured: number.nullable() }),
    peakPeriodS: number,
    meanZeroCrossingPeriodS: number,
    skewness: number.nullable(),
    kurtosis: number.nullable(),
    largestCrestBoundM: number.nullable(),
    deepestTroughBoundM: number.nullable(),
    slopeVariance: z.strictObject({ ...slopeFigures, coxMunk: slope.nullable() }),
    foamCoverage: z.strictObject({ measured: share.nullable(), whitecapFormula: share.nullable() }),
  }),
  losses: z.strictObject({
    notInAnyCascade: share,
    zeroCells: share,
    tooFastForFrames: share,
    slopeVarianceLeftOut: number,
    frequencyError: number,
  }),
  files: z
    .array(z.strictObject({ path: z.string().min(1), bytes: z.number().int().nonnegative(), sha256: hash }))
    .readonly(),
}) as unknown as z.ZodType<Manifest>;
