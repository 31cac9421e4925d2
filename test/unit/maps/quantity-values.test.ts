import { describe, expect, it } from 'vitest';
import type { ChannelSpec, Quantity } from '../../../src/image/image.ts';
import { encodedMap } from '../../../src/maps/encoded-map.ts';
import { FRAME_MAPS, type FrameMapName } from '../../../src/maps/quantity-values.ts';
import { plannedMap } from '../../../src/plan/encodings.ts';
import { OUTPUT_DEFAULTS } from '../../../src/sea/defaults.ts';
import type { MapRequest, OutputConventions } from '../../../src/sea/sea.ts';
import { fieldDeviations } from '../../../src/waves/field-deviations.ts';
import { decodedPlane } from '../../support/decoded.ts';
import { frameFields, handWaves } from '../../support/tiny-waves.ts';

/*
 * One plane wave, by hand, through every map to the values a reader decodes: eta = a cos(k.x - omega t) with x measured
 * from the tile's south-west corner, on water of finite depth, with a horizontal scale.
 */
const [L, N, a, nx, ny, turns] = [32, 16, 0.6, 2, -1, 3];
const [depthM, scale, frameCount, periodS, frame] = [2.5, 1.3, 20, 4, 7];
const [kx, ky] = [(2 * Math.PI * nx) / L, (2 * Math.PI * ny) / L];
const k = Math.hypot(kx, ky);
const omega = (2 * Math.PI * turns) / periodS;
const stretch = scale / Math.tanh(k * depthM);

const WAVES = handWaves({ patchLengthM: L, resolution: N }, { frameCount, periodS }, [
  // From the corner to the centre of the first texel it is half a texel along both axes.
  { nx, ny, amplitudeM: a, phaseRad: (Math.PI * (nx + ny)) / N, turns },
]);
const FIELDS = frameFields(WAVES, frame, depthM, scale);
const DEVIATIONS = fieldDeviations(WAVES, depthM, scale);

/** Every quantity at a point, SI. */
function handValues(eastM: number, northM: number): Readonly<Record<Exclude<Quantity, 'foam'>, number>> {
  const theta = kx * eastM + ky * northM - (omega * frame * periodS) / frameCount;
  const [c, s] = [a * Math.cos(theta), a * Math.sin(theta)];
  const [Exx, Eyy, Exy] = [kx * kx, ky * ky, kx * ky].map((kk) => (-stretch * kk * c) / k);
  const [Sx, Sy] = [-kx * s, -ky * s];
  const normal = [Exy * Sy - Sx * (1 + Eyy), Exy * Sx - Sy * (1 + Exx), (1 + Exx) * (1 + Eyy) - Exy * Exy];
  const length = Math.hypot(...normal);
  return {
    'displacement-east': (-stretch * kx * s) / k,
    'displacement-north': (-stretch * ky * s) / k,
    'displacement-up': c,
    height: c,
    'velocity-east': (stretch * kx * omega * c) / k,
    'velocity-north': (stretch * ky * omega * c) / k,
    'velocity-up': omega * s,
    'slope-east': Sx,
    'slope-north': Sy,
    'strain-east-east': Exx,
    'strain-north-north': Eyy,
    'strain-east-north': Exy,
    'normal-east': normal[0] / length,
    'normal-north': normal[1] / length,
    'normal-up': normal[2] / length,
    jacobian: normal[2],
  };
}

function madeMap(
  map: FrameMapName,
  storage: Pick<MapRequest, 'format' | 'sample'>,
  output: OutputConventions,
) {
  const range = {
    policy: map === 'jacobian' || map === 'normal' ? ('natural' as const) : ('sigmas' as const),
    sigmas: 6,
  };
  const planned = plannedMap({ map, ...storage, range, dither: false }, 'c0', DEVIATIONS, output);
  const channels = planned.channels as readonly ChannelSpec[];
  const scratch = [0, 1, 2].map(() => new Float64Array(N * N));
  const values = FRAME_MAPS[map].values(FIELDS, (index) => scratch[index]);
  const { rowZero } = output;
  return encodedMap(values, { resolution: N, sample: storage.sample, channels, rowZero, dither: null });
}

