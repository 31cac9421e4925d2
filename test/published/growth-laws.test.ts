import { describe, expect, it } from 'vitest';
import { fetchLimitedAfter, fetchOfDuration } from '../../src/physics/growth-laws/duration.ts';
import { type GrowthLawName, waveGrowth } from '../../src/physics/growth-laws/registry.ts';
import { shoreProtectionManualFetch } from '../../src/physics/growth-laws/shore-protection-manual.ts';
import { expectPrinted, expectRelative } from '../support/tolerances.ts';

// Laws verified in ScientiMate at baa75db3; values computed elsewhere with g = 9.81.
const g = 9.81;

/** Hs and Tp of a law, each as printed. */
type Printed = readonly [height: string, period: string];

interface Row {
  readonly wind: number;
  readonly fetch: number;
  readonly printed: Readonly<Record<'spm' | 'kc' | 'wilson' | 'yv10' | 'yv1000' | 'jonswap', Printed>>;
  readonly duration: string;
}

const ROWS: readonly Row[] = [
  {
    wind: 10,
    fetch: 10e3,
    printed: {
      spm: ['.61595', '3.08000'],
      kc: ['.65259', '3.00290'],
      wilson: ['.64304', '2.78866'],
      yv10: ['.47914', '2.98203'],
      yv1000: ['.49258', '3.00313'],
      jonswap: ['.51084', '2.82822'],
    },
    duration: '7953.08',
  },
  {
    wind: 10,
    fetch: 100e3,
    printed: {
      spm: ['1.94780', '6.63565'],
      kc: ['1.83926', '5.59166'],
      wilson: ['1.48930', '4.79387'],
      yv10: ['1.08329', '4.75487'],
      yv1000: ['1.41562', '5.47787'],
      jonswap: ['1.61542', '6.04663'],
    },
    duration: '37199.3',
  },
  {
    wind: 15,
    fetch: 50e3,
    printed: {
      spm: ['2.26789', '6.21925'],
      kc: ['2.10320', '5.58811'],
      wilson: ['1.99525', '5.12665'],
      yv10: ['1.32509', '5.05415'],
      yv1000: ['1.62934', '5.57939'],
      jonswap: ['1.71341', '5.52134'],
    },
    duration: '20369.2',
  },
  {
    wind: 20,
    fetch: 100e3,
    printed: {
      spm: ['4.56889', '8.81670'],
      kc: ['3.94255', '7.69157'],
      wilson: ['3.71059', '7.03486'],
      yv10: ['1.95566', '5.92718'],
      yv1000: ['3.06306', '7.67608'],
      jonswap: ['3.23084', '7.65357'],
    },
    duration: '29389.0',
  },
  {
    wind: 20,
    fetch: 500e3,
    printed: {
      spm: ['10.2163', '15.0763'],
      kc: ['8.13417', '11.8778'],
      wilson: ['6.35735', '10.0224'],
      yv10: ['2.10629', '6.01726'],
      yv1000: ['6.17141', '11.5450'],
      jonswap: ['7.22438', '13.0174'],
    },
    duration: '86396.3',
  },
];

describe.each(ROWS)('$wind m/s over $fetch m', ({ wind, fetch, printed, duration }) => {
  it.each([
    ['jonswap-1973', Infinity, printed.jonswap],
    ['kahma-calkoen', Infinity, printed.kc],
    ['shore-protection-manual', Infinity, printed.spm],
    ['young-verhagen', 10, printed.yv10],
    ['young-verhagen', 1000, printed.yv1000],
  ] as [GrowthLawName, number, Printed][])('%s, depth %f m', (law, depthM, [height, period]) => {
    const sea = waveGrowth(law, { windSpeedMps: wind, fetchM: fetch, depthM, gravityMps2: g });
    expectPrinted(sea.significantHeightM, height, 'Hs');
    expectPrinted(sea.peakPeriodS, period, 'Tp');
  });

  it('wilson, whose period is the significant one', () => {
    const sea = waveGrowth('wilson', { windSpeedMps: wind, fetchM: fetch, depthM: Infinity, gravityMps2: g });
    expectPrinted(sea.significantHeightM, printed.wilson[0], 'Hs');
    expectPrinted(0.95 * sea.peakPeriodS, printed.wilson[1], 'Ts');
  });

  it('time to become limited by the fetch', () => {
    expectPrinted(fetchLimitedAfter(wind, fetch, g), duration, 't');
    expectRelative(
      fetchOfDuration(wind, fetchLimitedAfter(wind, fetch, g), g),
      fetch,
      1e-13,
      'there and back',
    );
  });
});

