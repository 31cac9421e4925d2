/** First and second Fourier moments of a distribution over the circle: the means of cos, sin theta, cos, sin 2 theta. */
export interface CircularMoments {
  readonly cos1: number;
  readonly sin1: number;
  readonly cos2: number;
  readonly sin2: number;
}

/** D(theta) = exp(level + a1 cos theta + b1 sin theta + a2 cos 2 theta + b2 sin 2 theta). */
export interface EntropyExponent {
  readonly level: number;
  readonly a1: number;
  readonly b1: number;
  readonly a2: number;
  readonly b2: number;
}

/** Points of the trapezoidal rule over the circle, which converges exponentially: enough for lobes of a degree. */
const POINTS = 720;
/** Moments are met to this. */
const TOLERANCE = 1e-11;
const MOST_STEPS = 200;
/** Directions never gather more than in a normal lobe of 2 degrees: its first two moments. */
const NARROWEST = (2 * Math.PI) / 180;
const NARROWEST_R1 = Math.exp(-0.5 * NARROWEST ** 2);
const NARROWEST_R2 = Math.exp(-2 * NARROWEST ** 2);

/**
 * The distribution over directions that has four given moments and says nothing else: that of the largest entropy.
 *
 *     D(theta) = exp(level + a1 cos theta + b1 sin theta + a2 cos 2 theta + b2 sin 2 theta)
 *
 * Always positive, unlike the Fourier series of four terms, and without the second peaks that the entropy of
 * Lygre & Krogstad 1986 gives to distributions with one. Exponents by Newton's method, damped, on the convex function
 * ln(integral of D) - exponents . moments. Moments that no distribution has (instruments are noisy), those with
 * |m2 - m1^2| near or above 1 - |m1|^2, have their second drawn toward m1^2; the first, mean direction and r1, is kept
 * (up to r1 = .9994, a lobe of 2 degrees).
 * Source: Kobune & Hashimoto 1986 (from memory). Accuracy: moments to 1e-11; test/unit/spectrum/maximum-entropy.test.ts.
 */
export function maximumEntropy(wanted: CircularMoments): EntropyExponent {
  const m = feasible(wanted);
  let x: Four = [0, 0, 0, 0];
  let at = evaluated(x, m);
  for (let step = 0; step < MOST_STEPS && Math.hypot(...at.gradient) > TOLERANCE; step++) {
    const direction = solved(at.hessian, at.gradient);
    let length = 1;
    let next = at;
    let candidate: Four = x;
    for (; length > 1e-6; length /= 2) {
      candidate = x.map((value, i) => value - length * direction[i]) as unknown as Four;
      next = evaluated(candidate, m);
      // Near the solution the objective stands still to its last bit while the gradient still shrinks.
      if (next.objective < at.objective || Math.hypot(...next.gradient) < Math.hypot(...at.gradient)) break;
    }
    if (length <= 1e-6) break;
    x = candidate;
    at = next;
  }
  return { level: -at.lnIntegral, a1: x[0], b1: x[1], a2: x[2], b2: x[3] };
}

/** The distribution itself at an angle, 1/rad. */
export function entropyDensity({ level, a1, b1, a2, b2 }: EntropyExponent, theta: number): number {
  const c = Math.cos(theta);
  const s = Math.sin(theta);
  return Math.exp(level + a1 * c + b1 * s + a2 * (c * c - s * s) + b2 * 2 * c * s);
}

type Four = readonly [number, number, number, number];

interface Evaluation {
  readonly lnIntegral: number;
  readonly objective: number;
  /** Mean of the four functions less the wanted moments. */
  readonly gradient: Four;
  /** Covariance of the four functions. */
  readonly hessian: readonly Four[];
}

