import { seaFromObject } from '../../src/sea/parse.ts';
import type { Sea } from '../../src/sea/sea.ts';

// Seas small enough to bake in well under a second: grids of 32, one or two cascades, eight frames.

type Keys = Readonly<Record<string, unknown>>;

/** One cascade of 32 x 32 over 30 m, 8 frames of 1 s; a wind sea of 2.4 s with foam by a stated coverage. */
export const TINY_SEA_KEYS: Keys = Object.freeze({
  seaFile: 1,
  title: 'Tiny wind sea',
  seed: 3,
  systems: [{ kind: 'wind-sea', from: 250, significantHeight: 0.35, peakPeriod: 2.4, windSpeed: 7 }],
  loop: { frames: 8, frameRate: 1 },
  cascades: [{ patch: 30, resolution: 32 }],
  foam: { coverage: 0.02 },
  maps: { displacement: 'exr', normal: 'png', foam: 'png' },
});

/** A tiny sea with some keys of its sea file replaced; `undefined` removes one. */
export function tinySea(changes: Keys = {}): Sea {
  return seaFromObject({ ...TINY_SEA_KEYS, ...changes }, { source: 'tiny sea' });
}

/** Two cascades of 32 x 32; the finer one loops twice in the whole loop. */
export function tinyTwoCascadeSea(changes: Keys = {}): Sea {
  return tinySea({
    title: 'Tiny wind sea in two cascades',
    cascades: [
      { patch: 30, resolution: 32 },
      { patch: 6.3, resolution: 32, loop: { frames: 8, frameRate: 2 } },
    ],
    ...changes,
  });
}

/** Every map of every kind, in 16-bit PNG where the kind allows. */
export function tinyEveryMapSea(changes: Keys = {}): Sea {
  return tinySea({
    title: 'Tiny wind sea with every map',
    maps: {
      displacement: { format: 'png', bits: 16 },
      height: 'png',
      velocity: 'exr',
      slope: 'png',
      strain: { format: 'exr', sample: 'float' },
      normal: { format: 'png', bits: 16 },
      jacobian: 'png',
      foam: 'png',
    },
    ...changes,
  });
}

/** A swell across a wind sea on shallow water with a current: everything that breaks the symmetry of still water. */
export function tinyCurrentSea(changes: Keys = {}): Sea {
  return tinySea({
    title: 'Tiny crossing sea on a current',
    water: { depth: 2, current: { speed: 0.8, toward: 70 } },
    systems: [
      { kind: 'wind-sea', from: 200, windSpeed: 6, fetch: 3000 },
      { kind: 'swell', from: 310, significantHeight: 0.15, peakPeriod: 3 },
    ],
    ...changes,
  });
}

/** The text of a tiny sea file, for tests of commands. */
export const TINY_SEA_YAML = `seaFile: 1
title: Tiny wind sea
seed: 3
systems:
  - kind: wind-sea
    from: 250 deg
    significantHeight: 0.35 m
    peakPeriod: 2.4 s
    windSpeed: 7 m/s
loop: { frames: 8, frameRate: 1 }
cascades:
  - patch: 30 m
    resolution: 32
foam: { coverage: 2 % }
maps: { displacement: exr, normal: png, foam: png }
`;
