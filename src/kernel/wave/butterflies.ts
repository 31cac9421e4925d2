/*
 * The small transforms that a long one is made of, written once over any arithmetic: over numbers in tests, over
 * program text in the generator.
 *
 *     y_k = sum over m of x_m e^{+2 pi i k m / r},  r = 2, 4, 8
 *
 * Source: decimation in frequency, Gentleman & Sande 1966; operation counts as in Van Loan 1992 (both from memory).
 */

/** What a butterfly does with its real values. */
export interface Arithmetic<T> {
  add(a: T, b: T): T;
  sub(a: T, b: T): T;
  mul(a: T, b: T): T;
}

export interface Complex<T> {
  readonly re: T;
  readonly im: T;
}

export type Radix = 4 | 8;

/** a + b */
export function complexSum<T>(a: Complex<T>, b: Complex<T>, on: Arithmetic<T>): Complex<T> {
  return { re: on.add(a.re, b.re), im: on.add(a.im, b.im) };
}

/** a - b */
export function complexDifference<T>(a: Complex<T>, b: Complex<T>, on: Arithmetic<T>): Complex<T> {
  return { re: on.sub(a.re, b.re), im: on.sub(a.im, b.im) };
}

/** a w: four multiplications and two additions. */
export function complexProduct<T>(a: Complex<T>, w: Complex<T>, on: Arithmetic<T>): Complex<T> {
  return {
    re: on.sub(on.mul(a.re, w.re), on.mul(a.im, w.im)),
    im: on.add(on.mul(a.im, w.re), on.mul(a.re, w.im)),
  };
}

/** a + i b */
function sumWithTurned<T>(a: Complex<T>, b: Complex<T>, on: Arithmetic<T>): Complex<T> {
  return { re: on.sub(a.re, b.im), im: on.add(a.im, b.re) };
}

/** a - i b */
function differenceWithTurned<T>(a: Complex<T>, b: Complex<T>, on: Arithmetic<T>): Complex<T> {
  return { re: on.add(a.re, b.im), im: on.sub(a.im, b.re) };
}

/** The transform of four values: 16 additions. */
export function butterfly4<T>(x: readonly Complex<T>[], on: Arithmetic<T>): Complex<T>[] {
  const even = complexSum(x[0], x[2], on);
  const evenTurned = complexDifference(x[0], x[2], on);
  const odd = complexSum(x[1], x[3], on);
  const oddTurned = complexDifference(x[1], x[3], on);
  return [
    complexSum(even, odd, on),
    sumWithTurned(evenTurned, oddTurned, on),
    complexDifference(even, odd, on),
    differenceWithTurned(evenTurned, oddTurned, on),
  ];
}

/**
 * The transform of eight values: 52 additions and 4 multiplications.
 *
 * @param sqrtHalf the value sqrt(1/2)
 */
export function butterfly8<T>(x: readonly Complex<T>[], sqrtHalf: T, on: Arithmetic<T>): Complex<T>[] {
  const near = [0, 1, 2, 3].map((m) => complexSum(x[m], x[m + 4], on));
  const [d0, d1, d2, d3] = [0, 1, 2, 3].map((m) => complexDifference(x[m], x[m + 4], on));
  // The odd outputs are the transform of d_m w^m, w = e^{i pi/4}. w and w^3 are applied to sums and differences of
  // d1 and d3, so that only four multiplications remain.
  const p1 = { re: on.sub(d1.re, d1.im), im: on.add(d1.re, d1.im) };
  const p3 = { re: on.add(d3.re, d3.im), im: on.sub(d3.re, d3.im) };
  const sum = { re: on.mul(sqrtHalf, on.sub(p1.re, p3.re)), im: on.mul(sqrtHalf, on.add(p1.im, p3.im)) };
  const difference = {
    re: on.mul(sqrtHalf, on.add(p1.re, p3.re)),
    im: on.mul(sqrtHalf, on.sub(p1.im, p3.im)),
  };
  const even = sumWithTurned(d0, d2, on);
  const evenTurned = differenceWithTurned(d0, d2, on);
  const [y0, y2, y4, y6] = butterfly4(near, on);
  return [
    y0,
    complexSum(even, sum, on),
    y2,
    sumWithTurned(evenTurned, difference, on),
    y4,
    complexDifference(even, sum, on),
    y6,
    differenceWithTurned(evenTurned, difference, on),
  ];
}
