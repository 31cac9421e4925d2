import { describe, it } from 'vitest';
import { steepnessEnhancement } from '../../src/spectrum/peak-enhancement.ts';
import { expectPrinted } from '../support/tolerances.ts';

describe('peak enhancement by steepness', () => {
  // DNV-RP-C205 and IEC TS 62600-2: rule verified in MHKiT-Python at 9fa9f9c9 and stglib; values computed elsewhere.
  it.each([
    [3, '5'],
    [3.6, '5'],
    [3.6 + 1e-9, '5.0028'],
    [3.8, '3.974902'],
    [4, '3.158193'],
    [4.4, '1.993716'],
    [4.8, '1.258600'],
    [5, '1'],
    [9, '1'],
  ])('Tp / sqrt Hs = %f', (ratio, printed) => {
    expectPrinted(steepnessEnhancement(4, 2 * ratio), printed, 'gamma');
  });

  // README of an open-source JONSWAP library: Hs 2.5, Tp 7 gives gamma 1.932. Status: verified.
  it('as printed', () => {
    expectPrinted(steepnessEnhancement(2.5, 7), '1.932', 'gamma');
  });
});
