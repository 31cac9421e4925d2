import { codecFor } from '../codec/registry.ts';
import { float64Engine } from '../field/float64-engine.ts';
import type { FieldName, FrameFields } from '../field/frame-fields.ts';
import { type Synthesis, synthesis } from '../field/synthesis.ts';
import type { ChannelSpec, Decode, Image } from '../image/image.ts';
import { type ChannelStatistics, ditherPattern, encodedMap } from '../maps/encoded-map.ts';
import { FOAM_FIELDS, FRAME_MAPS, type FrameMapName } from '../maps/quantity-values.ts';
import { fillJacobian } from '../maps/surface.ts';
import { isSurveyed } from '../plan/encodings.ts';
import type { CascadeFoam, Plan, PlannedCascade, PlannedMap } from '../plan/plan.ts';
import { CAUTION, VERSION } from '../version.ts';
import type { WaveAmplitudes } from '../waves/wave-amplitudes.ts';

/** The images of any frame of one cascade. Holds the cascade's buffers; one caller at a time. */
export interface CascadeMaker {
  fields(frame: number): FrameFields;
  /** One map of the frame whose fields are given. */
  map(planned: PlannedMap, fields: FrameFields, surveyed: readonly Decode[] | undefined): MadeMap;
  /** Largest magnitude of each channel of a map, in the channel's unit; of J - 1 for `jacobian`. */
  extents(planned: PlannedMap, fields: FrameFields): readonly number[];
  /** J of the frame as 16-bit codes, field order; the maker's own buffer. */
  jacobianCodes(fields: FrameFields, foam: CascadeFoam): Uint16Array;
}

export interface MadeMap {
  readonly image: Image;
  readonly statistics: readonly ChannelStatistics[];
}

/**
 * Sets up one cascade for making frames.
 *
 * @param plan the plan
 * @param cascade one of its cascades
 * @param waves the cascade's wave amplitudes
 */
export function cascadeMaker(plan: Plan, cascade: PlannedCascade, waves: WaveAmplitudes): CascadeMaker {
  const N = cascade.resolution;
  const frameMaps = cascade.maps.filter(({ map }) => map !== 'foam');
  const wanted = new Set<FieldName>(frameMaps.flatMap(({ map }) => FRAME_MAPS[map as FrameMapName].fields));
  if (cascade.foam !== null) for (const field of FOAM_FIELDS) wanted.add(field);
  const surface: Synthesis = synthesis(waves, float64Engine(N), {
    depthM: plan.water.depthM,
    horizontalScale: plan.shaping.horizontalScale,
    fields: wanted,
  });
  const planes: Float64Array[] = [];
  const scratch = (index: number): Float64Array => {
    planes[index] ??= new Float64Array(N * N);
    return planes[index];
  };
  const dithers = new Map<string, readonly Float32Array[]>();
  const dither = ({ map, dither: wantsDither, channels }: PlannedMap): readonly Float32Array[] | null => {
    if (!wantsDither) return null;
    const made = dithers.get(map) ?? channels.map(({ name }) => ditherPattern(N, `${map}.${name}`));
    dithers.set(map, made);
    return made;
  };
  const codes = new Uint16Array(N * N);

  return {
    fields: (frame) => surface.frame(frame),
    map(planned, fields, surveyed) {
      const values = FRAME_MAPS[planned.map as FrameMapName].values(fields, scratch);
      return encodedMap(values, {
        resolution: N,
        sample: planned.sample,
        channels: decodedChannels(planned, surveyed),
        rowZero: plan.output.rowZero,
        dither: dither(planned),
      });
    },
    extents(planned, fields) {
      const values = FRAME_MAPS[planned.map as FrameMapName].values(fields, scratch);
      return planned.channels.map(({ quantity, unit }) => {
        const centre = quantity === 'jacobian' ? 1 : 0;
        const perSi = unit === 'cm' || unit === 'cm/s' ? 100 : 1;
        let largest = 0;
        for (const value of values.get(quantity) ?? []) largest = Math.max(largest, Math.abs(value - centre));
        return largest * perSi;
      });
    },
    jacobianCodes(fields, { jacobianCodes: { zeroJ, stepJ } }) {
      const J = scratch(0);
      fillJacobian(J, fields);
      for (let i = 0; i < J.length; i++) {
        codes[i] = Math.min(65535, Math.max(0, Math.round((J[i] - zeroJ) / stepJ)));
      }
      return codes;
    },
  };
}

/** A map's channels with the decode rules a survey found filled in. */
export function decodedChannels(
  planned: PlannedMap,
  surveyed: readonly Decode[] | undefined,
): readonly ChannelSpec[] {
  if (isSurveyed(planned)) return planned.channels;
  return planned.channels.map((channel, c) => ({
    ...channel,
    decode: channel.decode ?? (surveyed as Decode[])[c],
  }));
}

/** The file of one map of one frame: its path below the bake folder and its bytes. */
export function encodedFile(
  plan: Plan,
  cascade: PlannedCascade,
  planned: PlannedMap,
  image: Image,
  frame: number,
): { readonly path: string; readonly bytes: Uint8Array } {
  const frameNumber = plan.loop.firstFrame + frame;
  const bytes = codecFor(planned.format).encode(image, {
    software: `loopswell ${VERSION}`,
    frameRate: cascade.loop.frameRate,
    frameNumber,
    comments: `${plan.title}: ${planned.map} of cascade ${cascade.id}. ${CAUTION}`,
    attributes: {
      cascade: cascade.id,
      patchLengthM: cascade.patchLengthM,
      frameCount: cascade.loop.frameCount,
      planHash: plan.hash,
    },
  });
  return { path: framePath(planned.pattern, frameNumber), bytes };
}

/** A printf pattern's path for one frame number, e.g. `c0/foam.%04d.png` and 7: `c0/foam.0007.png`. */
export function framePath(pattern: string, frameNumber: number): string {
  return pattern.replace(/%0(\d+)d/, (_, digits: string) =>
    String(frameNumber).padStart(Number(digits), '0'),
  );
}
