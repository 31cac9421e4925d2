import { LINE, stripsBytes } from '../kernel/wave/layout.ts';
import type { WaveProgram } from '../kernel/wave/wave-kernel.ts';
import type { Float32Waves } from './float32-waves.ts';
import type { FieldName } from './frame-fields.ts';

/** Addresses that a pair's transform reads, and where its plan lies. */
export interface PairSources {
  readonly plan: number;
  readonly waves: Float32Waves;
  readonly height: number;
  readonly rate: number;
}

/** Two fields that share a transform; the pairs are those of the float64 engine. */
export interface FieldPair {
  readonly first: FieldName;
  readonly second: FieldName | null;
  readonly transform: (program: WaveProgram, from: PairSources, wantsSecond: boolean, strips: number) => void;
}

export const FIELD_PAIRS: readonly FieldPair[] = [
  {
    first: 'displacementEast',
    second: 'displacementNorth',
    transform: (program, { plan, waves, height }, _, strips) =>
      program.transformGradient(plan, waves.plan, height, waves.gain, strips),
  },
  {
    first: 'height',
    second: 'strainEastNorth',
    transform: (program, { plan, waves, height }, wantsShear, strips) => {
      const scale = wantsShear ? waves.shearScale : 0;
      program.transformHeight(plan, waves.plan, height, waves.gain, scale, strips);
    },
  },
  {
    first: 'slopeEast',
    second: 'slopeNorth',
    transform: (program, { plan, waves, height }, _, strips) =>
      program.transformGradient(plan, waves.plan, height, 0, strips),
  },
  {
    first: 'strainEastEast',
    second: 'strainNorthNorth',
    transform: (program, { plan, waves, height }, _, strips) =>
      program.transformStrain(plan, waves.plan, height, waves.gain, strips),
  },
  {
    first: 'velocityEast',
    second: 'velocityNorth',
    transform: (program, { plan, waves, rate }, _, strips) =>
      program.transformGradient(plan, waves.plan, rate, waves.gain, strips),
  },
  {
    first: 'velocityUp',
    second: null,
    transform: (program, { plan, waves, rate }, _, strips) =>
      program.transformHeight(plan, waves.plan, rate, waves.gain, 0, strips),
  },
];

/** The pairs that hold any of some fields. */
export function pairsOf(fields: ReadonlySet<FieldName>): readonly FieldPair[] {
  return FIELD_PAIRS.filter(
    ({ first, second }) => fields.has(first) || (second !== null && fields.has(second)),
  );
}

/** Whether a pair is made from the rate of change of the waves. */
export function isMoving({ first }: FieldPair): boolean {
  return first.startsWith('velocity');
}

/** Most pairs one map reads at a time: slope, strain and shear for the normal. */
const PAIRS_AT_A_TIME = 3;

/**
 * How many pairs are held at a time: all that are wanted where memory has room, else as many as fit, which transforms a
 * pair again when a later map of the frame needs it.
 *
 * @param room bytes for strips
 * @throws RangeError where not even one map's pairs fit
 */
export function heldPairs(wanted: number, N: number, room: number): number {
  const fitting = Math.floor(room / stripsBytes(N));
  if (fitting < Math.min(wanted, PAIRS_AT_A_TIME)) {
    throw new RangeError(
      `${PAIRS_AT_A_TIME} pairs of fields of ${N} x ${N} do not fit into one WebAssembly memory`,
    );
  }
  return Math.min(wanted, fitting);
}

/** Where a field lies in the kernel: its first value and the factor that undoes its scale. */
export interface FieldPlace {
  readonly address: number;
  readonly unscale: number;
}

/** Makes pairs when they are first needed, and forgets the one longest unused where there is no room. */
export interface PairStore {
  /** Forgets all pairs: a new frame, or their memory was lent to another. */
  forget(): void;
  /** The field's place; transforms its pair unless it is there. */
  place(field: FieldName): FieldPlace;
}

/**
 * @param slots addresses of strips, each for one pair
 * @param fields those wanted at all
 */
export function pairStore(
  program: WaveProgram,
  fields: ReadonlySet<FieldName>,
  sources: () => PairSources,
  slots: () => readonly number[],
): PairStore {
  let held: { readonly pair: FieldPair; readonly strips: number }[] = [];
  const strips = (pair: FieldPair): number => {
    const found = held.find((entry) => entry.pair === pair);
    if (found !== undefined) {
      held = [...held.filter((entry) => entry !== found), found];
      return found.strips;
    }
    const all = slots();
    const free = all.find((address) => held.every((entry) => entry.strips !== address));
    const address = free ?? held[0].strips;
    held = [...held.filter((entry) => entry.strips !== address), { pair, strips: address }];
    pair.transform(program, sources(), pair.second !== null && fields.has(pair.second), address);
    return address;
  };
  return {
    forget() {
      held = [];
    },
    place(field) {
      const pair = FIELD_PAIRS.find(({ first, second }) => field === first || field === second) as FieldPair;
      const address = strips(pair);
      if (field === pair.first) return { address, unscale: 1 };
      if (field !== 'strainEastNorth') return { address: address + LINE / 2, unscale: 1 };
      const { shearScale } = sources().waves;
      return { address: address + LINE / 2, unscale: shearScale === 0 ? 0 : 1 / shearScale };
    },
  };
}
