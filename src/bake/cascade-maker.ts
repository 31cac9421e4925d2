import { UnavailableError } from '../errors.ts';
import { type Float32Engine, float32Engine } from '../field/float32-engine.ts';
import type { FieldName } from '../field/frame-fields.ts';
import type { SynthesisOptions } from '../field/synthesis.ts';
import { simdAvailable } from '../kernel/kernel-binary.ts';
import { ditherPattern, type EncodedMap, type MapStorage } from '../maps/encoded-map.ts';
import { FOAM_FIELDS, FRAME_MAPS, type FrameMapName } from '../maps/quantity-values.ts';
import type { EngineName, Plan, PlannedCascade, PlannedMap } from '../plan/plan.ts';
import type { WaveAmplitudes } from '../waves/wave-amplitudes.ts';
import { float32Maker } from './float32-maker.ts';
import { float64Maker } from './float64-maker.ts';
import { writtenChannels } from './written-channels.ts';

/** The maps of any frame of one cascade. Holds the cascade's buffers; one caller at a time. */
export interface CascadeMaker {
  /** Turns to frame n of the loop; the other calls speak of that frame, until the next turn of any maker of the thread. */
  turnTo(n: number): void;
  /** All maps but foam, in the plan's order, one when the last was taken. */
  maps(): Iterable<EncodedMap & { readonly planned: PlannedMap }>;
  /** Largest magnitude of each channel of a map, in the channel's unit; of J - 1 for `jacobian`. */
  extents(planned: PlannedMap): readonly number[];
  /** J as 16-bit codes, row 0 south; the maker's own buffer. */
  jacobianCodes(): Uint16Array;
}

/** What a maker is made from. */
export interface MakerParts {
  readonly plan: Plan;
  readonly cascade: PlannedCascade;
  readonly waves: WaveAmplitudes;
  readonly options: SynthesisOptions;
  /** Maps that frames make on their own: all but foam. */
  readonly frameMaps: readonly PlannedMap[];
  /** How a map is stored; dither patterns are made once. */
  readonly storage: (planned: PlannedMap) => MapStorage;
}

/** Makes the makers of one thread, which share the float32 engine's memory. */
export function cascadeMakers(plan: Plan, waves: readonly WaveAmplitudes[]): (c: number) => CascadeMaker {
  requireEngine(plan.engine);
  const makers = new Map<number, CascadeMaker>();
  let engine: Float32Engine | null = null;
  return (c) => {
    const made = makers.get(c);
    if (made !== undefined) return made;
    const parts = makerParts(plan, plan.cascades[c], waves[c]);
    if (plan.engine === 'float32') engine ??= float32Engine();
    const maker = engine === null ? float64Maker(parts) : float32Maker(parts, engine);
    makers.set(c, maker);
    return maker;
  };
}

/** @throws UnavailableError (69) where this machine cannot run a plan's engine: another would write other bytes */
export function requireEngine(engine: EngineName): void {
  if (engine === 'float32' && !simdAvailable()) {
    throw new UnavailableError(
      'The float32 engine needs WebAssembly SIMD, which this machine or its Node does not have. Plan the sea with --engine float64, which is slower and runs everywhere.',
    );
  }
}

function makerParts(plan: Plan, cascade: PlannedCascade, waves: WaveAmplitudes): MakerParts {
  const frameMaps = cascade.maps.filter(({ map }) => map !== 'foam');
  const fields = new Set<FieldName>(frameMaps.flatMap(({ map }) => FRAME_MAPS[map as FrameMapName].fields));
  if (cascade.foam !== null) for (const field of FOAM_FIELDS) fields.add(field);
  const storages = new Map<PlannedMap, MapStorage>();
  return {
    plan,
    cascade,
    waves,
    frameMaps,
    options: { depthM: plan.water.depthM, horizontalScale: plan.shaping.horizontalScale, fields },
    storage(planned) {
      const made = storages.get(planned) ?? mapStorage(plan, cascade, planned);
      storages.set(planned, made);
      return made;
    },
  };
}

function mapStorage(plan: Plan, { resolution }: PlannedCascade, planned: PlannedMap): MapStorage {
  const { map, sample, channels, dither } = planned;
  return {
    resolution,
    sample,
    channels: writtenChannels(planned),
    rowZero: plan.output.rowZero,
    dither: dither ? channels.map(({ name }) => ditherPattern(resolution, `${map}.${name}`)) : null,
  };
}
