import { expect, it } from 'vitest';
import { float64Engine } from '../../../../src/field/float64-engine.ts';
import {
  LINE,
  STRIP_COLUMNS,
  STRIP_ROW,
  stripBytes,
  stripsBytes,
} from '../../../../src/kernel/wave/layout.ts';
import { transformPlanBytes, writeTransformPlan } from '../../../../src/kernel/wave/transform-plan.ts';
import { waveKernel } from '../../../../src/kernel/wave/wave-kernel.ts';
import { describeKernel } from '../../../support/kernels.ts';
import { noise } from '../../../support/random-waves.ts';

/**
 * Relative L2 error. Rounding errors of 2^-25 rms add up as a random walk over some ten operations a value and stage:
 * 1.6e-7 at 1024, measured, 0.9e-7 at 16.
 */
const TRANSFORM_ERROR = 2.5e-7;

/** Transforms interleaved re, im of N*N; where `inner`, the rows that are all zero are left out. */
type Transform = (spectrum: Float64Array, inner: boolean) => Float64Array;

function transformOf(N: number): Transform {
  const kernel = waveKernel();
  const plan = kernel.keep(transformPlanBytes(N));
  const re = kernel.keep(4 * N);
  const im = kernel.keep(4 * N);
  const strips = kernel.keep(stripsBytes(N));
  writeTransformPlan(kernel.buffer, plan, N);
  const floats = new Float32Array(kernel.buffer);
  return (spectrum, inner) => {
    // What a transform does not write it must not read.
    floats.fill(Number.NaN, strips / 4, (strips + stripsBytes(N)) / 4);
    for (let row = 0; row < N; row++) {
      if (inner && row >= N / 4 && row < (3 * N) / 4) continue;
      for (let x = 0; x < N; x++) {
        floats[re / 4 + x] = spectrum[2 * (row * N + x)];
        floats[im / 4 + x] = spectrum[2 * (row * N + x) + 1];
      }
      if (inner) {
        floats.fill(Number.NaN, re / 4 + N / 4, re / 4 + (3 * N) / 4);
        floats.fill(Number.NaN, im / 4 + N / 4, im / 4 + (3 * N) / 4);
      }
      kernel.program.transformRow(plan, re, im, strips, row, inner ? 1 : 0);
    }
    kernel.program.transformColumns(plan, strips, inner ? 1 : 0);
    const out = new Float64Array(2 * N * N);
    for (let y = 0, o = 0; y < N; y++) {
      for (let x = 0; x < N; x++, o += 2) {
        const strip = strips + Math.floor(x / STRIP_COLUMNS) * stripBytes(N) + y * STRIP_ROW;
        // A line holds 8 real parts, then 8 imaginary parts.
        const line = (strip + LINE * Math.floor((x % STRIP_COLUMNS) / 8)) / 4;
        out[o] = floats[line + (x % 8)];
        out[o + 1] = floats[line + 8 + (x % 8)];
      }
    }
    return out;
  };
}

/** Random complex numbers that float32 holds exactly; zero beyond half the Nyquist index where `inner`. */
function randomSpectrum(N: number, seed: number, inner: boolean): Float64Array {
  const next = noise(seed);
  const isInner = (i: number) => i < N / 4 || i >= (3 * N) / 4;
  return Float64Array.from({ length: 2 * N * N }, (_, i) => {
    const value = Math.fround(next());
    const cell = Math.floor(i / 2);
    return inner && !(isInner(cell % N) && isInner(Math.floor(cell / N))) ? 0 : value;
  });
}

function norm(values: Float64Array): number {
  return Math.sqrt(values.reduce((sum, value) => sum + value * value, 0));
}

function relativeError(actual: Float64Array, expected: Float64Array): number {
  return norm(actual.map((value, i) => value - expected[i])) / norm(expected);
}

describeKernel('wave', 'the float32 transform', () => {
  it.each([16, 32, 64, 128, 256, 512, 1024])('of %i agrees with float64', (N) => {
    const transform = transformOf(N);
    const engine = float64Engine(N);
    for (const inner of [false, true]) {
      const spectrum = randomSpectrum(N, N, inner);
      const expected = spectrum.slice();
      engine.inverse(expected);
      expect(relativeError(transform(spectrum, inner), expected)).toBeLessThan(TRANSFORM_ERROR);
    }
  });

  it.each([16, 32, 64, 128])('of %i is the direct sum for single waves', (N) => {
    const transform = transformOf(N);
    for (const [nx, ny] of [
      [0, 0],
      [1, 0],
      [0, 1],
      [3, N - 2],
      [N - 1, 5],
      [N / 2, N / 2 - 1],
    ]) {
      const spectrum = new Float64Array(2 * N * N);
      spectrum[2 * (ny * N + nx)] = 1;
      const z = transform(spectrum, false);
      let worst = 0;
      for (let y = 0; y < N; y++) {
        for (let x = 0; x < N; x++) {
          const angle = (2 * Math.PI * ((nx * x + ny * y) % N)) / N;
          worst = Math.max(
            worst,
            Math.abs(z[2 * (y * N + x)] - Math.cos(angle)),
            Math.abs(z[2 * (y * N + x) + 1] - Math.sin(angle)),
          );
        }
      }
      // A product of two twiddles a direction, each off by half of 2^-24 or less, a few roundings on top.
      expect(worst, `wave ${nx}, ${ny}`).toBeLessThan(5e-7);
    }
  });

  it.each([32, 256])('of %i is linear, keeps energy and turns a phase ramp into a shift', (N) => {
    const transform = transformOf(N);
    const a = randomSpectrum(N, 1, false);
    const b = randomSpectrum(N, 2, false);
    const [za, zb] = [transform(a, false), transform(b, false)];
    // Powers of two keep the sum exact.
    const sum = transform(
      a.map((value, i) => Math.fround(value + b[i] / 4)),
      false,
    );
    const added = za.map((value, i) => value + zb[i] / 4);
    expect(relativeError(sum, added)).toBeLessThan(2 * TRANSFORM_ERROR);
    expect(norm(za) / N / norm(a)).toBeCloseTo(1, 6);

    // A ramp of i^(nx + ny) moves the field by a quarter tile and is exact in floating point.
    const ramped = new Float64Array(a.length);
    for (let i = 0; i < N * N; i++) {
      const [re, im] = [a[2 * i], a[2 * i + 1]];
      const turned = [
        [re, im],
        [-im, re],
        [-re, -im],
        [im, -re],
      ][((i % N) + Math.floor(i / N)) % 4];
      ramped.set(turned, 2 * i);
    }
    const zr = transform(ramped, false);
    const shifted = za.map((_, i) => {
      const cell = Math.floor(i / 2);
      const x = ((cell % N) + N / 4) % N;
      const y = (Math.floor(cell / N) + N / 4) % N;
      return za[2 * (y * N + x) + (i % 2)];
    });
    expect(relativeError(zr, shifted)).toBeLessThan(2 * TRANSFORM_ERROR);
  });
});