describe('limits', () => {
  it.each(['jonswap-1973', 'kahma-calkoen', 'young-verhagen'] as const)('%s ends fully developed', (law) => {
    const sea = waveGrowth(law, { windSpeedMps: 12, fetchM: Infinity, depthM: Infinity, gravityMps2: g });
    expectPrinted((sea.significantHeightM * g) / 144, '.24133', 'g Hs / U^2');
    expectPrinted((sea.peakPeriodS * g) / 12, '7.5188', 'g Tp / U');
  });

  // A worked exercise for U_A = 15 m/s prints Hm0 3.417 m, Tp 9.0 s over 200 km, and fetch and duration of full
  // development of 529 037 m and 109 327 s (verified; rounded steps, .4 %).
  it('Shore Protection Manual, worked exercise', () => {
    const windSpeedMps = (15 / 0.71) ** (1 / 1.23);
    const conditions = { windSpeedMps, depthM: Infinity, gravityMps2: g };
    const sea = waveGrowth('shore-protection-manual', { ...conditions, fetchM: 200e3 });
    expectRelative(sea.significantHeightM, 3.417, 4e-3, 'Hm0');
    expectPrinted(sea.peakPeriodS, '9.0', 'Tp');
    const developed = waveGrowth('shore-protection-manual', { ...conditions, fetchM: Infinity });
    expectPrinted((developed.significantHeightM * g) / 15 ** 2, '.2433', 'g Hs / U_A^2');
    expectPrinted((developed.peakPeriodS * g) / 15, '8.134', 'g Tp / U_A');
    const [before, at] = [527e3, 531e3].map((fetchM) =>
      waveGrowth('shore-protection-manual', { ...conditions, fetchM }),
    );
    expect(before.peakPeriodS).toBeLessThan(developed.peakPeriodS);
    expect(at.peakPeriodS).toBe(developed.peakPeriodS);
    expect(shoreProtectionManualFetch(windSpeedMps, 109_000, g)).toBeLessThan(Infinity);
    expect(shoreProtectionManualFetch(windSpeedMps, 109_500, g)).toBe(Infinity);
    // Duration and fetch limits of the manual do not belong to the same dimensionless fetch (33 500 and 23 100).
    expectRelative(
      shoreProtectionManualFetch(windSpeedMps, 109_327 * (1 - 1e-5), g),
      (33_503 * 225) / g,
      1e-4,
      'fetch',
    );
    const halfway = (68.8 * ((g * 100e3) / 225) ** (2 / 3) * 15) / g;
    expectRelative(shoreProtectionManualFetch(windSpeedMps, halfway, g), 100e3, 1e-12, 'there and back');
  });

  it('refuses what is not positive', () => {
    const conditions = { windSpeedMps: 10, fetchM: 1e4, depthM: 10, gravityMps2: g };
    expect(() => waveGrowth('wilson', { ...conditions, windSpeedMps: 0 })).toThrow(/wind speed/);
    expect(() => waveGrowth('wilson', { ...conditions, fetchM: -1 })).toThrow(/fetch/);
    expect(() => waveGrowth('wilson', { ...conditions, depthM: Number.NaN })).toThrow(/depth/);
  });
});