/** Expects what a reader decodes to be the wave, within half a step of the file's samples. */
function expectWave(
  map: FrameMapName,
  storage: Pick<MapRequest, 'format' | 'sample'>,
  output: OutputConventions,
): void {
  const { image, statistics } = madeMap(map, storage, output);
  image.channels.forEach(({ quantity, unit, decode }, c) => {
    const perSi = unit === 'cm' || unit === 'cm/s' ? 100 : 1;
    const decoded = decodedPlane(image, c);
    for (let row = 0; row < N; row++) {
      const iy = output.rowZero === 'north' ? N - 1 - row : row;
      for (let ix = 0; ix < N; ix++) {
        const value = perSi * handValues(((ix + 0.5) * L) / N, ((iy + 0.5) * L) / N)[quantity as 'height'];
        const steps = {
          uint8: Math.abs(decode.scale) / 255,
          uint16: Math.abs(decode.scale) / 65535,
          half: 2 ** -10 * Math.abs(value),
          float: 2 ** -23 * Math.abs(value),
        };
        const error = Math.abs(decoded[row * N + ix] - value);
        expect(error, `${quantity}, row ${row}, column ${ix}`).toBeLessThan(
          0.5 * steps[storage.sample] + 1e-12,
        );
      }
    }
    expect(statistics[c].clipped).toBe(0);
  });
}

const MAPS = Object.keys(FRAME_MAPS) as FrameMapName[];
const OTHER_WAY: OutputConventions = {
  axes: 'y-up',
  rowZero: 'south',
  normalGreen: 'south',
  lengthUnit: 'cm',
  exrChannels: 'layered',
  padding: 6,
};

describe.each(MAPS)('a plane wave in the map %s', (map) => {
  it.each([
    ['png', 'uint8'],
    ['png', 'uint16'],
    ['exr', 'half'],
    ['exr', 'float'],
  ] as const)('%s of %s', (format, sample) => {
    expectWave(map, { format, sample }, OUTPUT_DEFAULTS);
    expectWave(map, { format, sample }, OTHER_WAY);
  });

  it('needs no field that it does not name', () => {
    const { fields, values } = FRAME_MAPS[map];
    const few = frameFields(WAVES, frame, depthM, scale, fields);
    const scratch = [0, 1, 2].map(() => new Float64Array(N * N));
    for (const [quantity, made] of values(few, (index) => scratch[index])) {
      expect(made[5]).toBeCloseTo(handValues((5.5 * L) / N, (0.5 * L) / N)[quantity as 'height'], 12);
    }
  });
});

describe('axes', () => {
  it('y-up: X is east, Y up, Z the negative of north', () => {
    const { image } = madeMap(
      'displacement',
      { format: 'exr', sample: 'float' },
      { ...OUTPUT_DEFAULTS, axes: 'y-up' },
    );
    expect(image.channels.map(({ quantity, decode }) => [quantity, decode.scale])).toEqual([
      ['displacement-east', 1],
      ['displacement-up', 1],
      ['displacement-north', -1],
    ]);
    const row = N - 1;
    const { 'displacement-north': north, 'displacement-up': up } = handValues((0.5 * L) / N, (0.5 * L) / N);
    expect(image.planes[1][row * N]).toBeCloseTo(up, 6);
    expect(image.planes[2][row * N]).toBeCloseTo(-north, 6);
  });

  it('leave normals alone, whose green has a convention of its own', () => {
    const storage = { format: 'png', sample: 'uint8' } as const;
    const codes = (output: Partial<OutputConventions>) => {
      const { image } = madeMap('normal', storage, { ...OUTPUT_DEFAULTS, ...output });
      return image.planes.map((plane) => plane[37]);
    };
    const [red, green, blue] = codes({});
    expect(codes({ axes: 'y-up' })).toEqual([red, green, blue]);
    const { 'normal-north': north } = handValues(((5 + 0.5) * L) / N, ((N - 3 + 0.5) * L) / N);
    expect(Math.sign(green - 127.5)).toBe(Math.sign(north));
    expect(codes({ normalGreen: 'south' })).toEqual([red, 255 - green, blue]);
  });
});
