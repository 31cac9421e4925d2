import { mkdirSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { bake } from '../../src/bake/bake.ts';
import type { EngineName } from '../../src/plan/plan.ts';
import { PLAN_DEFAULTS, planBake } from '../../src/plan/plan-bake.ts';
import { seaFromObject } from '../../src/sea/parse.ts';

// Bakes small enough for a test: grids of 32 and 64, one or two cascades, a dozen or two of frames.

type Keys = Readonly<Record<string, unknown>>;

/** A wind sea of 2.4 s with foam; two cascades, displacement as half EXR, normals and foam as 8-bit PNG. */
const SMALL_SEA_KEYS: Keys = Object.freeze({
  seaFile: 1,
  title: 'Small wind sea',
  seed: 11,
  systems: [{ kind: 'wind-sea', from: 235, significantHeight: 0.35, peakPeriod: 2.4, windSpeed: 7 }],
  loop: { frames: 24, frameRate: 4 },
  cascades: [
    { patch: 40, resolution: 64 },
    { patch: 8.7, resolution: 32, loop: { frames: 12, frameRate: 4 } },
  ],
  foam: { coverage: 0.03 },
  maps: { displacement: 'exr', normal: 'png', foam: 'png' },
});

/** Every map, floats and 16 bits, so that single errors stand out. */
const EVERY_MAP: Keys = {
  displacement: { format: 'exr', sample: 'float' },
  height: { format: 'exr', sample: 'float' },
  velocity: { format: 'exr', sample: 'float' },
  slope: { format: 'exr', sample: 'float' },
  strain: { format: 'exr', sample: 'float' },
  normal: { format: 'png', bits: 16 },
  jacobian: { format: 'exr', sample: 'float' },
  foam: { format: 'png', bits: 16 },
};

/** Narrow, on a tile with many of its waves, so that its direction is known well. */
export const MANY_WAVES_SYSTEM = {
  kind: 'wind-sea',
  from: 235,
  significantHeight: 0.35,
  peakPeriod: 2.4,
  windSpeed: 7,
  spreading: { form: 'cos-2s', s: 40 },
} as const;

const ONE_TILE = [{ patch: 40, resolution: 64 }];

/** What each small bake changes of `SMALL_SEA_KEYS`; `undefined` removes a key. */
export const SMALL_SEAS: Readonly<Record<string, Keys>> = Object.freeze({
  plain: {},
  'every map': { maps: EVERY_MAP },
  // Small, as it is copied and verified over and over: see spoilers.ts. Depth and direction leave no symmetry, and frames
  // follow closely enough that steps in time tell something.
  spoilable: {
    water: { depth: 3 },
    maps: EVERY_MAP,
    loop: { frames: 16, frameRate: 5 },
    cascades: [
      { patch: 24, resolution: 32 },
      { patch: 5.3, resolution: 16, loop: { frames: 8, frameRate: 5 } },
    ],
  },
  // Verified more than a hundred times over.
  tiny: { cascades: [{ patch: 30, resolution: 32 }], loop: { frames: 8, frameRate: 4 } },
  'many waves': {
    systems: [MANY_WAVES_SYSTEM],
    cascades: [{ patch: 90, resolution: 64 }],
    loop: { frames: 16, frameRate: 5 },
    maps: { displacement: { format: 'exr', sample: 'float' } },
    foam: 'off',
  },
  'every map, 16 bits': {
    cascades: ONE_TILE,
    maps: {
      displacement: { format: 'png', bits: 16 },
      height: 'png',
      velocity: 'png',
      slope: 'exr',
      strain: 'png',
      normal: { format: 'png', bits: 16 },
      jacobian: 'png',
      foam: 'png',
    },
  },
  'every map, 8 bits': {
    cascades: ONE_TILE,
    maps: {
      displacement: { format: 'png', bits: 8 },
      height: { format: 'png', bits: 8 },
      velocity: { format: 'png', bits: 8 },
      slope: 'exr',
      strain: { format: 'png', bits: 8 },
      normal: { format: 'png', bits: 8 },
      jacobian: { format: 'png', bits: 8 },
      foam: { format: 'png', bits: 8 },
    },
  },
  'dithered 8 bits': {
    cascades: ONE_TILE,
    maps: {
      displacement: { format: 'png', bits: 8, dither: true },
      strain: { format: 'png', bits: 8, dither: true },
      normal: { format: 'png', bits: 8, dither: true },
    },
    foam: 'off',
  },
  current: {
    water: { current: { speed: 0.9, toward: 70 } },
    systems: [
      { kind: 'wind-sea', from: 200, windSpeed: 6, fetch: 3000 },
      { kind: 'swell', from: 310, significantHeight: 0.15, peakPeriod: 3.2 },
    ],
    maps: { displacement: 'exr', velocity: 'exr', normal: 'png', foam: 'png' },
  },
  shallow: {
    water: { depth: 0.9 },
    maps: { displacement: 'exr', velocity: 'exr', slope: 'exr', strain: 'exr', jacobian: 'exr' },
    foam: 'off',
  },
  'height not matched': { shaping: { matchHeight: false }, maps: { displacement: 'exr' }, foam: 'off' },
  deterministic: { shaping: { amplitudes: 'deterministic' }, maps: { displacement: 'exr' }, foam: 'off' },
  'deterministic, not matched': {
    shaping: { amplitudes: 'deterministic', matchHeight: false },
    maps: { displacement: 'exr' },
    foam: 'off',
  },
  'y up, cm, row zero south, green south': {
    output: { axes: 'y-up', lengthUnit: 'cm', rowZero: 'south', normalGreen: 'south' },
    maps: { displacement: 'exr', velocity: { format: 'png', bits: 16 }, normal: 'png', foam: 'png' },
  },
  'layered EXR': {
    output: { exrChannels: 'layered', padding: 6 },
    maps: { displacement: 'exr', velocity: 'exr', slope: 'exr', strain: 'exr', jacobian: 'exr', foam: 'exr' },
    cascades: ONE_TILE,
  },
  // Large enough for the manifest to count every second texel only.
  'large tile': {
    cascades: [{ patch: 40, resolution: 128 }],
    loop: { frames: 6, frameRate: 4 },
    maps: { displacement: 'exr' },
    foam: 'off',
  },
  'large tile, row zero south': {
    cascades: [{ patch: 40, resolution: 128 }],
    loop: { frames: 6, frameRate: 4 },
    maps: { height: { format: 'png', bits: 8 } },
    output: { rowZero: 'south' },
    foam: 'off',
  },
  'height alone': { maps: { height: 'exr' }, cascades: ONE_TILE, foam: 'off' },
  'height with maps that follow from it': {
    maps: {
      height: { format: 'exr', sample: 'float' },
      velocity: 'exr',
      strain: 'exr',
      normal: { format: 'png', bits: 16 },
      jacobian: 'exr',
    },
    cascades: ONE_TILE,
    foam: 'off',
  },
  'slope alone': { maps: { slope: 'exr' }, cascades: ONE_TILE, foam: 'off' },
  steep: {
    shaping: { horizontalScale: 2.5 },
    maps: { displacement: 'exr', normal: { format: 'png', bits: 16 }, jacobian: 'exr', foam: 'png' },
  },
  'vertical only': {
    shaping: { horizontalScale: 0 },
    maps: { displacement: 'exr', normal: 'png' },
    foam: 'off',
  },
  clipped: {
    cascades: ONE_TILE,
    maps: { displacement: { format: 'png', bits: 16, range: '0.25 m' }, normal: { format: 'png', bits: 8 } },
    foam: 'off',
  },
  'foam kept': { foam: { coverage: 0.05, residue: 'keep', decayTime: 3 } },
  'foam by level': { foam: { breakingLevel: 0.6 }, cascades: ONE_TILE },
  'gains and little against the wind': {
    shaping: { againstWind: 0.1, bandGains: [{ longest: 3, shortest: 1.5, gain: 1.6 }] },
    maps: { displacement: 'exr' },
    foam: 'off',
  },
});

/** A folder that bakes are made in; `remove` it when the tests are over. */
export interface BakeShelf {
  /** The folder of a small bake, made when it is first asked for; by the default engine unless another is named. */
  readonly bake: (name: keyof typeof SMALL_SEAS, changes?: Keys, engine?: EngineName) => Promise<string>;
  readonly remove: () => void;
}

export function bakeShelf(): BakeShelf {
  const root = mkdtempSync(join(tmpdir(), 'loopswell-small-'));
  let made = 0;
  const shelf = new Map<string, string>();
  return {
    async bake(name, changes = {}, engine = PLAN_DEFAULTS.engine) {
      const key = JSON.stringify([name, changes, engine]);
      const before = shelf.get(key);
      if (before !== undefined) return before;
      const folder = join(root, String(made++));
      mkdirSync(folder);
      const keys = { ...SMALL_SEA_KEYS, ...SMALL_SEAS[name], ...changes };
      await bake(planBake(seaFromObject(keys, { source: name }), { engine }), folder, { threads: 0 });
      shelf.set(key, folder);
      return folder;
    },
    remove: () => rmSync(root, { recursive: true, force: true }),
  };
}
