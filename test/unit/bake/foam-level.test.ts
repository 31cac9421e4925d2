import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type CoverageMeter, levelOfCoverage } from '../../../src/bake/foam-level.ts';

/** A meter that counts its rounds. */
function counted(curve: (code: number) => number): { meter: CoverageMeter; rounds: () => number } {
  let rounds = 0;
  return {
    meter: async (codes) => {
      rounds++;
      return codes.map(curve);
    },
    rounds: () => rounds,
  };
}

const HIGHEST = 50_000;
/** Coverage of Gaussian-like J: rises from 0, steeply somewhere. */
const logistic =
  (middle: number, width: number) =>
  (code: number): number =>
    code === 0 ? 0 : 1 / (1 + Math.exp((middle - code) / width));

describe('the breaking level', () => {
  it('gives a coverage within the tolerance wherever the curve rises and however steeply', async () => {
    await fc.assert(
      fc.asyncProperty(
        fc.double({ min: 5000, max: 45_000, noNaN: true }),
        fc.double({ min: 0.005, max: 0.07, noNaN: true }),
        fc.double({ min: 1e-4, max: 0.5, noNaN: true }),
        async (middle, steepness, target) => {
          const curve = logistic(middle, steepness * middle);
          const { meter, rounds } = counted(curve);
          const level = await levelOfCoverage(target, HIGHEST, meter, 2);
          if (curve(HIGHEST) < target * 0.98) {
            expect(level.note).toMatch(/short of/);
            expect(level.breakingCode).toBe(HIGHEST);
          } else {
            expect(level.note).toBeNull();
            expect(Math.abs(level.coverage / target - 1)).toBeLessThanOrEqual(0.02);
          }
          expect(level.coverage).toBe(curve(level.breakingCode));
          expect(rounds()).toBeLessThan(20);
        },
      ),
      { numRuns: 500 },
    );
  });

  it('is found where the coarse grid leads the bracket astray, either way', async () => {
    for (const shift of [-3000, -200, 200, 3000]) {
      const fine = logistic(20_000, 1000);
      const coarse = logistic(20_000 + shift, 1000);
      const meter: CoverageMeter = async (codes, stride) => codes.map(stride === 1 ? fine : coarse);
      const level = await levelOfCoverage(0.01, HIGHEST, meter, 2);
      expect(Math.abs(level.coverage / 0.01 - 1), `${shift}`).toBeLessThanOrEqual(0.02);
    }
  });

  it('ends where the highest level falls short by less than the tolerance', async () => {
    const { meter, rounds } = counted((code) => (0.099 * code) / HIGHEST);
    const level = await levelOfCoverage(0.1, HIGHEST, meter, 1);
    expect(level).toEqual({ breakingCode: HIGHEST, coverage: 0.099, note: null });
    expect(rounds()).toBe(1);
  });

  it('says so where the steps of the written map are too coarse for the target', async () => {
    const meter: CoverageMeter = async (codes) => codes.map((code) => (code < 12_345 ? 0.004 : 0.02));
    const level = await levelOfCoverage(0.01, HIGHEST, meter, 1);
    expect(level.note).toBe("the written map's steps allow 0.00400 for a target of 0.0100");
    expect(level.breakingCode).toBe(12_344);
  });

  it.each([
    [1.015, null],
    [1.03, "the written map's steps allow 0.0103 for a target of 0.0100"],
  ])('may miss the target by 2 %% and no more: steps of %f', async (above, note) => {
    const meter: CoverageMeter = async (codes) => codes.map((code) => (code < 500 ? 0.004 : 0.01 * above));
    const level = await levelOfCoverage(0.01, HIGHEST, meter, 1);
    expect(level).toEqual({ breakingCode: 500, coverage: 0.01 * above, note });
  });

  it('is at the bottom for no foam at all', async () => {
    const { meter, rounds } = counted(() => 1);
    expect(await levelOfCoverage(0, HIGHEST, meter, 1)).toEqual({ breakingCode: 0, coverage: 0, note: null });
    expect(rounds()).toBe(0);
  });
});
