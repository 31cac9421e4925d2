import { describe, expect, it } from 'vitest';
import type { FrameFields } from '../../../src/field/frame-fields.ts';
import { fillJacobian, fillNormals } from '../../../src/maps/surface.ts';
import { frameFields, scatteredWaves } from '../../support/tiny-waves.ts';

const one = (value: number): Float64Array => Float64Array.of(value);

function fieldsAt(Sx: number, Sy: number, Exx: number, Eyy: number, Exy: number): FrameFields {
  return {
    slopeEast: one(Sx),
    slopeNorth: one(Sy),
    strainEastEast: one(Exx),
    strainNorthNorth: one(Eyy),
    strainEastNorth: one(Exy),
  };
}

function normalAt(...fields: Parameters<typeof fieldsAt>): number[] {
  const [east, north, up] = [one(0), one(0), one(0)];
  fillNormals(east, north, up, fieldsAt(...fields));
  return [east[0], north[0], up[0]];
}

describe('fillJacobian', () => {
  it('is the determinant of the gradient of x + D', () => {
    const J = one(0);
    // Stretches .7 and .9, shear .2; computed elsewhere.
    fillJacobian(J, fieldsAt(0, 0, -0.3, -0.1, 0.2));
    expect(J[0]).toBeCloseTo(0.59, 15);
  });

  it('has the mean 1 over a tile, whatever the waves', () => {
    for (const seed of [1, 2, 3]) {
      const waves = scatteredWaves(
        { patchLengthM: 20, resolution: 32 },
        { frameCount: 12, periodS: 3 },
        seed,
      );
      const J = new Float64Array(32 * 32);
      fillJacobian(J, frameFields(waves, 5, 3, 1.4));
      const mean = J.reduce((sum, value) => sum + value, 0) / J.length;
      expect(Math.abs(mean - 1)).toBeLessThan(1e-13);
      // The waves are steep enough for the mean to be no accident.
      expect(Math.max(...J) - Math.min(...J)).toBeGreaterThan(0.5);
    }
  });
});

describe('fillNormals', () => {
  it('points up on a flat surface, however stretched', () => {
    expect(normalAt(0, 0, 0, 0, 0)).toEqual([0, 0, 1].map((v) => expect.closeTo(v, 15)));
    expect(normalAt(0, 0, 0.4, -0.3, 0.1)).toEqual([0, 0, 1].map((v) => expect.closeTo(v, 15)));
  });

  it('leans away from the rise', () => {
    const half = Math.SQRT1_2;
    expect(normalAt(1, 0, 0, 0, 0)).toEqual([-half, 0, half].map((v) => expect.closeTo(v, 15)));
    expect(normalAt(0, 1, 0, 0, 0)).toEqual([0, -half, half].map((v) => expect.closeTo(v, 15)));
  });

  it('is steeper where the surface is gathered: the slope of the displaced surface, not of the height map', () => {
    // Gathered to half its width, the same rise is twice as steep.
    const [east, , up] = normalAt(1, 0, -0.5, 0, 0);
    expect(-east / up).toBeCloseTo(2, 14);
  });

  it('stands at right angles on both tangents and has the length 1', () => {
    const [Sx, Sy, Exx, Eyy, Exy] = [0.7, -0.4, -0.6, 0.3, 0.25];
    const [x, y, z] = normalAt(Sx, Sy, Exx, Eyy, Exy);
    expect(x * (1 + Exx) + y * Exy + z * Sx).toBeCloseTo(0, 15);
    expect(x * Exy + y * (1 + Eyy) + z * Sy).toBeCloseTo(0, 15);
    expect(Math.hypot(x, y, z)).toBeCloseTo(1, 15);
  });

  it('points down where the surface is folded', () => {
    expect(normalAt(0.2, 0, -1.3, 0, 0)[2]).toBeLessThan(0);
  });

  it('points up where the surface is pinched to a point, and is not a number where the fields are not', () => {
    expect(normalAt(0, 0, -1, -1, 0)).toEqual([0, 0, 1]);
    expect(normalAt(Number.NaN, 0, 0, 0, 0)[2]).toBeNaN();
  });
});
