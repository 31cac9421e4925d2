import { expect, it } from 'vitest';
import { float32Engine } from '../../../src/field/float32-engine.ts';
import { float64Engine } from '../../../src/field/float64-engine.ts';
import { FIELD_NAMES, type FrameFields } from '../../../src/field/frame-fields.ts';
import { synthesis } from '../../../src/field/synthesis.ts';
import type { ChannelSpec, Quantity, SampleType, Unit } from '../../../src/image/image.ts';
import { ditherPattern, encodedMap, type MapStorage } from '../../../src/maps/encoded-map.ts';
import { FRAME_MAPS, type FrameMapName } from '../../../src/maps/quantity-values.ts';
import { jacobianCodesRequest, sampledMaps } from '../../../src/maps/sampled-map.ts';
import { halfStep, numberFromHalf } from '../../../src/math/half.ts';
import { centredDecode, jacobianDecode } from '../../../src/plan/encodings.ts';
import { describeKernel } from '../../support/kernels.ts';
import { randomWaves } from '../../support/random-waves.ts';

const MAPS: Readonly<Record<FrameMapName, readonly Quantity[]>> = {
  displacement: ['displacement-east', 'displacement-north', 'displacement-up'],
  height: ['height'],
  velocity: ['velocity-east', 'velocity-north', 'velocity-up'],
  slope: ['slope-east', 'slope-north'],
  strain: ['strain-east-east', 'strain-north-north', 'strain-east-north'],
  normal: ['normal-east', 'normal-north', 'normal-up'],
  jacobian: ['jacobian'],
};
const NAMES = Object.keys(MAPS) as FrameMapName[];
const OPTIONS = { depthM: 30, horizontalScale: 1, fields: new Set(FIELD_NAMES) } as const;

/** Both engines' frame of one random sea, and both engines' way of storing a map. */
function bothEngines(N: number, frame: number) {
  const waves = randomWaves({ resolution: N, current: true });
  let fields: FrameFields | null = null;
  const surface = float32Engine().synthesis(waves, OPTIONS);
  surface.turnTo(frame);
  return {
    surface,
    reference(map: FrameMapName, storage: MapStorage) {
      fields ??= synthesis(waves, float64Engine(N), OPTIONS).frame(frame);
      const scratch: Float64Array[] = [];
      const values = FRAME_MAPS[map].values(fields, (i) => {
        scratch[i] ??= new Float64Array(N * N);
        return scratch[i];
      });
      return encodedMap(values, storage);
    },
  };
}

function storageOf(
  map: FrameMapName,
  N: number,
  sample: SampleType,
  changes: Partial<MapStorage> & { readonly unit?: Unit; readonly extent?: number } = {},
): MapStorage {
  const { unit = '1', extent = 0.5, ...rest } = changes;
  const channels = MAPS[map].map((quantity, c): ChannelSpec => {
    const sign = c === 1 ? -1 : 1;
    let decode = { scale: sign, offset: 0 };
    if (sample === 'uint8' || sample === 'uint16') {
      if (quantity.startsWith('normal')) decode = { scale: 2 * sign, offset: -sign };
      else if (quantity === 'jacobian') decode = jacobianDecode(extent / 6);
      else decode = centredDecode(extent, sample, sign);
    }
    return { name: 'RGB'[c], quantity, unit, decode };
  });
  return { resolution: N, sample, channels, rowZero: 'north', dither: null, ...rest };
}

