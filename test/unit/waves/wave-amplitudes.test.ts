import { describe, expect, it } from 'vitest';
import { SEA_WATER_DEFAULTS } from '../../../src/physics/water.ts';
import { seaWaves } from '../../../src/waves/cascade-waves.ts';
import { oppositeIndex, waveIndex } from '../../../src/waves/lattice.ts';
import { turnsPerLoop } from '../../../src/waves/turns.ts';
import { loopVariance } from '../../../src/waves/wave-amplitudes.ts';
import { jonswapSystem, largestDifference, loneCascade, rms, seaRequest } from '../../support/tiny-waves.ts';
import { expectRelative, FEW_ULP } from '../../support/tolerances.ts';

const N = 64;

/** Sum of 2 |A|^2. */
function energy(amplitude: Float64Array): number {
  return 2 * amplitude.reduce((sum, part) => sum + part * part, 0);
}

describe('turns and fade', () => {
  const current = { eastMps: 1.1, northMps: -0.4 };
  // 2 frames a second: waves of more than 1 Hz cannot be shown.
  const [{ amplitudes, tallies, expectedVariance }] = seaWaves(
    seaRequest({ current, cascades: [loneCascade({ patchLengthM: 20, frameCount: 12 })] }),
  );
  const dk = (2 * Math.PI) / 20;

  it('every wave turns as its absolute frequency has it, k and -k each by its own', () => {
    let unlike = 0;
    for (let i = 0; i < N * N; i++) {
      if (amplitudes.amplitude[2 * i] === 0) continue;
      const [kx, ky] = [dk * waveIndex(i % N, N), dk * waveIndex(Math.floor(i / N), N)];
      const k = Math.hypot(kx, ky);
      const { gravityMps2: g, surfaceTensionNpm, densityKgpm3 } = SEA_WATER_DEFAULTS;
      const sigma = Math.sqrt(g * k + (surfaceTensionNpm / densityKgpm3) * k ** 3);
      const m = turnsPerLoop(sigma + kx * current.eastMps + ky * current.northMps, sigma, 6);
      expect(amplitudes.turns[i]).toBe(m);
      const j = oppositeIndex(Math.floor(i / N), N) * N + oppositeIndex(i % N, N);
      if (amplitudes.amplitude[2 * j] !== 0 && amplitudes.turns[j] !== m) unlike++;
    }
    expect(unlike).toBeGreaterThan(100);
  });

  it('waves too fast for the frames are left out, and said to be', () => {
    let fastest = 0;
    for (let i = 0; i < N * N; i++) {
      if (amplitudes.amplitude[2 * i] !== 0) fastest = Math.max(fastest, Math.abs(amplitudes.turns[i]));
    }
    expect(fastest).toBe(5);
    const [tally] = tallies;
    expect(tally.aboveHalfFrames).toBeGreaterThan(0.001 * tally.variance);
    expect(tally.notShown).toBeGreaterThan(tally.aboveHalfFrames);
    expectRelative(expectedVariance, tally.variance - tally.notShown, 1e-12, 'what is shown');
  });
});

describe('the same patch at twice the resolution', () => {
  const cascade = loneCascade();
  const drawn = (resolution: number) =>
    seaWaves(seaRequest({ cascades: [{ ...cascade, resolution }] }))[0].amplitudes;

  it('carries the same waves, each referred to its own first texel centre', () => {
    const [coarse, fine] = [drawn(N), drawn(2 * N)];
    let waves = 0;
    for (let ny = 1 - N / 2; ny < N / 2; ny++) {
      for (let nx = 1 - N / 2; nx < N / 2; nx++) {
        const [i, j] = [cell(nx, ny, N), cell(nx, ny, 2 * N)];
        const [a, b] = [
          fromCorner(coarse.amplitude, i, nx + ny, N),
          fromCorner(fine.amplitude, j, nx + ny, 2 * N),
        ];
        expect(Math.hypot(a[0] - b[0], a[1] - b[1])).toBeLessThanOrEqual(2 * FEW_ULP * Math.hypot(...a));
        expect(fine.turns[j]).toBe(coarse.turns[i]);
        if (a[0] !== 0) waves++;
      }
    }
    expect(waves).toBeGreaterThan(700);
  });

  it('carries more where its band goes on', () => {
    const more = loneCascade({ resolution: 2 * N });
    const [{ amplitudes }] = seaWaves(seaRequest({ cascades: [more] }));
    const count = (a: Float64Array): number => a.filter((part) => part !== 0).length;
    expect(count(amplitudes.amplitude)).toBeGreaterThan(3 * count(drawn(2 * N).amplitude));
  });

  function cell(nx: number, ny: number, size: number): number {
    return ((ny + size) % size) * size + ((nx + size) % size);
  }

  /** A as seen from the tile's south-west corner: half a texel back along both axes. */
  function fromCorner(amplitude: Float64Array, i: number, n: number, size: number): [number, number] {
    const [c, s] = [Math.cos((Math.PI * n) / size), -Math.sin((Math.PI * n) / size)];
    const [re, im] = [amplitude[2 * i], amplitude[2 * i + 1]];
    return [re * c - im * s, re * s + im * c];
  }
});

