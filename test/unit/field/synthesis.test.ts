import { describe, expect, it } from 'vitest';
import { float64Engine } from '../../../src/field/float64-engine.ts';
import { FIELD_NAMES, type FieldName } from '../../../src/field/frame-fields.ts';
import { synthesis } from '../../../src/field/synthesis.ts';
import type { TransformEngine } from '../../../src/field/transform-engine.ts';
import { directFields } from '../../support/direct-sum.ts';
import { frameFields, handWaves, largestDifference, rms, scatteredWaves } from '../../support/tiny-waves.ts';
import { TRANSFORM } from '../../support/tolerances.ts';

const LATTICE = { patchLengthM: 40, resolution: 16 };
const LOOP = { frameCount: 30, periodS: 4 };
const WAVES = scatteredWaves(LATTICE, LOOP, 1);

describe('synthesis', () => {
  const cases = [
    { depthM: Infinity, scale: 1, frame: 0 },
    { depthM: Infinity, scale: 1.3, frame: 7 },
    { depthM: 3, scale: 0.7, frame: 29 },
    { depthM: 0.5, scale: 0.01, frame: 1 },
  ];
  it.each(cases)(
    'equals the sum of its waves, k and -k turning differently: %o',
    ({ depthM, scale, frame }) => {
      const made = frameFields(WAVES, frame, depthM, scale);
      const direct = directFields(WAVES, frame, depthM, scale);
      for (const name of FIELD_NAMES) {
        const tolerance = TRANSFORM * rms(direct[name]);
        expect(largestDifference(made[name], direct[name]), name).toBeLessThanOrEqual(tolerance);
      }
    },
  );

  it('a horizontal scale of 0 leaves the height alone', () => {
    const flat = frameFields(WAVES, 3, 3, 0);
    expect(rms(flat.displacementEast) + rms(flat.velocityNorth) + rms(flat.strainEastEast)).toBe(0);
    // Height and shear share a transform: each gets the rounding of the other.
    const { height } = frameFields(WAVES, 3, 3, 1);
    expect(largestDifference(flat.height, height)).toBeLessThan(TRANSFORM * rms(height));
    expect(rms(flat.strainEastNorth)).toBeLessThan(TRANSFORM * rms(height));
  });

  it('frame N is frame 0 and frame -1 is frame N - 1, to the bit', () => {
    const { frameCount: N } = LOOP;
    const pairs = [
      [N, 0],
      [-1, N - 1],
      [1000 * N + 4, 4],
      [-7 * N + 2, 2],
    ];
    for (const [n, same] of pairs) expect(frameFields(WAVES, n)).toEqual(frameFields(WAVES, same));
    expect(frameFields(WAVES, 1)).not.toEqual(frameFields(WAVES, 0));
  });

  it('gives the same bits in any order of frames', () => {
    const surface = synthesis(WAVES, float64Engine(16), {
      depthM: 3,
      horizontalScale: 1,
      fields: new Set(FIELD_NAMES),
    });
    for (const n of [5, 0, 29, 5]) {
      const made = surface.frame(n);
      const alone = frameFields(WAVES, n, 3);
      for (const name of FIELD_NAMES) expect(made[name], `${name} of ${n}`).toEqual(alone[name]);
    }
  });

  it.each(FIELD_NAMES.map((name) => [name]))('makes %s alone, with the bits it has among all', (name) => {
    const alone = frameFields(WAVES, 3, 3, 1, [name]);
    expect(Object.keys(alone)).toEqual([name]);
    expect(alone[name]).toEqual(frameFields(WAVES, 3, 3, 1)[name]);
  });

  it('velocity is the rate of the displacement of the loop in continuous time', () => {
    // The same loop in very many frames; central differences err by (omega dt)^2 / 6 and by rounding.
    const finer = 2 ** 14;
    const fine = { ...WAVES, frameCount: LOOP.frameCount * finer };
    const dt = LOOP.periodS / fine.frameCount;
    const [before, after] = [frameFields(fine, 7 * finer - 1, 3), frameFields(fine, 7 * finer + 1, 3)];
    const velocity = frameFields(WAVES, 7, 3);
    const rates: [FieldName, FieldName][] = [
      ['velocityEast', 'displacementEast'],
      ['velocityNorth', 'displacementNorth'],
      ['velocityUp', 'height'],
    ];
    for (const [rate, of] of rates) {
      const differences = after[of].map((value, i) => (value - before[of][i]) / (2 * dt));
      expect(largestDifference(velocity[rate], differences), rate).toBeLessThan(1e-8 * rms(differences));
    }
  });

  it('slope and strain are the gradients of height and displacement', () => {
    const delta = 1e-4;
    const made = frameFields(WAVES, 2, 3, 1.2);
    const gradients: [FieldName, FieldName, number, number][] = [
      ['slopeEast', 'height', 1, 0],
      ['slopeNorth', 'height', 0, 1],
      ['strainEastEast', 'displacementEast', 1, 0],
      ['strainNorthNorth', 'displacementNorth', 0, 1],
      ['strainEastNorth', 'displacementEast', 0, 1],
      ['strainEastNorth', 'displacementNorth', 1, 0],
    ];
    for (const [gradient, of, east, north] of gradients) {
      const behind = frameFields(movedBy(-delta * east, -delta * north), 2, 3, 1.2)[of];
      const ahead = frameFields(movedBy(delta * east, delta * north), 2, 3, 1.2)[of];
      const differences = ahead.map((value, i) => (value - behind[i]) / (2 * delta));
      expect(largestDifference(made[gradient], differences), gradient).toBeLessThan(1e-8 * rms(differences));
    }
  });

  it('leaves no imaginary part', () => {
    const engine = float64Engine(16);
    const leftovers: number[] = [];
    const watched: TransformEngine = {
      resolution: 16,
      inverse(data) {
        engine.inverse(data);
        leftovers.push(rms(data.filter((_, i) => i % 2 === 1)) / rms(data.filter((_, i) => i % 2 === 0)));
      },
    };
    // The one field that shares its transform with no other.
    synthesis(WAVES, watched, { depthM: 3, horizontalScale: 1, fields: new Set(['velocityUp']) }).frame(3);
    expect(leftovers).toHaveLength(1);
    expect(leftovers[0]).toBeLessThan(1e-15);
  });

  it('holds nothing at k = 0: every field has no mean', () => {
    const made = frameFields(WAVES, 11, 3);
    for (const name of FIELD_NAMES) {
      const mean = made[name].reduce((sum, value) => sum + value, 0) / 256;
      expect(Math.abs(mean), name).toBeLessThan(TRANSFORM * rms(made[name]));
    }
  });

  it('a wave that stands (no turns) stands, at no velocity', () => {
    const still = handWaves(LATTICE, LOOP, [{ nx: 2, ny: -1, amplitudeM: 0.1, turns: 0 }]);
    expect(frameFields(still, 13).height).toEqual(frameFields(still, 0).height);
    expect(rms(frameFields(still, 13).velocityUp)).toBe(0);
  });

  /** The waves seen from a point east and north of the usual one. */
  function movedBy(eastM: number, northM: number) {
    const amplitude = WAVES.amplitude.slice();
    const N = LATTICE.resolution;
    for (let i = 0; i < N * N; i++) {
      const nx = ((i % N) + N / 2) % N;
      const ny = (Math.floor(i / N) + N / 2) % N;
      const angle = (2 * Math.PI * ((nx - N / 2) * eastM + (ny - N / 2) * northM)) / LATTICE.patchLengthM;
      const [re, im] = [amplitude[2 * i], amplitude[2 * i + 1]];
      amplitude[2 * i] = re * Math.cos(angle) - im * Math.sin(angle);
      amplitude[2 * i + 1] = re * Math.sin(angle) + im * Math.cos(angle);
    }
    return { ...WAVES, amplitude };
  }
});
