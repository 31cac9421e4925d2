import { describe, expect, it } from 'vitest';
import { addToTally, emptyTally, type TalliedWave } from '../../../src/waves/lattice-tally.ts';

/** A wave of period 4 s, three across and four along, that turns twice in a loop of 10 s and 40 frames. */
const WAVE: TalliedWave = {
  variance: 0.5,
  shown: 0.4,
  nx: 3,
  ny: 4,
  sigma: Math.PI / 2,
  omega: Math.PI / 2 + 0.1,
  turns: 2,
  periodS: 10,
  frameCount: 40,
};

function tallied(...waves: readonly Partial<TalliedWave>[]) {
  const tally = emptyTally('sea', 0.03);
  for (const changes of waves) addToTally(tally, { ...WAVE, ...changes });
  return tally;
}

describe('addToTally', () => {
  it('adds what one wave carries', () => {
    const error = (0.4 * Math.PI - WAVE.omega) / WAVE.sigma;
    const lost = (0.4 * (1 - Math.cos(2 * Math.PI * 0.05))) / 3;
    const expected = {
      variance: 0.5,
      squares: 0.25,
      frequency: 0.5 * WAVE.sigma,
      east: 0.3,
      north: 0.4,
      slope: 0.5 * 25,
      frequencyError: 0.5 * error ** 2,
      slopeFrequencyError: 0.5 * 25 * error ** 2,
      longerThanLoop: 0,
      aboveHalfFrames: 0,
      notShown: 0.1,
      blendingLoss: lost,
      slopeBlendingLoss: 25 * lost,
    };
    const tally = tallied({});
    for (const [key, value] of Object.entries(expected)) {
      expect(tally[key as keyof typeof expected], key).toBeCloseTo(value, 14);
    }
    expect(tally).toMatchObject({ system: 'sea', zeroCell: 0.03 });
  });

  it('adds waves up', () => {
    const both = tallied({}, { nx: -3, ny: -4, variance: 0.25 });
    expect([both.variance, both.squares]).toEqual([0.75, 0.3125]);
    expect(both.east).toBeCloseTo(0.3 - 0.15, 14);
  });

  it('tells waves longer than the loop and faster than its frames', () => {
    expect(tallied({ sigma: 0.6 }).longerThanLoop).toBe(0.5);
    expect(tallied({ sigma: 0.7 }).longerThanLoop).toBe(0);
    expect([20, 21, -21].map((turns) => tallied({ turns }).aboveHalfFrames)).toEqual([0, 0.5, 0.5]);
  });
});