describeKernel('wave', 'maps made by the kernel', () => {
  it.each(['uint8', 'uint16'] as const)('differ from the reference by one code of %s at most', (sample) => {
    for (const N of [16, 64, 512]) {
      const { surface, reference } = bothEngines(N, 5);
      // At 512 a row is made in two blocks; three maps show it.
      for (const map of N < 512 ? NAMES : (['displacement', 'normal', 'jacobian'] as const)) {
        for (const rowZero of N < 512 ? (['north', 'south'] as const) : (['north'] as const)) {
          const storage = storageOf(map, N, sample, { rowZero });
          const [made] = sampledMaps(surface, [storage]);
          const expected = reference(map, storage);
          let different = 0;
          made.image.planes.forEach((plane, c) => {
            for (let i = 0; i < plane.length; i++) {
              const difference = Math.abs(plane[i] - expected.image.planes[c][i]);
              if (difference > 1) expect(difference, `${map} ${c} at ${i}`).toBeLessThanOrEqual(1);
              different += difference;
            }
          });
          // Few codes lie so near the border of rounding; hundreds would be another rounding rule.
          expect(different / (N * N * storage.channels.length), map).toBeLessThan(0.02);
          expect(made.statistics.length).toBe(storage.channels.length);
        }
      }
    }
  });

  it('have the statistics of what they store', () => {
    const N = 64;
    const { surface } = bothEngines(N, 3);
    for (const sample of ['uint8', 'uint16', 'half', 'float'] as const) {
      for (const map of NAMES) {
        // A narrow range, so that some texels are clipped.
        const storage = storageOf(map, N, sample, { extent: 0.05 });
        const [{ image, statistics }] = sampledMaps(surface, [storage]);
        image.planes.forEach((plane, c) => {
          const { scale, offset } = storage.channels[c].decode;
          const largest = { uint8: 255, uint16: 65535, half: 1, float: 1 }[sample];
          const values = Array.from(plane, (stored) => {
            const number = sample === 'half' ? numberFromHalf(stored) : stored;
            return number * (scale / largest) + offset;
          });
          const { sum, sumOfSquares, min, max } = statistics[c];
          const size = Math.max(Math.abs(min), Math.abs(max));
          expect(min).toBe(Math.min(...values));
          expect(max).toBe(Math.max(...values));
          // float64 sums of 4096 numbers in two orders.
          const total = values.reduce((t, v) => t + v, 0);
          expect(Math.abs(sum - total)).toBeLessThan(1e-12 * 4096 * size);
          const squares = values.reduce((t, v) => t + v * v, 0);
          expect(Math.abs(sumOfSquares - squares)).toBeLessThan(1e-12 * 4096 * size * size);
        });
      }
    }
  });

  it('count the same clipped texels as the reference', () => {
    const { surface, reference } = bothEngines(64, 3);
    for (const map of ['displacement', 'slope', 'jacobian'] as const) {
      const storage = storageOf(map, 64, 'uint16', { extent: 0.02 });
      const [{ statistics }] = sampledMaps(surface, [storage]);
      const expected = reference(map, storage).statistics;
      statistics.forEach(({ clipped }, c) => {
        expect(clipped).toBeGreaterThan(0);
        // A texel may lie within the engines' difference of the border.
        expect(Math.abs(clipped - expected[c].clipped)).toBeLessThanOrEqual(1);
      });
    }
  });

  it('as EXR differ by no more than the engines do, and a half step', () => {
    const N = 64;
    const { surface, reference } = bothEngines(N, 9);
    for (const map of NAMES) {
      for (const sample of ['half', 'float'] as const) {
        const storage = storageOf(map, N, sample);
        const [{ image }] = sampledMaps(surface, [storage]);
        const expected = reference(map, storage).image;
        const number = (stored: number) => (sample === 'half' ? numberFromHalf(stored) : stored);
        const size = Math.max(
          ...expected.planes.flatMap((plane) => Array.from(plane, (v) => Math.abs(number(v)))),
        );
        image.planes.forEach((plane, c) => {
          for (let i = 0; i < plane.length; i++) {
            const value = number(expected.planes[c][i]);
            const bound = 2e-6 * size + (sample === 'half' ? halfStep(value) : 0);
            const difference = Math.abs(number(plane[i]) - value);
            if (!(difference <= bound)) expect(difference, `${map} at ${i}`).toBeLessThanOrEqual(bound);
          }
        });
      }
    }
  });

  it('come out alike one by one or all at once, beside other sizes of sample', () => {
    const N = 512;
    const { surface } = bothEngines(N, 1);
    const storages = [
      storageOf('displacement', N, 'uint16'),
      storageOf('normal', N, 'uint8'),
      storageOf('strain', N, 'half'),
      storageOf('slope', N, 'float'),
      storageOf('jacobian', N, 'uint16', { rowZero: 'south' }),
    ];
    const together = sampledMaps(surface, storages);
    storages.forEach((storage, m) => {
      const [alone] = sampledMaps(surface, [storage]);
      expect(together[m].statistics).toEqual(alone.statistics);
      together[m].image.planes.forEach((plane, c) => {
        expect(Buffer.from(plane.buffer).equals(Buffer.from(alone.image.planes[c].buffer))).toBe(true);
      });
    });
  });

  it('give foam its codes of J in the same pass', () => {
    const N = 64;
    const { surface, reference } = bothEngines(N, 8);
    const storage = storageOf('jacobian', N, 'float', { rowZero: 'south' });
    const J = reference('jacobian', storage).image.planes[0];
    const codes = new Uint16Array(N * N);
    const rule = { zeroJ: 0.93, stepJ: 2e-6 };
    sampledMaps(surface, [storageOf('height', N, 'half')], [jacobianCodesRequest(codes, rule)]);
    let worst = 0;
    for (let i = 0; i < codes.length; i++) {
      const code = Math.min(65535, Math.max(0, Math.round((J[i] - rule.zeroJ) / rule.stepJ)));
      worst = Math.max(worst, Math.abs(codes[i] - code));
    }
    expect(worst).toBeLessThanOrEqual(1);
  });

  it('can be dithered and in centimetres', () => {
    const N = 512;
    const { surface, reference } = bothEngines(N, 2);
    const dither = [0, 1, 2].map((c) => ditherPattern(N, `test.${c}`));
    const storage = storageOf('displacement', N, 'uint8', { dither, unit: 'cm', extent: 30 });
    const [made] = sampledMaps(surface, [storage]);
    const expected = reference('displacement', storage);
    let different = 0;
    made.image.planes.forEach((plane, c) => {
      for (let i = 0; i < plane.length; i++) different += Math.abs(plane[i] - expected.image.planes[c][i]);
      expect(made.statistics[c].sum).toBeCloseTo(expected.statistics[c].sum, -1);
    });
    expect(different / (3 * N * N)).toBeLessThan(1e-3);
  });

  it('side by side are the planes in the order of a PNG', () => {
    const N = 64;
    const { surface } = bothEngines(N, 4);
    for (const [map, sample] of [
      ['displacement', 'uint16'],
      ['displacement', 'uint8'],
      ['height', 'uint16'],
      ['height', 'uint8'],
    ] as const) {
      const storage = storageOf(map, N, sample);
      const [{ image }] = sampledMaps(surface, [storage]);
      const channels = storage.channels.map(({ quantity, decode: { scale, offset } }) => {
        const largest = sample === 'uint8' ? 255 : 65535;
        const field = {
          'displacement-east': 'displacementEast',
          'displacement-north': 'displacementNorth',
        } as const;
        const value = field[quantity as keyof typeof field] ?? 'height';
        return { value, gain: largest / scale, shift: (-offset / scale) * largest, dither: null };
      });
      const bytes = sample === 'uint8' ? 1 : 2;
      const texels = new Uint8Array(N * N * channels.length * bytes);
      surface.samples([{ sample, channels, rowZero: 'north', target: { texels } }]);
      let wrong = 0;
      for (let i = 0, o = 0; i < N * N; i++) {
        for (const plane of image.planes) {
          if (bytes === 2 && texels[o++] !== plane[i] >> 8) wrong++;
          if (texels[o++] !== (plane[i] & 255)) wrong++;
        }
      }
      expect(wrong).toBe(0);
    }
  });

  it('refuse values that are no numbers, naming the texel', () => {
    const N = 32;
    const waves = randomWaves({ resolution: N });
    waves.amplitude[2 * (N + 1)] = Number.NaN;
    const surface = float32Engine().synthesis(waves, OPTIONS);
    surface.turnTo(0);
    for (const sample of ['uint8', 'uint16', 'half', 'float'] as const) {
      for (const map of ['height', 'normal', 'jacobian'] as const) {
        expect(() => sampledMaps(surface, [storageOf(map, N, sample)])).toThrow(
          'is not a number at texel 0 east, 0 north',
        );
      }
    }
  });

  it('refuse values that no half can hold', () => {
    const waves = randomWaves({ resolution: 32 });
    waves.amplitude[2] = 1e6;
    const surface = float32Engine().synthesis(waves, OPTIONS);
    surface.turnTo(0);
    expect(() => sampledMaps(surface, [storageOf('height', 32, 'half')])).toThrow('exceeds what');
    expect(() => sampledMaps(surface, [storageOf('height', 32, 'float')])).not.toThrow();
  });

  it('refuse what cannot be stored', () => {
    const { surface } = bothEngines(16, 0);
    const texels = new Uint8Array(6 * 256);
    const channel = { value: 'height', gain: 1, shift: 0, dither: null } as const;
    const request = {
      sample: 'uint8',
      channels: [channel, channel],
      rowZero: 'north',
      target: { texels },
    } as const;
    expect(() => surface.samples([request])).toThrow('2 channels of uint8');
    expect(() => surface.samples([{ ...request, sample: 'half', channels: [channel] }])).toThrow(
      '1 channels of half',
    );
    expect(() => surface.samples(new Array(9).fill({ ...request, channels: [channel] }))).toThrow(
      'more than 8',
    );
  });

  it('know the largest magnitude of each value', () => {
    const { surface } = bothEngines(128, 6);
    const names = ['displacementEast', 'height', 'jacobian'] as const;
    const found = surface.largest(names);
    names.forEach((name, i) => {
      const values = surface.values(name);
      expect(found[i]).toBe(values.reduce((most, value) => Math.max(most, Math.abs(value)), 0));
    });
  });
});
