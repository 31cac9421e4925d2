import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { advanceFoam, foamSourceTable, shownFoam } from '../../src/maps/foam.ts';
import { between } from '../support/form-arbitraries.ts';
import { scattered } from '../support/image-scenes.ts';

const TEXELS = 64;

const anyFoam = fc.record({
  frameCount: fc.integer({ min: 1, max: 40 }),
  seed: fc.nat(1e6),
  decay: between(0.3, 1),
  breakingCode: between(0, 65535),
  rampCodes: between(1, 30_000),
});

/** J codes of a loop, frame by frame. */
function loopCodes(frameCount: number, seed: number): Uint16Array[] {
  return Array.from({ length: frameCount }, (_, n) =>
    Uint16Array.from({ length: TEXELS }, (_, i) => 65536 * scattered((seed * 41 + n) * TEXELS + i)),
  );
}

/** Foam after each frame of so many loops, from none. */
function foamOfLoops(
  codes: readonly Uint16Array[],
  loops: number,
  source: Float64Array,
  decay: number,
): Float64Array[] {
  const foam = new Float64Array(TEXELS);
  const frames: Float64Array[] = [];
  for (let n = 0; n < loops * codes.length; n++) {
    advanceFoam(foam, codes[n % codes.length], source, decay);
    frames.push(foam.slice());
  }
  return frames;
}

describe('foam', () => {
  it('is periodic to the bit after one loop from nothing, whatever the codes', () => {
    fc.assert(
      fc.property(anyFoam, ({ frameCount: N, seed, decay, breakingCode, rampCodes }) => {
        const codes = loopCodes(N, seed);
        const frames = foamOfLoops(codes, 4, foamSourceTable(breakingCode, rampCodes), decay);
        for (let n = N; n < 2 * N; n++) {
          expect(frames[n + N]).toEqual(frames[n]);
          expect(frames[n + 2 * N]).toEqual(frames[n]);
        }
      }),
      { numRuns: 200 },
    );
  });

  it('is the same from any frame on, warmed by one loop: a run of frames needs no other', () => {
    fc.assert(
      fc.property(anyFoam, fc.nat(39), ({ frameCount: N, seed, decay, breakingCode, rampCodes }, start) => {
        const codes = loopCodes(N, seed);
        const source = foamSourceTable(breakingCode, rampCodes);
        const whole = foamOfLoops(codes, 2, source, decay).slice(N);
        const first = start % N;
        const turned = [...codes.slice(first), ...codes.slice(0, first)];
        const run = foamOfLoops(turned, 2, source, decay).slice(N);
        for (let n = 0; n < N; n++) expect(run[n]).toEqual(whole[(n + first) % N]);
      }),
      { numRuns: 200 },
    );
  });

  it('is the strongest of all past breakers, each faded by its age round the loop point', () => {
    fc.assert(
      fc.property(anyFoam, ({ frameCount: N, seed, decay, breakingCode, rampCodes }) => {
        const codes = loopCodes(N, seed);
        const source = foamSourceTable(breakingCode, rampCodes);
        const periodic = foamOfLoops(codes, 2, source, decay).slice(N);
        for (let n = 0; n < N; n++) {
          for (let i = 0; i < TEXELS; i += 7) {
            let strongest = 0;
            for (let age = 0; age < N; age++) {
              strongest = Math.max(strongest, source[codes[(n - age + N) % N][i]] * decay ** age);
            }
            expect(Math.abs(periodic[n][i] - strongest)).toBeLessThan(1e-13);
          }
        }
      }),
      { numRuns: 100 },
    );
  });

  it('of one breaker fades to the residue in a loop, which the map takes out', () => {
    const [N, T, tau] = [24, 3, 1.5];
    const codes = Array.from({ length: N }, (_, n) => new Uint16Array(TEXELS).fill(n === 5 ? 0 : 65535));
    const frames = foamOfLoops(codes, 2, foamSourceTable(1000, 500), Math.exp(-T / N / tau)).slice(N);
    const residue = Math.exp(-T / tau);
    expect(frames[5][0]).toBe(1);
    // Half a loop on, and on the frame before it breaks again.
    expect(frames[17][0]).toBeCloseTo(Math.exp(-0.5 * (T / tau)), 13);
    expect(frames[4][0]).toBeCloseTo(residue * Math.exp(T / N / tau), 13);
    expect(shownFoam(frames[5][0], residue)).toBe(1);
    expect(shownFoam(frames[4][0], residue)).toBeLessThan(0.02);
    expect(shownFoam(residue, residue)).toBe(0);
  });

  it('grows with the breaking level, everywhere', () => {
    fc.assert(
      fc.property(
        anyFoam,
        between(0, 20_000),
        ({ frameCount, seed, decay, breakingCode, rampCodes }, rise) => {
          const codes = loopCodes(frameCount, seed);
          const foam = (level: number) =>
            foamOfLoops(codes, 2, foamSourceTable(level, rampCodes), decay).at(-1);
          const [less, more] = [foam(breakingCode), foam(breakingCode + rise)];
          less?.forEach((value, i) => {
            expect(more?.[i]).toBeGreaterThanOrEqual(value);
          });
        },
      ),
      { numRuns: 50 },
    );
  });
});
