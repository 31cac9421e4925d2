import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { FIELD_NAMES } from '../../src/field/frame-fields.ts';
import { SEA_WATER_DEFAULTS } from '../../src/physics/water.ts';
import { seaWaves } from '../../src/waves/cascade-waves.ts';
import { shownShare, turnsPerLoop } from '../../src/waves/turns.ts';
import { between, spread } from '../support/form-arbitraries.ts';
import {
  frameFields,
  jonswapSystem,
  loneCascade,
  rms,
  scatteredWaves,
  seaRequest,
} from '../support/tiny-waves.ts';

const anyWave = fc.record({
  sigma: spread(0.05, 50),
  doppler: between(-3, 3),
  periodS: spread(0.5, 120),
});

describe('turns', () => {
  it('are the whole number nearest to the true one, unless the wave is longer than the loop', () => {
    fc.assert(
      fc.property(anyWave, ({ sigma, doppler, periodS }) => {
        const omega = sigma * (1 + doppler);
        const [own, absolute] = [sigma, omega].map((w) => (w * periodS) / (2 * Math.PI));
        const m = turnsPerLoop(omega, sigma, periodS);
        expect(Number.isInteger(m)).toBe(true);
        if (own >= 0.5) expect(Math.abs(m - absolute)).toBeLessThanOrEqual(0.5 + 1e-9);
        // A wave longer than the loop still moves, the way it should.
        else expect(Math.abs(m - absolute)).toBeLessThanOrEqual(1);
        if (own < 0.5) expect(m).not.toBe(0);
        if (m !== 0 && omega !== 0) expect(Math.sign(m)).toBe(Math.sign(omega));
      }),
      { numRuns: 2000 },
    );
  });

  it('stand still in still water for no wave', () => {
    fc.assert(
      fc.property(anyWave, ({ sigma, periodS }) => {
        expect(turnsPerLoop(sigma, sigma, periodS)).toBeGreaterThanOrEqual(1);
      }),
      { numRuns: 2000 },
    );
  });
});

describe('what the frames show', () => {
  it('falls with the number of turns, alike both ways, to nothing at half the frames', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 5000 }), fc.nat(6000), (frameCount, m) => {
        const share = shownShare(m, frameCount);
        expect(share).toBe(shownShare(-m, frameCount));
        expect(share).toBeGreaterThanOrEqual(shownShare(m + 1, frameCount));
        if (2 * m >= frameCount) expect(share).toBe(0);
        if (2 * m <= 0.9 * frameCount) expect(share).toBe(1);
      }),
      { numRuns: 2000 },
    );
  });
});

describe('loops', () => {
  it('close: frame n + N is frame n, to the bit, in any loop', () => {
    const anyLoop = fc.record({ frameCount: fc.integer({ min: 1, max: 300 }), periodS: spread(0.5, 60) });
    fc.assert(
      fc.property(anyLoop, fc.nat(100), fc.integer({ min: -5, max: 5 }), (loop, n, times) => {
        const waves = scatteredWaves({ patchLengthM: 30, resolution: 8 }, loop, n);
        expect(frameFields(waves, n + times * loop.frameCount)).toEqual(frameFields(waves, n));
      }),
      { numRuns: 50 },
    );
  });

  it('run on: the step from the last frame to the first is like any other', () => {
    const [{ amplitudes }] = seaWaves(
      seaRequest({ cascades: [loneCascade({ frameCount: 48, periodS: 6 })] }),
    );
    const heights = Array.from(
      { length: 49 },
      (_, n) => frameFields(amplitudes, n, Infinity, 1, ['height']).height,
    );
    const steps = heights.slice(1).map((height, n) => rms(height.map((eta, i) => eta - heights[n][i])));
    const mean = steps.reduce((a, b) => a + b, 0) / steps.length;
    expect(Math.abs(steps[47] / mean - 1)).toBeLessThan(0.2);
    // ... and no two frames of the loop are alike.
    expect(Math.min(...steps)).toBeGreaterThan(0.7 * mean);
  });

  it('a cascade that loops sooner repeats within the whole', () => {
    const short = loneCascade({ frameCount: 24, periodS: 3 });
    const [{ amplitudes }] = seaWaves(seaRequest({ cascades: [short] }));
    for (const name of FIELD_NAMES) {
      expect(frameFields(amplitudes, 24 + 5)[name]).toEqual(frameFields(amplitudes, 5)[name]);
    }
  });

  it('the same waves at twice the frame rate: every other frame is the same', () => {
    // No wave is near either frame rate's limit, so that neither fades any.
    const systems = [jonswapSystem('sea', 0.5, 4)];
    const cascades = (frameCount: number) => [loneCascade({ resolution: 32, frameCount, periodS: 6 })];
    const [slow] = seaWaves(seaRequest({ systems, cascades: cascades(48) }));
    const [fast] = seaWaves(seaRequest({ systems, cascades: cascades(96) }));
    expect(fast.amplitudes.amplitude).toEqual(slow.amplitudes.amplitude);
    for (const n of [0, 13, 47]) {
      expect(frameFields(fast.amplitudes, 2 * n).height).toEqual(frameFields(slow.amplitudes, n).height);
    }
  });
});

describe('water', () => {
  it('of a finite depth loops like deep water: the waves stay, their turns change', () => {
    const cascades = [loneCascade({ resolution: 32 })];
    const shallow = { ...SEA_WATER_DEFAULTS, depthM: 1.5 };
    const [deep] = seaWaves(seaRequest({ cascades }));
    const [slowed] = seaWaves(seaRequest({ cascades, water: shallow }));
    let fewer = 0;
    for (let i = 0; i < 32 * 32; i++) {
      if (slowed.amplitudes.amplitude[2 * i] === 0 || deep.amplitudes.amplitude[2 * i] === 0) continue;
      expect(slowed.amplitudes.turns[i]).toBeLessThanOrEqual(deep.amplitudes.turns[i]);
      if (slowed.amplitudes.turns[i] < deep.amplitudes.turns[i]) fewer++;
    }
    expect(fewer).toBeGreaterThan(10);
  });
});
