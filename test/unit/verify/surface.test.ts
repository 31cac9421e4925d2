import { afterAll, describe, expect, it } from 'vitest';
import { fillGaussianPair } from '../../../src/math/random.ts';
import { residual } from '../../../src/verify/residual.ts';
import { type Surface, surfaceMaker } from '../../../src/verify/surface.ts';
import { jacobianOf, normalsOf, type Prediction } from '../../../src/verify/surface-shape.ts';
import { directFields } from '../../support/direct-sum.ts';
import { firstCascade, frameOf } from '../../support/facts.ts';
import { bakeShelf } from '../../support/small-bakes.ts';

const shelf = bakeShelf();
afterAll(shelf.remove);

const FIELDS = ['Sx', 'Sy', 'Dxx', 'Dyy', 'Dxy', 'east', 'north'] as const;

function largestDifference(a: Float64Array, b: Float64Array): number {
  return a.reduce((most, value, i) => Math.max(most, Math.abs(value - b[i])), 0);
}

/** White noise of a deviation. */
function noise(count: number, deviation: number, seed: number): Float64Array {
  const pair = new Float64Array(2);
  return Float64Array.from({ length: count }, (_, i) => {
    fillGaussianPair(pair, [i, seed, 0, 0], [3, 4]);
    return deviation * pair[0];
  });
}

function copied(surface: Surface): Surface {
  const fields = Object.fromEntries(FIELDS.map((name) => [name, surface[name].slice()]));
  return { ...surface, ...fields };
}

describe('the surface of a frame', () => {
  it('is that of the waves: from the displacement, and from the height alone', async () => {
    const facts = firstCascade(await shelf.bake('shallow'));
    const waves = facts.waves().amplitudes;
    const direct = directFields(waves, 3, facts.water.depthM, 1);
    const expected = {
      Sx: direct.slopeEast,
      Sy: direct.slopeNorth,
      Dxx: direct.strainEastEast,
      Dyy: direct.strainNorthNorth,
      Dxy: direct.strainEastNorth,
      east: direct.displacementEast,
      north: direct.displacementNorth,
    };
    const maker = surfaceMaker(facts);
    const displaced = frameOf(
      {
        'displacement-up': direct.height,
        'displacement-east': direct.displacementEast,
        'displacement-north': direct.displacementNorth,
      },
      facts,
    );
    for (const frame of [displaced, frameOf({ height: direct.height }, facts)]) {
      const surface = maker(frame);
      if (surface === null) throw new Error('no surface');
      for (const name of FIELDS) expect(largestDifference(surface[name], expected[name])).toBeLessThan(1e-12);
    }
    expect(maker(frameOf({}, facts))).toBeNull();
  });

  it.each([true, false])(
    'has the errors that white noise in its files causes (displacement: %s)',
    async (displaced) => {
      const facts = firstCascade(await shelf.bake('shallow'));
      const count = facts.cascade.resolution ** 2;
      const e = 1e-3;
      const [up, east, north] = [1, 2, 3].map((seed) => noise(count, e, seed));
      const fields = displaced
        ? { 'displacement-up': up, 'displacement-east': east, 'displacement-north': north }
        : { height: up };
      // All of the surface of a frame of noise is error.
      const surface = surfaceMaker(facts)(frameOf(fields, facts, e * e));
      if (surface === null) throw new Error('no surface');
      for (const name of FIELDS) {
        const square = surface[name].reduce((sum, value) => sum + value * value, 0) / count;
        // A quarter of 4096 waves: one deviation of such a mean square is some 5 %.
        expect(Math.abs(square / surface.noise[name] - 1)).toBeLessThan(0.25);
      }
      const product = surface.Dxx.reduce((sum, value, i) => sum + value * surface.Dyy[i], 0) / count;
      const size = Math.sqrt(surface.noise.Dxx * surface.noise.Dyy);
      expect(Math.abs(product - surface.noise.DxxDyy) / size).toBeLessThan(0.2);
    },
  );
});

