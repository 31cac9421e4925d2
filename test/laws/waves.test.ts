import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { SEA_WATER_DEFAULTS } from '../../src/physics/water.ts';
import { bandVariances, seaWaves, systemTables } from '../../src/waves/cascade-waves.ts';
import { cellVariances } from '../../src/waves/cell-variance.ts';
import { oppositeIndex } from '../../src/waves/lattice.ts';
import { waveAmplitudes } from '../../src/waves/wave-amplitudes.ts';
import { between, spread } from '../support/form-arbitraries.ts';
import { frameFields, jonswapSystem, loneBand, loneCascade, rms, seaRequest } from '../support/tiny-waves.ts';
import { CELL_SUM, expectRelative } from '../support/tolerances.ts';

const STILL = { eastMps: 0, northMps: 0 };

/** Seeds are fixed, so that these pass or fail for good; each bound is five standard deviations, a chance of 6e-7. */
const SIGMAS = 5;

describe('Gaussian amplitudes', () => {
  const N = 128;
  const lattice = { patchLengthM: 120, resolution: N };
  const band = loneBand(lattice);
  const tables = systemTables(
    { water: SEA_WATER_DEFAULTS, systems: [jonswapSystem('sea', 1, 4, { s: 1 })], gains: [] },
    [],
  );
  const variances = bandVariances(tables, band);
  const { variance: P } = cellVariances(tables[0], lattice, band, variances[0]);
  const draws = [1, 2, 3].map((seed) => {
    const loop = { frameCount: 96, periodS: 12 };
    const options = { seed, amplitudes: 'gaussian', matchHeight: false } as const;
    const request = {
      tables,
      bandVariances: variances,
      lattice,
      band,
      water: SEA_WATER_DEFAULTS,
      current: STILL,
    };
    return waveAmplitudes({ ...request, ...loop, ...options }).amplitudes.amplitude;
  });
  /** A over its expected modulus sqrt(P/2), and that of the opposite wave. */
  const normalised: [re: number, im: number, reOpposite: number, imOpposite: number][] = [];
  for (const A of draws) {
    for (let i = 0; i < N * N; i++) {
      const j = oppositeIndex(Math.floor(i / N), N) * N + oppositeIndex(i % N, N);
      if (P[i] === 0 || P[j] === 0) continue;
      const [a, b] = [Math.sqrt(P[i] / 2), Math.sqrt(P[j] / 2)];
      normalised.push([A[2 * i] / a, A[2 * i + 1] / a, A[2 * j] / b, A[2 * j + 1] / b]);
    }
  }
  const n = normalised.length;
  const mean = (f: (wave: [number, number, number, number]) => number): number =>
    normalised.reduce((sum, wave) => sum + f(wave), 0) / n;

  it('have 2 |A|^2 of mean P, not twice or half of it', () => {
    expect(n).toBeGreaterThan(9000);
    // |A|^2 / (P/2) is exponential: mean 1, deviation 1; its square has mean 2, deviation sqrt(20).
    const square = ([re, im]: readonly number[]): number => re * re + im * im;
    expect(Math.abs(mean(square) - 1)).toBeLessThan(SIGMAS / Math.sqrt(n));
    expect(Math.abs(mean((w) => square(w) ** 2) - 2)).toBeLessThan((SIGMAS * Math.sqrt(20)) / Math.sqrt(n));
  });

  it('have independent parts of mean 0, and nothing to do with the opposite wave', () => {
    // Products of two independent normal parts of variance 1/2 have deviation 1/2; each pair is met twice.
    const bound = (SIGMAS * Math.SQRT2) / Math.sqrt(n) / 2;
    expect(Math.abs(mean(([re]) => re))).toBeLessThan(SIGMAS * Math.sqrt(0.5 / n));
    expect(Math.abs(mean(([, im]) => im))).toBeLessThan(SIGMAS * Math.sqrt(0.5 / n));
    expect(Math.abs(mean(([re, im]) => re * im))).toBeLessThan(bound);
    expect(Math.abs(mean(([re, , opposite]) => re * opposite))).toBeLessThan(bound);
    expect(Math.abs(mean(([, im, , opposite]) => im * opposite))).toBeLessThan(bound);
    expect(Math.abs(mean(([re, , , opposite]) => re * opposite))).toBeLessThan(bound);
  });
});

describe('the surface is as high as the sum of its cells', () => {
  it('on average over seeds, as drawn', () => {
    const ratios = Array.from({ length: 12 }, (_, seed) => {
      const [{ amplitudes, expectedVariance }] = seaWaves(seaRequest({ seed }));
      return rms(frameFields(amplitudes, 5, Infinity, 1, ['height']).height) ** 2 / expectedVariance;
    });
    // About 30 effective pairs of waves: one frame's variance scatters by 1/sqrt(30).
    const bound = SIGMAS / Math.sqrt(30 * ratios.length);
    expect(Math.abs(ratios.reduce((a, b) => a + b, 0) / ratios.length - 1)).toBeLessThan(bound);
  });

  it('in every frame of a deterministic sea with waves one way only', () => {
    const systems = [jonswapSystem('swell', 1, 3.5, { s: 900 })];
    const [{ amplitudes, expectedVariance }] = seaWaves(seaRequest({ systems, amplitudes: 'deterministic' }));
    for (const frame of [0, 17]) {
      const { height } = frameFields(amplitudes, frame, Infinity, 1, ['height']);
      expectRelative(rms(height) ** 2, expectedVariance, 1e-12, 'variance');
    }
  });
});

describe('cells', () => {
  it('of any system on any patch sum, with the cell round k = 0, to the band', () => {
    const cases = fc.record({
      gamma: between(1, 10),
      s: spread(0.5, 500),
      towardRad: between(-Math.PI, Math.PI),
      peaksAcross: spread(0.8, 12),
      depthM: fc.oneof(spread(2, 100), fc.constant(Infinity)),
    });
    fc.assert(
      fc.property(cases, ({ gamma, s, towardRad, peaksAcross, depthM }) => {
        const systems = [jonswapSystem('sea', 1, 5, { gamma, s, towardRad })];
        const water = { ...SEA_WATER_DEFAULTS, depthM };
        const [table] = systemTables({ water, systems, gains: [] }, []);
        const patchLengthM = (peaksAcross * 2 * Math.PI) / table.spectrum.peakWavenumberRadPerM;
        const lattice = { patchLengthM, resolution: 64 };
        const band = loneBand(lattice);
        const [whole] = bandVariances([table], band);
        const { m0, zeroCell } = cellVariances(table, lattice, band, whole);
        expectRelative(m0 + zeroCell, whole, CELL_SUM, 'sum');
      }),
      { numRuns: 30 },
    );
  });
});

describe('the whole of a sea', () => {
  it('is shared out among cascades with nothing lost', () => {
    const border = { kRadPerM: 1, fade: 1.25 };
    const end = { kRadPerM: 6, fade: 1.25 };
    const cascades = [
      loneCascade({ patchLengthM: 60, band: { low: null, high: border } }),
      loneCascade({ patchLengthM: 23, band: { low: border, high: end } }),
    ];
    const request = seaRequest({ cascades });
    const both = seaWaves(request).reduce((sum, { expectedVariance }) => sum + expectedVariance, 0);
    const tables = systemTables(request, cascades);
    const [whole] = bandVariances(tables, { low: null, high: end });
    expectRelative(both, whole, CELL_SUM, 'two cascades');
  });
});
