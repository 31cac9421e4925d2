import { describe, expect, it } from 'vitest';
import type { ManifestFoam, ManifestLoop } from '../../../src/manifest/manifest.ts';
import { foamLaw } from '../../../src/verify/foam-law.ts';

const LOOP: ManifestLoop = { seconds: 8, frameRate: [24, 1], frameCount: 192, firstFrame: 1 };
const FOAM: ManifestFoam = {
  share: 1,
  coverage: { target: 0.01, measured: 0.01 },
  note: null,
  breakingJ: 0.6,
  rampJ: 0.1,
  decayTimeS: 8 / 3,
  loopResidue: Math.exp(-3),
};

describe('the law of foam', () => {
  it('fades by 1/e in a decay time where the residue is kept', () => {
    const { faded } = foamLaw(FOAM, LOOP, 'keep');
    let shown = 1;
    for (let frame = 0; frame < 64; frame++) shown = faded(shown);
    expect(shown).toBeCloseTo(Math.exp(-1), 12);
  });

  it('shows nothing after just one loop where it is removed', () => {
    const { faded } = foamLaw(FOAM, LOOP, 'remove');
    let shown = 1;
    let frames = 0;
    for (; shown > 1e-12; frames++) shown = faded(shown);
    expect(frames).toBe(192);
    expect(faded(0)).toBe(0);
  });

  it('is fresh below the breaking level and full a ramp below it', () => {
    const { fresh } = foamLaw(FOAM, LOOP, 'keep');
    expect([0.7, 0.6, 0.55, 0.5, 0.1].map((J) => fresh(J))).toEqual([
      0,
      0,
      expect.closeTo(0.5, 12),
      expect.closeTo(1, 12),
      1,
    ]);
  });

  it('is as steep as a difference says', () => {
    const { fresh, steepness } = foamLaw(FOAM, LOOP, 'remove');
    expect((fresh(0.54) - fresh(0.55)) / 0.01).toBeCloseTo(steepness, 9);
  });
});
