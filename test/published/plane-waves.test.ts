import { describe, expect, it } from 'vitest';
import type { FrameFields } from '../../src/field/frame-fields.ts';
import { fillJacobian, fillNormals } from '../../src/maps/surface.ts';
import { angularFrequency } from '../../src/physics/dispersion.ts';
import { SEA_WATER_DEFAULTS } from '../../src/physics/water.ts';
import { fieldDeviations } from '../../src/waves/field-deviations.ts';
import { turnsPerLoop } from '../../src/waves/turns.ts';
import { frameFields, handWaves } from '../support/tiny-waves.ts';
import { expectPrinted, expectRelative } from '../support/tolerances.ts';

/*
 * Scenes of one and two waves, by closed forms evaluated in an independent program (without surface tension).
 * Status: computed elsewhere.
 */

const WITHOUT_TENSION = { ...SEA_WATER_DEFAULTS, surfaceTensionNpm: 0 };
const LOOP = { frameCount: 8, periodS: 20 };

function jacobian(fields: Required<FrameFields>): Float64Array {
  const J = new Float64Array(fields.height.length);
  fillJacobian(J, fields);
  return J;
}

const least = (values: Float64Array): number => values.reduce((a, b) => Math.min(a, b));
const largest = (values: Float64Array): number => values.reduce((a, b) => Math.max(a, b));

describe('one wave of 0.5 m, three across east and four across north of 100 m', () => {
  const waves = handWaves({ patchLengthM: 100, resolution: 32 }, LOOP, [
    { nx: 3, ny: 4, amplitudeM: 0.5, turns: 6 },
  ]);
  const k = (5 * 2 * Math.PI) / 100;

  it('wavenumber, frequency, variance, height and slope variance', () => {
    expectPrinted(k, '.31415927', 'k');
    expectPrinted(angularFrequency(k, WITHOUT_TENSION), '1.7552350', 'omega');
    const { height, slopeEast, slopeNorth } = fieldDeviations(waves, Infinity, 1);
    expectPrinted(height ** 2, '.125', 'm0');
    expectPrinted(4 * height, '1.4142136', 'Hs');
    expectPrinted(slopeEast ** 2 + slopeNorth ** 2, '.012337006', 'slope variance');
  });

  it('displacement of 0.5 m along (.6, .8) and the range of J', () => {
    const fields = frameFields(waves, 0);
    // The crest lies on a texel; a quarter of a wave from it another does: 32 texels, phases in 32nds of a turn.
    expectRelative(largest(fields.displacementEast), 0.3, 1e-12, 'east');
    expectRelative(largest(fields.displacementNorth), 0.4, 1e-12, 'north');
    expectPrinted(least(jacobian(fields)), '.84292037', 'least J');
    expectPrinted(largest(jacobian(fields)), '1.15707963', 'largest J');
  });
});

describe('two waves of 0.5 m at right angles, five across 100 m, where their crests meet', () => {
  const waves = handWaves({ patchLengthM: 100, resolution: 32 }, LOOP, [
    { nx: 5, ny: 0, amplitudeM: 0.5, turns: 1 },
    { nx: 0, ny: 5, amplitudeM: 0.5, turns: 1 },
  ]);
  it.each([
    [1, '.84292037', '.71051475'],
    [2, '.68584073', '.47037751'],
  ])('horizontal scale %i', (scale, stretch, J) => {
    const fields = frameFields(waves, 0, Infinity, scale);
    expectPrinted(1 + fields.strainEastEast[0], stretch, 'Jxx');
    expectPrinted(1 + fields.strainNorthNorth[0], stretch, 'Jyy');
    expectPrinted(jacobian(fields)[0], J, 'J');
  });
});

describe('a wave of steepness ak', () => {
  const steepWave = (ak: number, frameCount: number) =>
    handWaves({ patchLengthM: 2 * Math.PI * 7, resolution: 64 }, { frameCount, periodS: 5 }, [
      { nx: 1, ny: 0, amplitudeM: 7 * ak, turns: 1 },
    ]);

  it.each([
    [0.3, '.7'],
    [0.5, '.5'],
    [1, '0'],
    [1.2, '-.2'],
  ])('%f: least J', (ak, printed) => {
    const J = least(jacobian(frameFields(steepWave(ak, 8), 0)));
    expect(Math.abs(J - Number(printed))).toBeLessThan(1e-14);
  });

  it('1.2: a fraction .186429 of it is folded and faces down', () => {
    // Twenty frames shift the phases of the texels by a twentieth of a texel each: 1280 phases evenly spaced.
    const waves = steepWave(1.2, 64 * 20);
    let [folded, down, all] = [0, 0, 0];
    for (let frame = 0; frame < 20; frame++) {
      const fields = frameFields(waves, frame);
      const J = jacobian(fields);
      const [east, north, up] = [
        new Float64Array(J.length),
        new Float64Array(J.length),
        new Float64Array(J.length),
      ];
      fillNormals(east, north, up, fields);
      folded += J.filter((value) => value < 0).length;
      down += up.filter((value) => value < 0).length;
      all += J.length;
    }
    expect(Math.abs(folded / all - 0.186429)).toBeLessThan(1 / 1280);
    expect(down).toBe(folded);
  });
});

describe('a loop changes the frequency of a wave in deep water', () => {
  it.each([
    [10, 5, '7.39'],
    [10, 20, '7.39'],
    [10, 100, '-19.96'],
    [60, 5, '1.42'],
    [60, 20, '1.42'],
    [60, 100, '-6.62'],
    [20, 20, '7.39'],
  ])('loop of %i s, wave of %i m: %s %%', (periodS, wavelengthM, printed) => {
    const omega = angularFrequency((2 * Math.PI) / wavelengthM, WITHOUT_TENSION);
    const turned = (2 * Math.PI * turnsPerLoop(omega, omega, periodS)) / periodS;
    expectPrinted(100 * (turned / omega - 1), printed, 'change, %');
  });
});