describe('normals and Jacobian', () => {
  it('of a level surface point up and are 1', () => {
    const flat = new Float64Array(4);
    const still = { Sx: 0, Sy: 0, Dxx: 0, Dyy: 0, Dxy: 0, DxxDyy: 0, east: 0, north: 0 };
    const surface = {
      Sx: flat,
      Sy: flat,
      Dxx: flat,
      Dyy: flat,
      Dxy: flat,
      east: flat,
      north: flat,
      noise: still,
    };
    expect([...jacobianOf(surface).values]).toEqual([1, 1, 1, 1]);
    expect(normalsOf(surface).map(({ values }) => values[0] + 0)).toEqual([0, 0, 1]);
  });

  it('of a sheet that slopes east by s and is squeezed by half are as by hand', () => {
    const [zero, s, squeeze] = [0, 0.3, -0.5].map((value) => Float64Array.of(value));
    const still = { Sx: 0, Sy: 0, Dxx: 0, Dyy: 0, Dxy: 0, DxxDyy: 0, east: 0, north: 0 };
    const surface = {
      Sx: s,
      Sy: zero,
      Dxx: squeeze,
      Dyy: zero,
      Dxy: zero,
      east: zero,
      north: zero,
      noise: still,
    };
    const length = Math.hypot(0.3, 0.5);
    const [east, , up] = normalsOf(surface);
    expect(east.values[0]).toBeCloseTo(-0.3 / length, 14);
    expect(up.values[0]).toBeCloseTo(0.5 / length, 14);
    expect(jacobianOf(surface).values[0]).toBeCloseTo(0.5, 14);
  });

  it('have the errors that noise in slope and strain causes, correlated or not', async () => {
    const facts = firstCascade(await shelf.bake('steep'));
    const count = facts.cascade.resolution ** 2;
    const direct = directFields(facts.waves().amplitudes, 2, facts.water.depthM, 2.5);
    const clean = surfaceMaker(facts)(frameOf({ height: direct.height }, facts));
    if (clean === null) throw new Error('no surface');
    const before = copied(clean);
    const e = 2e-5;
    const dirty = surfaceMaker(facts)(
      frameOf({ height: noise(count, e, 5).map((error, i) => error + direct.height[i]) }, facts, e * e),
    );
    if (dirty === null) throw new Error('no surface');
    const ratio = (a: Prediction, b: Prediction): number => {
      const square = b.errorSquare as Float64Array;
      return a.values.reduce((sum, value, i) => sum + (value - b.values[i]) ** 2 / square[i], 0) / count;
    };
    expect(Math.abs(ratio(jacobianOf(before), jacobianOf(dirty)) - 1)).toBeLessThan(0.25);
    const [normals, dirtyNormals] = [normalsOf(before), normalsOf(dirty)];
    normals.forEach((normal, c) => {
      expect(Math.abs(ratio(normal, dirtyNormals[c]) - 1)).toBeLessThan(0.25);
    });
  });
});

describe('the residual of a prediction', () => {
  it('is 0 within rounding, and the excess in units of the error beyond it', async () => {
    const facts = firstCascade(await shelf.bake('tiny'));
    const values = Float64Array.from({ length: 1024 }, (_, i) => 0.01 * (i % 7));
    const field = frameOf({ height: values }, facts).field('height');
    if (field === null) throw new Error('no field');
    const codes = { ...field, rounding: { ...field.rounding, sample: 'uint8', step: 0.01 } as const };
    const close = residual('float64');
    close.add(
      codes,
      values.map((value) => value + 0.0049),
      1e-12,
    );
    expect(close.verdict()).toMatchObject({ measured: 0, passed: true });
    const far = residual('float64');
    far.add(
      codes,
      values.map((value) => value - 0.0052),
      1e-8,
    );
    expect(far.verdict().measured).toBeCloseTo(2, 6);
    expect(far.verdict().passed).toBe(false);
    expect(far.frames()).toBe(1);
  });
});
