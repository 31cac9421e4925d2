import { describe, expect, it } from 'vitest';
import { FOAM_DECAY_FRESH_S, FOAM_DECAY_SALT_S, whitecapCoverage } from '../../src/physics/whitecaps.ts';
import { expectPrinted } from '../support/tolerances.ts';

describe("whitecaps of Monahan & O'Muircheartaigh 1980", () => {
  // Law verified in OsloCTM3 at 0b29ba67; values computed elsewhere.
  it.each([
    [5, '9.28579e-4'],
    [7, '2.92493e-3'],
    [10, '9.87032e-3'],
    [15, '.0393371'],
    [20, '.104916'],
  ])('coverage at %d m/s', (wind, printed) => {
    expectPrinted(whitecapCoverage(wind), printed, 'W');
  });

  it('refuses winds it was not made for', () => {
    expect(whitecapCoverage(0)).toBe(0);
    expect(whitecapCoverage(25)).toBeLessThan(0.226);
    expect(() => whitecapCoverage(25.001)).toThrow(RangeError);
    expect(() => whitecapCoverage(-1)).toThrow(RangeError);
    expect(() => whitecapCoverage(Number.NaN)).toThrow(RangeError);
  });

  // Monahan & Zietlow 1969, as used in PyGnome at 3bfcbbf1 (verified).
  it('foam decay', () => {
    expect(FOAM_DECAY_SALT_S).toBe(3.85);
    expect(FOAM_DECAY_FRESH_S).toBe(2.54);
  });
});