function evaluated(x: Four, m: Four): Evaluation {
  const exponents = new Float64Array(POINTS);
  let highest = -Infinity;
  for (let i = 0; i < POINTS; i++) {
    const phi = TRIGONOMETRY[i];
    exponents[i] = x[0] * phi[0] + x[1] * phi[1] + x[2] * phi[2] + x[3] * phi[3];
    highest = Math.max(highest, exponents[i]);
  }
  let sum = 0;
  const mean = [0, 0, 0, 0];
  const square = [0, 1, 2, 3].map(() => [0, 0, 0, 0]);
  for (let i = 0; i < POINTS; i++) {
    const weight = Math.exp(exponents[i] - highest);
    const phi = TRIGONOMETRY[i];
    sum += weight;
    for (let j = 0; j < 4; j++) {
      mean[j] += weight * phi[j];
      for (let k = 0; k <= j; k++) square[j][k] += weight * phi[j] * phi[k];
    }
  }
  const average = mean.map((value) => value / sum);
  const covariance = (j: number, k: number): number =>
    square[Math.max(j, k)][Math.min(j, k)] / sum - average[j] * average[k];
  const lnIntegral = highest + Math.log((sum * 2 * Math.PI) / POINTS);
  const each = [0, 1, 2, 3];
  return {
    lnIntegral,
    objective: lnIntegral - each.reduce((dot, j) => dot + x[j] * m[j], 0),
    gradient: each.map((j) => average[j] - m[j]) as unknown as Four,
    hessian: each.map((j) => each.map((k) => covariance(j, k)) as unknown as Four),
  };
}

const TRIGONOMETRY: readonly Four[] = Array.from({ length: POINTS }, (_, i): Four => {
  const theta = (2 * Math.PI * i) / POINTS;
  return [Math.cos(theta), Math.sin(theta), Math.cos(2 * theta), Math.sin(2 * theta)];
});

/** The moments, moved inside what a distribution can have: |m2 - m1^2| < 1 - |m1|^2. */
function feasible({ cos1, sin1, cos2, sin2 }: CircularMoments): Four {
  const shrink1 = Math.min(1, NARROWEST_R1 / Math.max(Math.hypot(cos1, sin1), NARROWEST_R1));
  const shrink2 = Math.min(1, NARROWEST_R2 / Math.max(Math.hypot(cos2, sin2), NARROWEST_R2));
  const [x, y] = [cos1 * shrink1, sin1 * shrink1];
  const [squareCos, squareSin] = [x * x - y * y, 2 * x * y];
  const [offCos, offSin] = [cos2 * shrink2 - squareCos, sin2 * shrink2 - squareSin];
  const room = 1 - x * x - y * y;
  const off = Math.hypot(offCos, offSin);
  const reach = secondMomentReach(room);
  const pull = off > reach ? reach / off : 1;
  return [x, y, squareCos + pull * offCos, squareSin + pull * offSin];
}

/**
 * How far the second moment may be from the square of the first. At 1 - |m1|^2 the distribution is two needles; a
 * narrow normal lobe comes as near to that as 1.5 times the square of what is left.
 */
function secondMomentReach(room: number): number {
  return room * (1 - Math.min(0.05, 0.3 * room));
}

/** Solution of a symmetric positive system of four, by Cholesky's decomposition with a trace of the diagonal added. */
function solved(matrix: readonly Four[], right: Four): Four {
  const L = matrix.map((row) => [...row]);
  const z = [...right];
  for (let j = 0; j < 4; j++) {
    for (let k = 0; k < j; k++) L[j][j] -= L[j][k] ** 2;
    L[j][j] = Math.sqrt(Math.max(L[j][j], 1e-14 * matrix[j][j], 1e-300));
    for (let i = j + 1; i < 4; i++) {
      for (let k = 0; k < j; k++) L[i][j] -= L[i][k] * L[j][k];
      L[i][j] /= L[j][j];
    }
  }
  for (let j = 0; j < 4; j++) {
    for (let k = 0; k < j; k++) z[j] -= L[j][k] * z[k];
    z[j] /= L[j][j];
  }
  for (let j = 3; j >= 0; j--) {
    for (let k = j + 1; k < 4; k++) z[j] -= L[k][j] * z[k];
    z[j] /= L[j][j];
  }
  return z as unknown as Four;
}
