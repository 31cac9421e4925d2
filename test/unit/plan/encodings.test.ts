import { describe, expect, it } from 'vitest';
import type { Decode } from '../../../src/image/image.ts';
import {
  centredDecode,
  isInteger,
  jacobianDecode,
  MAP_CONTENTS,
  plannedMap,
} from '../../../src/plan/encodings.ts';
import { OUTPUT_DEFAULTS } from '../../../src/sea/defaults.ts';
import { MAP_NAMES, type MapName, type MapRequest, type OutputConventions } from '../../../src/sea/sea.ts';
import type { FieldDeviations } from '../../../src/waves/field-deviations.ts';

const DEVIATIONS: FieldDeviations = {
  height: 0.5,
  displacementEast: 0.41,
  displacementNorth: 0.32,
  velocityEast: 0.52,
  velocityNorth: 0.33,
  velocityUp: 0.62,
  slopeEast: 0.08,
  slopeNorth: 0.057,
  slopeProduct: 0,
  strainEastEast: 0.072,
  strainNorthNorth: 0.046,
  strainEastNorth: 0.034,
  compression: 0.098,
};

function planned(map: MapName, changes: Partial<MapRequest> = {}, output: Partial<OutputConventions> = {}) {
  const request: MapRequest = {
    map,
    format: 'png',
    sample: 'uint16',
    range: { policy: 'sigmas', sigmas: 6 },
    dither: false,
    ...changes,
  };
  return plannedMap(request, 'c1', DEVIATIONS, { ...OUTPUT_DEFAULTS, ...output });
}

/** The value of a code, as a reader decodes it. */
function decoded(code: number, largest: number, { scale, offset }: Decode): number {
  return (code / largest) * scale + offset;
}

describe('centredDecode', () => {
  it.each([
    ['uint8', 255, 128],
    ['uint16', 65535, 32768],
  ] as const)(
    '%s: the middle code is zero, the range is covered, steps have five digits',
    (sample, largest, zero) => {
      for (const extent of [1, 0.123456789, 2.5, 7.77e-4, 31.4159, 1e-6]) {
        for (const sign of [1, -1] as const) {
          const decode = centredDecode(extent, sample, sign);
          const step = Math.abs(decode.scale) / largest;
          expect(Math.abs(decoded(zero, largest, decode))).toBeLessThan(1e-11 * extent);
          expect(sign * decoded(largest, largest, decode)).toBeGreaterThanOrEqual(extent * (1 - 1e-12));
          expect(sign * decoded(0, largest, decode)).toBeLessThanOrEqual(-extent);
          // No more than rounding the step up to five digits makes it: nothing of the range is wasted.
          expect(sign * decoded(largest, largest, decode)).toBeLessThan(extent * (1 + 1.01e-4));
          expect(step).toBeCloseTo(Number(step.toPrecision(5)), 18);
          expect(Math.sign(decode.scale)).toBe(sign);
        }
      }
    },
  );

  it('has a step even for a field of nothing', () => {
    expect(centredDecode(0, 'uint16', 1).scale).toBeGreaterThan(0);
  });
});

describe('jacobianDecode', () => {
  it('runs from 1 - 5.5 to 1 + 7 standard deviations', () => {
    const decode = jacobianDecode(0.1);
    expect(decoded(0, 65535, decode)).toBeCloseTo(0.45, 12);
    expect(decoded(65535, 65535, decode)).toBeCloseTo(1.7, 12);
    expect(jacobianDecode(0).scale).toBeGreaterThan(0);
  });
});

describe('ranges', () => {
  const extents = (
    map: MapName,
    changes: Partial<MapRequest> = {},
    output: Partial<OutputConventions> = {},
  ) => planned(map, changes, output).channels.map(({ decode }) => decoded(65535, 65535, decode as Decode));
  const near = (...values: number[]) => values.map((value) => expect.closeTo(value, 3));

  it('of so many standard deviations are those of each channel', () => {
    expect(extents('displacement')).toEqual(near(2.46, 1.92, 3));
    expect(extents('velocity')).toEqual(near(3.12, 1.98, 3.72));
    expect(extents('slope')).toEqual(near(0.48, 0.342));
    expect(extents('strain')).toEqual(near(0.432, 0.276, 0.204));
    expect(extents('height', { range: { policy: 'sigmas', sigmas: 4 } })).toEqual(near(2));
    expect(extents('jacobian')).toEqual(near(1.588));
  });

  it('given are in the unit of the quantity, whatever the unit of the file', () => {
    const range = { policy: 'extent', extent: 2.5 } as const;
    expect(extents('displacement', { range })).toEqual(near(2.5, 2.5, 2.5));
    const centimetres = extents('displacement', { range }, { lengthUnit: 'cm' });
    expect(centimetres.every((extent) => Math.abs(extent - 250) < 0.03)).toBe(true);
    expect(extents('jacobian', { range: { policy: 'extent', extent: 0.8 } })).toEqual(near(1.8));
  });

  it('of a survey are not known yet', () => {
    const { channels } = planned('displacement', { range: { policy: 'survey' } });
    expect(channels.map(({ decode }) => decode)).toEqual([null, null, null]);
  });

  it('of normals, foam and a Jacobian follow from what they are', () => {
    const range = { policy: 'natural' } as const;
    expect(planned('normal', { range }).channels.map(({ decode }) => decode)).toEqual(
      Array(3).fill({ scale: 2, offset: -1 }),
    );
    expect(planned('foam', { range }).channels[0].decode).toEqual({ scale: 1, offset: 0 });
    expect(planned('jacobian', { range }).channels[0].decode).toEqual(jacobianDecode(0.098));
  });

  it('of floats are the values as they are', () => {
    for (const map of MAP_NAMES) {
      const { channels } = planned(map, { format: 'exr', sample: 'half', range: { policy: 'natural' } });
      for (const { decode } of channels) expect(decode).toEqual({ scale: 1, offset: 0 });
    }
  });
});

