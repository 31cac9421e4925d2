import { describe, expect, it } from 'vitest';
import {
  dragCoefficient,
  frictionVelocity,
  windSpeedAt10m,
  windSpeedAtHeight,
} from '../../src/physics/wind.ts';
import { expectPrinted, expectRelative, FEW_ULP } from '../support/tolerances.ts';

describe('wind profile with the drag of Wu 1982', () => {
  // Law verified in ScientiMate at baa75db3; u* computed elsewhere.
  it.each([
    [5, '.1677'],
    [10, '.3808'],
    [15, '.6320'],
    [20, '.9165'],
  ])('friction velocity at %d m/s', (U10, printed) => {
    expectPrinted(frictionVelocity(U10), printed, 'u*');
  });

  // Log law for a given drag, computed elsewhere: C_D 1.3e-3 gives 1.060197, 1.5e-3 1.064662, 2e-3 1.074666.
  it.each([
    [1.3e-3, '1.060197'],
    [1.5e-3, '1.064662'],
    [2e-3, '1.074666'],
  ])('U19.5 / U10 where C_D = %f', (drag, printed) => {
    const U10 = (1e3 * drag - 0.8) / 0.065;
    expectRelative(dragCoefficient(U10), drag, FEW_ULP, 'C_D');
    expectPrinted(windSpeedAtHeight(U10, 19.5) / U10, printed, 'ratio');
  });

  // Pierson & Moskowitz's limit Hs = .2413 U10^2/g against .2092 U19.5^2/g asks for 1.0739 (computed elsewhere);
  // the textbooks' 1.026 lies below every law for the open sea.
  it('lies where the fully developed limit puts it, not at the textbook factor', () => {
    expectRelative(windSpeedAtHeight(20, 19.5) / 20, 1.0739, 4e-3, 'U19.5 / U10');
    for (const U10 of [2, 5, 10, 15]) expect(windSpeedAtHeight(U10, 19.5) / U10).toBeGreaterThan(1.045);
  });

  it.each([1, 5, 10, 12.5, 19.5, 100])('there and back at %f m', (height) => {
    for (const U10 of [0, 0.5, 5, 17, 40, 80]) {
      expectRelative(windSpeedAt10m(windSpeedAtHeight(U10, height), height), U10, 1e-14, `U10 ${U10}`);
    }
  });

  it('refuses heights and speeds outside the profile', () => {
    expect(() => windSpeedAtHeight(10, 0.5)).toThrow(RangeError);
    expect(() => windSpeedAtHeight(10, 200)).toThrow(RangeError);
    expect(() => windSpeedAtHeight(-1, 10)).toThrow(RangeError);
    expect(() => windSpeedAt10m(75, 1)).toThrow(/more than 80 m\/s/);
    expect(() => windSpeedAt10m(Number.NaN, 10)).toThrow(RangeError);
  });
});
