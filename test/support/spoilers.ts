import { cpSync, readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { codecFor } from '../../src/codec/registry.ts';
import { sha256 } from '../../src/hash.ts';
import { LARGEST_CODE, type Plane, type Quantity, type SampleType } from '../../src/image/image.ts';
import { framePath } from '../../src/manifest/frame-path.ts';
import type { Manifest, ManifestCascade, ManifestChannel, ManifestMap } from '../../src/manifest/manifest.ts';
import { halfFromNumber, numberFromHalf } from '../../src/math/half.ts';
import {
  kurtosis,
  NO_VALUES,
  type PowerSums,
  powerSums,
  skewness,
  variance,
} from '../../src/math/statistics.ts';
import type { MapName } from '../../src/sea/sea.ts';
import { keyedIndices } from '../../src/verify/keyed.ts';
import { planeTransform } from '../../src/verify/plane-transform.ts';
import { CAUTION, VERSION } from '../../src/version.ts';
import { MANY_WAVES_SYSTEM, type SMALL_SEAS } from './small-bakes.ts';

// Ways to spoil a finished bake, one thing at a time, and to make its manifest fit the spoiled files.

/** The parts of a manifest that spoilers write to. */
export type Writable<T> = T extends object ? { -readonly [K in keyof T]: Writable<T[K]> } : T;

/** A bake that may be spoiled: a copy of a sound one. */
export interface SpoiledBake {
  readonly folder: string;
  readonly manifest: Writable<Manifest>;
  /** Values of every channel of a map and frame, in the channel's unit and the order of the file. */
  readonly read: (cascade: ManifestCascade, map: MapName, index: number) => Map<Quantity, Float64Array>;
  /** Stores values again, with the labels that the baker gives a file. */
  readonly write: (
    cascade: ManifestCascade,
    map: MapName,
    index: number,
    values: Map<Quantity, Float64Array>,
  ) => void;
  /** Path of a file below the bake's folder. */
  readonly path: (cascade: ManifestCascade, map: MapName, index: number) => string;
  /** Makes list, hashes and measured figures those of the files as they are, and writes the manifest. */
  readonly restate: () => void;
  /** Writes the manifest as it is. */
  readonly save: () => void;
}

/** A copy of a bake in a folder of its own. */
export function copiedBake(sound: string, folder: string): SpoiledBake {
  cpSync(sound, folder, { recursive: true });
  const manifest = JSON.parse(readFileSync(join(folder, 'manifest.json'), 'utf8')) as Writable<Manifest>;
  const path = (cascade: ManifestCascade, map: MapName, index: number): string =>
    framePath(mapOf(cascade, map).pattern, cascade.loop.firstFrame + index);
  const read = (cascade: ManifestCascade, map: MapName, index: number): Map<Quantity, Float64Array> => {
    const planned = mapOf(cascade, map);
    const file = path(cascade, map, index);
    const image = codecFor(planned.format).decode(readFileSync(join(folder, file)), file);
    return new Map(
      planned.channels.map((channel) => {
        const plane = image.planes[image.channels.indexOf(channel.name)];
        return [channel.quantity, decodedValues(plane, planned.sample, channel)];
      }),
    );
  };
  const save = (): void => writeFileSync(join(folder, 'manifest.json'), JSON.stringify(manifest, null, 1));
  return {
    folder,
    manifest,
    path,
    read,
    write(cascade, map, index, values) {
      const planned = mapOf(cascade, map);
      const planes = planned.channels.map((channel) =>
        encodedPlane(values.get(channel.quantity) ?? new Float64Array(0), planned.sample, channel),
      );
      const { resolution: width, resolution: height } = cascade;
      const frameNumber = cascade.loop.firstFrame + index;
      const image = { width, height, sample: planned.sample, channels: planned.channels, planes };
      const bytes = codecFor(planned.format).encode(image, {
        software: `loopswell ${VERSION}`,
        frameRate: cascade.loop.frameRate,
        frameNumber,
        comments: `${manifest.title}: ${map} of cascade ${cascade.id}. ${CAUTION}`,
        attributes: {
          cascade: cascade.id,
          patchLengthM: cascade.patchLengthM,
          frameCount: cascade.loop.frameCount,
          planHash: manifest.planHash,
        },
      });
      writeFileSync(join(folder, path(cascade, map, index)), bytes);
    },
    save,
    restate() {
      for (const entry of manifest.files) {
        const bytes = readFileSync(join(folder, entry.path));
        Object.assign(entry, { bytes: bytes.length, sha256: sha256(bytes) });
      }
      const heights = manifest.cascades.map((cascade) => {
        return restateFigures(cascade, (map, index) => read(cascade, map, index));
      });
      restateSea(manifest, heights);
      save();
    },
  };
}

function mapOf(cascade: ManifestCascade, map: MapName): ManifestMap {
  const planned = cascade.maps[map];
  if (planned === undefined) throw new Error(`${cascade.id} has no ${map}`);
  return planned;
}

function decodedValues(plane: Plane, sample: SampleType, { decode }: ManifestChannel): Float64Array {
  const largest = sample === 'uint8' || sample === 'uint16' ? LARGEST_CODE[sample] : 1;
  return Float64Array.from(plane, (stored) => {
    const number = sample === 'half' ? numberFromHalf(stored) : stored / largest;
    return number * decode.scale + decode.offset;
  });
}

function encodedPlane(values: Float64Array, sample: SampleType, { decode }: ManifestChannel): Plane {
  const stored = Array.from(values, (value) => (value - decode.offset) / decode.scale);
  if (sample === 'half') return Uint16Array.from(stored, halfFromNumber);
  if (sample === 'float') return Float32Array.from(stored);
  const largest = LARGEST_CODE[sample];
  const codes = stored.map((share) => Math.min(largest, Math.max(0, Math.round(share * largest))));
  return sample === 'uint8' ? Uint8Array.from(codes) : Uint16Array.from(codes);
}

/** Makes the figures of a cascade those of its files; the moments of its heights are returned, m. */
function restateFigures(
  cascade: Writable<ManifestCascade>,
  read: (map: MapName, index: number) => Map<Quantity, Float64Array>,
): PowerSums {
  const { statistics } = cascade;
  let heights = NO_VALUES;
  for (const [map, { channels }] of Object.entries(cascade.maps) as [MapName, Writable<ManifestMap>][]) {
    const all = new Map<Quantity, number[]>(channels.map(({ quantity }) => [quantity, []]));
    for (let index = 0; index < cascade.loop.frameCount; index++) {
      for (const [quantity, values] of read(map, index)) all.get(quantity)?.push(...values);
    }
    for (const { quantity, unit, written } of channels) {
      const values = all.get(quantity) ?? [];
      const mean = values.reduce((a, b) => a + b, 0) / values.length;
      const square = values.reduce((a, b) => a + (b - mean) ** 2, 0) / values.length;
      const largest = values.reduce((a, b) => Math.max(a, b), -Infinity);
      const least = values.reduce((a, b) => Math.min(a, b), Infinity);
      Object.assign(written, { min: least, max: largest, mean, deviation: Math.sqrt(square) });
      if (quantity === 'displacement-up') {
        const metres = unit === 'cm' ? 0.01 : 1;
        heights = powerSums(values.map((value) => value * metres));
        statistics.significantHeightM.measured = 4 * written.deviation * metres;
        statistics.skewness = skewness(heights);
        statistics.kurtosis = kurtosis(heights);
        statistics.largestCrestM = largest * metres;
        statistics.deepestTroughM = least * metres;
      }
      if (quantity === 'foam' && cascade.foam !== null) cascade.foam.coverage.measured = mean;
    }
  }
  return heights;
}

/** Makes the figures of the whole sea those of its cascades. */
function restateSea({ cascades, statistics }: Writable<Manifest>, heights: readonly PowerSums[]): void {
  const total = (f: (cascade: Writable<ManifestCascade>, sums: PowerSums) => number): number =>
    cascades.reduce((sum, cascade, c) => sum + f(cascade, heights[c]), 0);
  const m2 = total((_, sums) => variance(sums));
  statistics.significantHeightM.measured = Math.hypot(
    ...cascades.map((cascade) => cascade.statistics.significantHeightM.measured ?? 0),
  );
  statistics.skewness = total((_, sums) => skewness(sums) * variance(sums) ** 1.5) / m2 ** 1.5;
  statistics.kurtosis = 3 + total((_, sums) => (kurtosis(sums) - 3) * variance(sums) ** 2) / m2 ** 2;
  statistics.largestCrestBoundM = total((cascade) => cascade.statistics.largestCrestM ?? 0);
  statistics.deepestTroughBoundM = total((cascade) => cascade.statistics.deepestTroughM ?? 0);
  const foams = cascades.flatMap(({ foam }) => (foam === null ? [] : [foam.coverage.measured]));
  const clear = foams.reduce((product, coverage) => product * (1 - coverage), 1);
  statistics.foamCoverage.measured = foams.length === 0 ? null : 1 - clear;
}

/** One way to spoil a bake, and the checks that must then fail: those and no others. */
export interface Spoiler {
  readonly name: string;
  /** The small bake that is spoiled; `spoilable` where it says nothing. */
  readonly sea?: keyof typeof SMALL_SEAS;
  /** Keys of a sea that is baked beside it. */
  readonly twin?: Readonly<Record<string, unknown>>;
  readonly spoil: (bake: SpoiledBake, twin: Manifest | null) => void;
  readonly failing: readonly string[];
}

type Edit = (values: Map<Quantity, Float64Array>, index: number) => void;

/** Changes every frame of a map of c0. */
function editFrames(bake: SpoiledBake, map: MapName, edit: Edit): void {
  const [c0] = bake.manifest.cascades;
  for (let index = 0; index < c0.loop.frameCount; index++) {
    const values = bake.read(c0, map, index);
    edit(values, index);
    bake.write(c0, map, index, values);
  }
}

/** Gives every file of a map of c0 another frame's number in its name; the files stay as they are. */
function renameFrames(bake: SpoiledBake, map: MapName, numberOf: (index: number) => number): void {
  const [c0] = bake.manifest.cascades;
  const { frameCount } = c0.loop;
  const paths = Array.from({ length: frameCount }, (_, index) =>
    join(bake.folder, bake.path(c0, map, index)),
  );
  for (const path of paths) renameSync(path, `${path}.moved`);
  paths.forEach((path, index) => {
    renameSync(`${path}.moved`, paths[(numberOf(index) + frameCount) % frameCount]);
  });
}

function scaled(values: Map<Quantity, Float64Array>, quantity: Quantity, factor: number, centre = 0): void {
  const field = values.get(quantity);
  if (field === undefined) throw new Error(`no ${quantity}`);
  field.forEach((value, i) => {
    field[i] = centre + factor * (value - centre);
  });
}

/** Turns the rows of a square field over. */
function turnedOver(field: Float64Array): Float64Array {
  const N = Math.sqrt(field.length);
  return field.map((_, i) => field[(N - 1 - Math.floor(i / N)) * N + (i % N)]);
}

/** Foam made from the Jacobian map as it should be but for the loop: the first frame knows nothing of the last. */
function foamFromNothing(bake: SpoiledBake): void {
  const [c0] = bake.manifest.cascades;
  const { foam, loop } = c0;
  if (foam === null) throw new Error('no foam');
  const d = Math.exp(-loop.seconds / loop.frameCount / foam.decayTimeS);
  const r = foam.loopResidue;
  let before: Float64Array | null = null;
  editFrames(bake, 'foam', (values, index) => {
    const J = bake.read(c0, 'jacobian', index).get('jacobian') ?? new Float64Array(0);
    const f: Float64Array = J.map((j, i) => {
      const source = Math.min(1, Math.max(0, (foam.breakingJ - j) / foam.rampJ));
      return Math.max(source, before === null ? 0 : d * before[i]);
    });
    values.set(
      'foam',
      f.map((share) => Math.max(0, (share - r) / (1 - r))),
    );
    before = f;
  });
}

/** Removes the waves of some lengths from a field. */
function takeOut(field: Float64Array, shortestM: number, longestM: number, patchLengthM: number): void {
  const N = Math.sqrt(field.length);
  const transform = planeTransform(N);
  const F = new Float64Array(2 * N * N);
  transform.fillCoefficients(F, field, null);
  for (let i = 0; i < N * N; i++) {
    const [nx, ny] = [i % N, Math.floor(i / N)].map((n) => (n < N / 2 ? n : n - N));
    const length = patchLengthM / Math.hypot(nx, ny);
    if (length >= shortestM && length <= longestM) F.fill(0, 2 * i, 2 * i + 2);
  }
  transform.synthesise(F);
  for (let i = 0; i < N * N; i++) field[i] = F[2 * i];
}

/** Everything that is spoiled in a bake, one at a time; its two cascades have every map. */
export const SPOILERS: readonly Spoiler[] = [
  {
    name: 'channels east and north of the displacement swapped',
    spoil(bake) {
      editFrames(bake, 'displacement', (values) => {
        const [east, north] = [values.get('displacement-east'), values.get('displacement-north')];
        values
          .set('displacement-east', north as Float64Array)
          .set('displacement-north', east as Float64Array);
      });
      bake.restate();
    },
    failing: ['horizontal', 'derivatives', 'foam', 'spot'],
  },
  {
    name: 'rows of the displacement turned over',
    spoil(bake) {
      editFrames(bake, 'displacement', (values) => {
        for (const [quantity, field] of values) values.set(quantity, turnedOver(field));
      });
      bake.restate();
    },
    failing: ['direction', 'horizontal', 'derivatives', 'foam', 'spot'],
  },
  {
    name: 'the other row zero in the manifest',
    spoil(bake) {
      bake.manifest.conventions.rowZero = 'south';
      bake.restate();
    },
    failing: ['direction', 'horizontal', 'derivatives', 'foam', 'spot'],
  },
  {
    name: 'two frames of the displacement exchanged',
    spoil(bake) {
      // One of those that are looked at texel by texel, and the next: the keys follow the plan, which may change.
      const [c0] = bake.manifest.cascades;
      const [a] = keyedIndices(8, c0.loop.frameCount, `${bake.manifest.planHash} ${c0.id}`);
      const b = (a + 1) % c0.loop.frameCount;
      renameFrames(bake, 'displacement', (index) => (index === a ? b : index === b ? a : index));
      bake.restate();
    },
    failing: ['labels', 'loop', 'dispersion', 'derivatives', 'foam', 'spot'],
  },
  {
    name: 'the displacement one frame late',
    spoil(bake) {
      renameFrames(bake, 'displacement', (index) => index + 1);
      bake.restate();
    },
    failing: ['labels', 'derivatives', 'foam', 'spot'],
  },
  {
    name: 'the normals one frame late',
    spoil(bake) {
      renameFrames(bake, 'normal', (index) => index + 1);
      bake.restate();
    },
    failing: ['labels', 'derivatives', 'spot'],
  },
  {
    name: 'the displacement backwards',
    spoil(bake) {
      renameFrames(bake, 'displacement', (index) => -index);
      bake.restate();
    },
    failing: ['labels', 'direction', 'derivatives', 'foam', 'spot'],
  },
  {
    name: 'a scale in the manifest 1 % too large',
    spoil(bake) {
      const channel = bake.manifest.cascades[0].maps.displacement?.channels.find(({ name }) => name === 'B');
      if (channel !== undefined) channel.decode.scale *= 1.01;
      bake.restate();
    },
    failing: ['labels', 'heights', 'horizontal', 'derivatives', 'spot'],
  },
  {
    name: 'a frame dropped',
    spoil(bake) {
      rmSync(join(bake.folder, bake.path(bake.manifest.cascades[0], 'displacement', 6)));
    },
    failing: ['files'],
  },
  {
    name: 'a frame dropped and forgotten',
    spoil(bake) {
      const path = bake.path(bake.manifest.cascades[0], 'normal', 6);
      rmSync(join(bake.folder, path));
      bake.manifest.files = bake.manifest.files.filter((file) => file.path !== path);
      bake.save();
    },
    failing: ['files'],
  },
  {
    name: 'a byte changed',
    spoil(bake) {
      const path = join(bake.folder, bake.path(bake.manifest.cascades[0], 'slope', 3));
      const bytes = readFileSync(path);
      bytes[bytes.length - 200] ^= 1;
      writeFileSync(path, bytes);
    },
    failing: ['files'],
  },
  {
    name: 'a frame that the list does not know',
    spoil(bake) {
      const [c0] = bake.manifest.cascades;
      const path = (index: number): string => join(bake.folder, bake.path(c0, 'slope', index));
      cpSync(path(0), path(c0.loop.frameCount));
    },
    failing: ['files'],
  },
  {
    name: 'a PNG that asks to be converted as colour',
    spoil(bake) {
      const path = join(bake.folder, bake.path(bake.manifest.cascades[0], 'normal', 2));
      const bytes = readFileSync(path);
      // gAMA of 1/2.2 behind IHDR, which ends at byte 33.
      const gamma = Buffer.from('0000000467414d410000b18f0bfc6105', 'hex');
      writeFileSync(path, Buffer.concat([bytes.subarray(0, 33), gamma, bytes.subarray(33)]));
      bake.restate();
    },
    failing: ['files'],
  },
  {
    name: 'foam that starts from nothing at the loop point',
    spoil(bake) {
      foamFromNothing(bake);
      bake.restate();
    },
    failing: ['foam'],
  },
  {
    name: 'foam one frame late',
    spoil(bake) {
      renameFrames(bake, 'foam', (index) => index + 1);
      bake.restate();
    },
    failing: ['labels', 'foam'],
  },
  {
    name: 'foam a tenth thinner',
    spoil(bake) {
      editFrames(bake, 'foam', (values) => scaled(values, 'foam', 0.9));
      bake.restate();
    },
    failing: ['foam'],
  },
  {
    name: 'foam of more than everything in the manifest',
    spoil(bake) {
      const [channel] = bake.manifest.cascades[0].maps.foam?.channels ?? [];
      channel.decode.scale = 1.2;
      bake.restate();
    },
    failing: ['labels', 'foam'],
  },
  {
    name: 'the horizontal displacement turned round',
    spoil(bake) {
      editFrames(bake, 'displacement', (values) => {
        scaled(values, 'displacement-east', -1);
        scaled(values, 'displacement-north', -1);
      });
      bake.restate();
    },
    failing: ['horizontal', 'derivatives', 'foam', 'spot'],
  },
  {
    name: 'the velocity turned round',
    spoil(bake) {
      editFrames(bake, 'velocity', (values) => {
        for (const quantity of values.keys()) scaled(values, quantity, -1);
      });
      bake.restate();
    },
    failing: ['derivatives', 'spot'],
  },
  {
    name: 'the green of the normals turned over',
    spoil(bake) {
      editFrames(bake, 'normal', (values) => scaled(values, 'normal-north', -1));
      bake.restate();
    },
    failing: ['derivatives', 'spot'],
  },
  {
    name: 'the slope 1 % too steep',
    spoil(bake) {
      editFrames(bake, 'slope', (values) => scaled(values, 'slope-east', 1.01));
      bake.restate();
    },
    failing: ['derivatives', 'spot'],
  },
  {
    name: 'the shear of the strain turned round',
    spoil(bake) {
      editFrames(bake, 'strain', (values) => scaled(values, 'strain-east-north', -1));
      bake.restate();
    },
    failing: ['derivatives', 'spot'],
  },
  {
    name: 'the Jacobian 1 % too deep',
    spoil(bake) {
      editFrames(bake, 'jacobian', (values) => scaled(values, 'jacobian', 1.01, 1));
      bake.restate();
    },
    failing: ['derivatives', 'spot'],
  },
  {
    name: 'a step at the seam of the height',
    spoil(bake) {
      editFrames(bake, 'displacement', (values) => {
        const up = values.get('displacement-up') as Float64Array;
        const N = Math.sqrt(up.length);
        const slant = 0.3 / N;
        up.forEach((value, i) => {
          up[i] = value + slant * ((i % N) - (N - 1) / 2);
        });
      });
      bake.restate();
    },
    failing: ['tile', 'heights', 'dispersion', 'horizontal', 'derivatives', 'spot'],
  },
  {
    name: 'a height that sinks through the loop',
    spoil(bake) {
      const { frameCount } = bake.manifest.cascades[0].loop;
      editFrames(bake, 'displacement', (values, index) => {
        const up = values.get('displacement-up') as Float64Array;
        up.forEach((value, i) => {
          up[i] = value - (0.5 * index) / frameCount;
        });
      });
      bake.restate();
    },
    failing: ['loop', 'heights', 'dispersion', 'spot'],
  },
  {
    name: 'waves of 6 to 8 m taken out of the displacement',
    sea: 'many waves',
    spoil(bake) {
      editFrames(bake, 'displacement', (values) => {
        for (const field of values.values()) takeOut(field, 6, 8, bake.manifest.cascades[0].patchLengthM);
      });
      bake.restate();
    },
    failing: ['heights', 'spectrum', 'spot'],
  },
  {
    name: 'a wave system turned by 20 degrees',
    sea: 'many waves',
    twin: { systems: [{ ...MANY_WAVES_SYSTEM, from: MANY_WAVES_SYSTEM.from + 20 }] },
    spoil(bake, twin) {
      if (twin === null) throw new Error('no twin');
      // The files of one sea with all that a manifest says of the sea of the other.
      const { planHash, files } = bake.manifest;
      Object.assign(bake.manifest, structuredClone(twin), { planHash, files });
      bake.restate();
    },
    failing: ['direction', 'spot'],
  },
  {
    name: 'half the depth in the manifest',
    spoil(bake) {
      bake.manifest.sea.water.depthM = (bake.manifest.sea.water.depthM as number) / 2;
      bake.save();
    },
    failing: ['sea', 'waves', 'dispersion', 'horizontal', 'derivatives', 'spot'],
  },
  {
    name: 'another seed in the manifest',
    spoil(bake) {
      bake.manifest.sea.seed += 1;
      bake.save();
    },
    failing: ['waves', 'spot'],
  },
  {
    name: 'a figure of the manifest changed',
    spoil(bake) {
      const channel = bake.manifest.cascades[0].maps.slope?.channels[0];
      if (channel !== undefined) channel.written.max *= 1.001;
      bake.save();
    },
    failing: ['figures'],
  },
  {
    name: 'a height of a wave system changed',
    spoil(bake) {
      bake.manifest.sea.systems[0].significantHeightM *= 1.01;
      bake.save();
    },
    failing: ['sea'],
  },
  {
    name: 'a higher sea expected',
    spoil(bake) {
      bake.manifest.cascades[0].statistics.significantHeightM.expected *= 1.001;
      bake.save();
    },
    failing: ['sea', 'waves', 'heights'],
  },
  {
    name: 'half the coverage asked for',
    spoil(bake) {
      const { foam } = bake.manifest.cascades[0];
      if (foam !== null) foam.coverage.target = (foam.coverage.target ?? 0) / 2;
      bake.save();
    },
    failing: ['foam'],
  },
];
