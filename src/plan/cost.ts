import { SAMPLE_BYTES } from '../image/image.ts';
import type { CostReport, EngineName, PlannedCascade, PlannedMap } from './plan.ts';

/**
 * Written bytes per raw byte by map and sample, measured on the shipped presets (DEVELOPERS.md, "Sizes"): wave fields
 * are nearly incompressible noise on their low bits, foam is mostly zero.
 */
const COMPRESSION: Readonly<Record<string, number>> = {
  half: 0.75,
  float: 0.94,
  uint16: 0.8,
  uint8: 0.6,
  foam: 0.12,
};

/** Seconds of one core a texel and frame, float64 engine; measured on the presets (DEVELOPERS.md, "Time"). */
const SECONDS_PER_TRANSFORM_TEXEL = 3.5e-8;
const SECONDS_PER_STORED_BYTE = 2.2e-8;
const SECONDS_PER_FOAM_TEXEL = 2.5e-8;
/** Starting up, planning and gathering, s. */
const FIXED_SECONDS = 0.8;

/** Transforms of N x N complex numbers a frame needs, by map; shared fields are counted once. */
const TRANSFORMS: Readonly<Record<string, readonly string[]>> = {
  displacement: ['displacement', 'height'],
  height: ['height'],
  velocity: ['velocity', 'velocity-up'],
  slope: ['slope'],
  strain: ['strain', 'height'],
  normal: ['slope', 'strain', 'height'],
  jacobian: ['strain', 'height'],
  foam: ['strain', 'height'],
};

/** What a bake will take: files, disk, memory and time, before it starts. */
export function costReport(cascades: readonly PlannedCascade[], engine: EngineName): CostReport {
  let files = 0;
  let outputBytes = 0;
  let scratchBytes = 0;
  let sharedBytes = 0;
  let bytesPerThread = 0;
  let coreSeconds = FIXED_SECONDS;
  for (const cascade of cascades) {
    const texels = cascade.resolution ** 2;
    const { frameCount } = cascade.loop;
    const pairs = new Set(cascade.maps.flatMap(({ map }) => TRANSFORMS[map]));
    const storedBytes = cascade.maps.reduce(
      (sum, map) => sum + texels * map.channels.length * SAMPLE_BYTES[map.sample],
      0,
    );
    files += frameCount * cascade.maps.length;
    outputBytes += frameCount * cascade.maps.reduce((sum, map) => sum + writtenBytes(map, texels), 0);
    if (cascade.foam !== null) scratchBytes += frameCount * texels * 2;
    sharedBytes += texels * 20;
    const buffers = bufferBytes(engine, texels, pairs.size, storedBytes);
    bytesPerThread = engine === 'float32' ? Math.max(bytesPerThread, buffers) : bytesPerThread + buffers;
    coreSeconds +=
      frameCount *
      (texels * Math.log2(texels) * 0.0625 * pairs.size * SECONDS_PER_TRANSFORM_TEXEL +
        storedBytes * SECONDS_PER_STORED_BYTE +
        (cascade.foam === null ? 0 : texels * SECONDS_PER_FOAM_TEXEL));
  }
  return {
    files,
    outputBytes: Math.round(outputBytes),
    scratchBytes,
    sharedBytes,
    bytesPerThread,
    coreSeconds,
  };
}

/**
 * Memory in which one thread makes the frames of one cascade. Measured at 256 to 2048 texels (test/built/threads.test.ts
 * compares it with what a bake takes); the cascades of a thread share that of the float32 engine.
 */
function bufferBytes(engine: EngineName, texels: number, pairs: number, storedBytes: number): number {
  if (engine === 'float32') return 56 * texels + 2 * storedBytes;
  // Two spectra, the packed pair, the engine's buffer, two fields a pair, three scratch planes, and the encoder's.
  return texels * (16 * 4 + 16 * pairs + 24) + 3 * storedBytes;
}

function writtenBytes(map: PlannedMap, texels: number): number {
  const raw = texels * map.channels.length * SAMPLE_BYTES[map.sample];
  return raw * COMPRESSION[map.map === 'foam' ? 'foam' : map.sample];
}