describe('keys of the random numbers', () => {
  const [windSea, swell] = [
    jonswapSystem('wind sea', 0.5, 3),
    jonswapSystem('swell', 0.3, 4, { towardRad: 2 }),
  ];
  const drawn = (changes: Parameters<typeof seaRequest>[0]) =>
    seaWaves(seaRequest(changes)).map((c) => c.amplitudes);

  it('are all there is to it: the same request draws the same bits', () => {
    expect(drawn({})).toEqual(drawn({}));
  });

  it('adding a system leaves the waves of the other alone', () => {
    const [{ amplitude: both }] = drawn({ systems: [windSea, swell] });
    const [{ amplitude: first }] = drawn({ systems: [windSea] });
    const [{ amplitude: second }] = drawn({ systems: [swell] });
    const sum = first.map((part, i) => part + second[i]);
    expect(largestDifference(both, sum)).toBeLessThan(1e-14 * rms(both) * N);
  });

  it('adding a cascade leaves the waves of the other alone', () => {
    const [alone] = drawn({});
    const [, second] = drawn({ cascades: [loneCascade({ patchLengthM: 200 }), loneCascade()] });
    expect(second).toEqual(alone);
  });

  it.each<[string, 'gaussian' | 'deterministic', Parameters<typeof seaRequest>[0]]>([
    ['seeds', 'gaussian', { seed: 2 }],
    ['seeds', 'deterministic', { seed: 2 }],
    // The phases of a deterministic sea belong to the sum of its systems.
    ['names', 'gaussian', { systems: [{ ...windSea, name: 'other sea' }] }],
    ['patches', 'gaussian', { cascades: [loneCascade({ patchLengthM: 60.001 })] }],
    ['patches', 'deterministic', { cascades: [loneCascade({ patchLengthM: 60.001 })] }],
  ])('other %s have other waves, %s', (_, amplitudes, changes) => {
    const [{ amplitude: a }] = drawn({ amplitudes });
    const [{ amplitude: b }] = drawn({ amplitudes, ...changes });
    const product = a.reduce((sum, part, i) => sum + part * b[i], 0);
    // Some 60 effective waves of two parts each: five standard deviations of the correlation of independent draws.
    expect(Math.abs(2 * product) / Math.sqrt(energy(a) * energy(b))).toBeLessThan(5 / Math.sqrt(2 * 60));
  });
});

describe('deterministic amplitudes', () => {
  const request = seaRequest({
    amplitudes: 'deterministic',
    systems: [jonswapSystem('wind sea', 0.5, 3), jonswapSystem('swell', 0.3, 4, { towardRad: 0.5 })],
  });
  const [{ amplitudes, tallies, expectedVariance, drawnVariance }] = seaWaves(request);

  it('carry the summed energy of the systems in every draw', () => {
    const sum = tallies.reduce((total, tally) => total + tally.variance, 0);
    expectRelative(expectedVariance, sum, 1e-12, 'expected');
    expectRelative(drawnVariance, sum, 1e-12, 'drawn');
    expectRelative(energy(amplitudes.amplitude), sum, 1e-12, 'sum of 2 |A|^2');
    expectRelative(loopVariance(amplitudes), sum, 1e-12, 'loop');
    const [{ amplitudes: other }] = seaWaves({ ...request, seed: 9 });
    const moduli = (a: Float64Array) =>
      Float64Array.from({ length: N * N }, (_, i) => Math.hypot(a[2 * i], a[2 * i + 1]));
    const [ours, theirs] = [moduli(amplitudes.amplitude), moduli(other.amplitude)];
    expect(largestDifference(ours, theirs)).toBeLessThan(1e-14);
  });
});

describe('matchHeight', () => {
  it.each(['gaussian', 'deterministic'] as const)(
    '%s: makes the written loop exactly as high as expected',
    (amplitudes) => {
      for (const current of [
        { eastMps: 0, northMps: 0 },
        { eastMps: -2.2, northMps: 0.3 },
      ]) {
        const [free] = seaWaves(seaRequest({ amplitudes, current }));
        const [matched] = seaWaves(seaRequest({ amplitudes, current, matchHeight: true }));
        expectRelative(loopVariance(matched.amplitudes), matched.expectedVariance, 1e-12, 'variance');
        expect(matched.drawnVariance).toBe(free.drawnVariance);
        expect(matched.expectedVariance).toBe(free.expectedVariance);
        const factor = Math.sqrt(free.expectedVariance / free.drawnVariance);
        const scaled = free.amplitudes.amplitude.map((part) => factor * part);
        expect(matched.amplitudes.amplitude).toEqual(scaled);
      }
    },
  );
});
