import { describe, expect, it } from 'vitest';
import { loopReport } from '../../src/plan/loop-report.ts';
import type { LoopReport } from '../../src/plan/plan.ts';
import type { Loop } from '../../src/sea/sea.ts';
import { omegaMinusFive } from '../../src/spectrum/omega-minus-five.ts';
import { radialIntegral } from '../../src/waves/radial-table.ts';
import { turnsPerLoop } from '../../src/waves/turns.ts';
import { laidOut, seaOf, swellKeys, windSeaKeys } from '../support/planned-seas.ts';
import { expectPrinted } from '../support/tolerances.ts';

/*
 * What whole turns do to the motion, computed by an independent program from the same rule (nearest whole number, at
 * least 1). Status: computed elsewhere.
 */

/** Energy-weighted rms relative error of frequency of a JONSWAP spectrum in a loop of so many peak periods, percent. */
function universalError(peakPeriods: number, gamma: number): number {
  let [sum, total] = [0, 0];
  for (let omega = 0.3; omega < 40; omega *= 1.0003) {
    const sigma = omega <= 1 ? 0.07 : 0.09;
    const S = omegaMinusFive(omega, 1) * gamma ** Math.exp(-0.5 * ((omega - 1) / sigma) ** 2);
    const periodS = 2 * Math.PI * peakPeriods;
    const error = (2 * Math.PI * turnsPerLoop(omega, omega, periodS)) / periodS / omega - 1;
    sum += S * omega * error * error;
    total += S * omega;
  }
  return 100 * Math.sqrt(sum / total);
}

describe('frequency error of a loop, by its length in peak periods', () => {
  it.each([
    [1, '18', '15.3', '14', '12'],
    [1.25, '19', '20', '20', '21'],
    [1.5, '19', '22.6', '24', '26'],
    [1.75, '16', '15.6', '15.5', '15'],
    [2, '12.5', '10.9', '10.2', '8.9'],
    [2.5, '10', '12', '13', '14'],
    [3, '8.7', '8.0', '7.7', '7.0'],
    [4, '6.4', '6.2', '6.1', '5.8'],
    [8, '3.2', '3.3', '3.4', '3.4'],
  ])('T = %f Tp, gamma 1, 3.3, 5, 10', (peakPeriods, ...printed) => {
    for (const [i, gamma] of [1, 3.3, 5, 10].entries()) {
      expectClose(universalError(peakPeriods, gamma), printed[i], `gamma ${gamma}`);
    }
  });
});

describe('frequency error of a loop of a sea in deep water, percent, by height and by slope of waves from 0.25 m', () => {
  const lengths = [2, 4, 6, 8, 10, 12, 16, 20, 30];
  it.each([
    [
      'U10 = 5 m/s, 20 km',
      windSeaKeys(5, 20),
      '42 23 10.6 9.6 8.4 6.2 5.0 3.8 2.6',
      '20 12 6.6 5.2 4.5 3.5 2.7 2.1 1.4',
    ],
    [
      'U10 = 10 m/s, 100 km',
      windSeaKeys(10, 100),
      '193 52 16 21 20 11.7 11.7 8.1 5.5',
      '74 20 10.9 10.3 8.4 5.9 5.2 3.9 2.6',
    ],
    [
      'U10 = 20 m/s, 500 km',
      windSeaKeys(20, 500),
      '520 213 111 61 34 19 19 22 11.2',
      '188 70 34 19 12.8 10.2 8.9 8.0 4.8',
    ],
    [
      'swell of 14 s',
      swellKeys(14, 5, 75),
      '560 232 123 69 39 21 17 24 10.4',
      '219 85 43 24 15 10.7 9.2 9.6 5.1',
    ],
  ])('%s', (_, keys, byHeight, bySlope) => {
    const [table] = laidOut(seaOf([keys])).tables;
    lengths.forEach((periodS, i) => {
      const squaredError = (k: number): number => {
        const omega = table.spectrum.intrinsicFrequency(k);
        return ((2 * Math.PI * turnsPerLoop(omega, omega, periodS)) / periodS / omega - 1) ** 2;
      };
      const slope = (k: number): number => (k > (2 * Math.PI) / 0.25 ? 0 : k * k);
      const weigh = (weight: (k: number) => number): number =>
        100 *
        Math.sqrt(radialIntegral(table, (k) => weight(k) * squaredError(k)) / radialIntegral(table, weight));
      expectClose(
        weigh(() => 1),
        byHeight.split(' ')[i],
        `T = ${periodS} s, by height`,
      );
      expectClose(weigh(slope), bySlope.split(' ')[i], `T = ${periodS} s, by slope`);
    });
  });
});

/** Expects a printed number to its last digit, and 2 % more: by so much the printed ones differ among themselves. */
function expectClose(value: number, printed: string, what: string): void {
  const unit = 10 ** -(printed.split('.')[1] ?? '').length;
  expect(Math.abs(value - Number(printed)), `${what}: ${value}, printed ${printed}`).toBeLessThan(
    0.55 * unit + 0.02 * value,
  );
}

/** What a loop of this sea suggests, from its continuous spectrum. */
function suggested(keys: Readonly<Record<string, unknown>>, seconds: number): LoopReport['suggestions'] {
  const sea = seaOf([keys]);
  const { layouts, tables } = laidOut(sea);
  const loop: Loop = { ...sea.loop, frameCount: Math.round(24 * seconds) };
  return loopReport(
    layouts,
    layouts.map(() => []),
    tables,
    loop,
    sea.water,
    sea.current,
  ).suggestions;
}

describe('best loops within 15 % of the one asked for, whole frames at 24 a second', () => {
  it.each<[string, Readonly<Record<string, unknown>>, number, string, string]>([
    ['U10 = 10 m/s, 100 km', windSeaKeys(10, 100), 10, '11.5', '13.2'],
    ['swell of 14 s', swellKeys(14, 5, 75), 12.5, '14.2', '14.1'],
  ])('%s: %#', (_, keys, asked, seconds, error) => {
    const [near] = suggested(keys, asked);
    expectPrinted(near.seconds, seconds, 'seconds');
    expectPrinted(100 * near.frequencyError, error, 'error, %');
    expect(near.frameCount / 24).toBeCloseTo(near.seconds, 12);
  });

  it('and the shortest longer one within 10 %', () => {
    // Errors stay below a tenth from some 2.75 peak periods on: 6.23 s x 2.75 = 17.1 s.
    const longer = suggested(windSeaKeys(10, 100), 8).at(-1);
    expect(longer?.seconds).toBeGreaterThan(16);
    expect(longer?.seconds).toBeLessThan(18);
    expect(longer?.frequencyError).toBeLessThan(0.1);
  });
});