describe('channels', () => {
  const names = (map: MapName, format: 'exr' | 'png', output: Partial<OutputConventions> = {}) =>
    planned(map, { format, sample: format === 'exr' ? 'half' : 'uint16' }, output).channels.map(
      ({ name }) => name,
    );

  it('are R, G, B, or Y alone', () => {
    expect(names('displacement', 'png')).toEqual(['R', 'G', 'B']);
    expect(names('slope', 'exr')).toEqual(['R', 'G']);
    expect(names('jacobian', 'exr')).toEqual(['Y']);
  });

  it('of a layered exr have the name of the map; of a png never', () => {
    const exrChannels = 'layered';
    expect(names('displacement', 'exr', { exrChannels })).toEqual([
      'displacement.X',
      'displacement.Y',
      'displacement.Z',
    ]);
    expect(names('strain', 'exr', { exrChannels })).toEqual(['strain.XX', 'strain.YY', 'strain.XY']);
    expect(names('foam', 'exr', { exrChannels })).toEqual(['foam']);
    expect(names('displacement', 'png', { exrChannels })).toEqual(['R', 'G', 'B']);
  });

  it('are in the unit of the output where they have one', () => {
    const units = (map: MapName, lengthUnit: 'm' | 'cm') => planned(map, {}, { lengthUnit }).channels[0].unit;
    expect(MAP_NAMES.map((map) => units(map, 'm'))).toEqual(['m', 'm', 'm/s', '1', '1', '1', '1', '1']);
    expect(MAP_NAMES.map((map) => units(map, 'cm'))).toEqual(['cm', 'cm', 'cm/s', '1', '1', '1', '1', '1']);
  });

  it('turn with the axes: displacement and velocity alone', () => {
    for (const map of ['displacement', 'velocity'] as const) {
      const { channels } = planned(map, { format: 'exr', sample: 'half' }, { axes: 'y-up' });
      expect(channels.map(({ quantity }) => quantity)).toEqual([`${map}-east`, `${map}-up`, `${map}-north`]);
      expect(channels.map(({ decode }) => decode?.scale)).toEqual([1, 1, -1]);
      const { channels: integers } = planned(map, {}, { axes: 'y-up' });
      expect(integers.map(({ decode }) => Math.sign(decode?.scale ?? 0))).toEqual([1, 1, -1]);
    }
    for (const map of ['slope', 'strain', 'normal', 'height', 'jacobian', 'foam'] as const) {
      expect(planned(map, {}, { axes: 'y-up' })).toEqual(planned(map));
    }
  });

  it('green of a normal points where it was asked to', () => {
    const south = planned('normal', { range: { policy: 'natural' } }, { normalGreen: 'south' });
    expect(south.channels[1]).toMatchObject({ quantity: 'normal-north', decode: { scale: -2, offset: 1 } });
  });
});

describe('files', () => {
  it('are named by cascade, map, frame and format', () => {
    expect(planned('foam').pattern).toBe('c1/foam.%04d.png');
    expect(planned('height', { format: 'exr', sample: 'half' }, { padding: 6 }).pattern).toBe(
      'c1/height.%06d.exr',
    );
  });

  it('say how the cascades add up', () => {
    const combine = Object.fromEntries(MAP_NAMES.map((map) => [map, MAP_CONTENTS[map].combine]));
    expect(combine).toEqual({
      displacement: 'sum',
      height: 'sum',
      velocity: 'sum',
      slope: 'sum',
      strain: 'sum',
      normal: 'rebuild',
      jacobian: 'rebuild',
      foam: 'one-minus-product',
    });
    expect(planned('foam').combine).toBe('one-minus-product');
  });

  it('know integers from floats', () => {
    expect((['uint8', 'uint16', 'half', 'float'] as const).map(isInteger)).toEqual([
      true,
      true,
      false,
      false,
    ]);
  });
});
