import { describe, expect, it } from 'vitest';
import {
  FIELD_PAIRS,
  heldPairs,
  type PairSources,
  pairStore,
  pairsOf,
} from '../../../src/field/float32-pairs.ts';
import { FIELD_NAMES, type FieldName } from '../../../src/field/frame-fields.ts';
import { LINE, stripsBytes } from '../../../src/kernel/wave/layout.ts';
import type { WaveProgram } from '../../../src/kernel/wave/wave-kernel.ts';

const ALL: ReadonlySet<FieldName> = new Set(FIELD_NAMES);

/** A store over a program that only notes where it was asked to transform a pair to. */
function notedStore(slots: readonly number[], fields = ALL, shearScale = 4) {
  const made: number[] = [];
  const program = {
    transformGradient: (...args: number[]) => made.push(args[4]),
    transformHeight: (...args: number[]) => made.push(args[5]),
    transformStrain: (...args: number[]) => made.push(args[4]),
  } as unknown as WaveProgram;
  const waves = { plan: 1, gain: 2, shearScale };
  const sources = { plan: 0, waves, height: 3, rate: 4 } as unknown as PairSources;
  const store = pairStore(
    program,
    fields,
    () => sources,
    () => slots,
  );
  return { store, made };
}

describe('pairs of fields', () => {
  it('hold every field once', () => {
    const fields = FIELD_PAIRS.flatMap(({ first, second }) => (second === null ? [first] : [first, second]));
    expect(fields.sort()).toEqual([...FIELD_NAMES].sort());
  });

  it('are only those that hold a wanted field', () => {
    const pairs = pairsOf(new Set<FieldName>(['strainEastNorth', 'velocityUp']));
    expect(pairs.map(({ first }) => first)).toEqual(['height', 'velocityUp']);
  });

  it('are held all where there is room, else as many as fit, but never fewer than a map reads', () => {
    const bytes = stripsBytes(64);
    expect(heldPairs(6, 64, 6 * bytes)).toBe(6);
    expect(heldPairs(6, 64, 5 * bytes)).toBe(5);
    expect(heldPairs(6, 64, 3 * bytes)).toBe(3);
    expect(heldPairs(2, 64, 100 * bytes)).toBe(2);
    expect(() => heldPairs(6, 64, 3 * bytes - 1)).toThrow('do not fit');
    expect(() => heldPairs(1, 64, bytes - 1)).toThrow('do not fit');
  });
});

describe('a pair store', () => {
  it('transforms a pair once a frame', () => {
    const { store, made } = notedStore([1000, 2000]);
    expect(store.place('slopeEast')).toEqual({ address: 1000, unscale: 1 });
    expect(store.place('slopeNorth')).toEqual({ address: 1000 + LINE / 2, unscale: 1 });
    expect(made).toEqual([1000]);
    store.forget();
    store.place('slopeEast');
    expect(made).toEqual([1000, 1000]);
  });

  it('undoes the scale of the shear, to nothing where there is none', () => {
    expect(notedStore([0]).store.place('strainEastNorth').unscale).toBe(1 / 4);
    expect(notedStore([0], ALL, 0).store.place('strainEastNorth').unscale).toBe(0);
    expect(notedStore([0]).store.place('height').unscale).toBe(1);
  });

  it('gives up the pair that was not asked for longest', () => {
    const { store, made } = notedStore([1, 2, 3]);
    store.place('displacementEast');
    store.place('height');
    store.place('slopeEast');
    // Asked for again: the height is now the oldest.
    store.place('displacementNorth');
    store.place('strainEastEast');
    expect(made).toEqual([1, 2, 3, 2]);
    // What one map reads together stays together: the other three are still where they were.
    expect(store.place('slopeNorth').address - LINE / 2).toBe(3);
    expect(store.place('displacementEast').address).toBe(1);
    expect(store.place('strainNorthNorth').address - LINE / 2).toBe(2);
    expect(made).toHaveLength(4);
    store.place('height');
    expect(made).toEqual([1, 2, 3, 2, 3]);
  });
});
