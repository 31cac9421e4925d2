/** When an adaptive integral is good enough: its error estimate is below either bound. */
export interface IntegralOptions {
  readonly relativeTolerance: number;
  readonly absoluteTolerance: number;
  /** Where the integrand has a kink or a narrow peak: the first intervals meet there. Ascending, inside (a, b). */
  readonly breakpoints: readonly number[];
}

export const INTEGRAL_DEFAULTS: IntegralOptions = Object.freeze({
  relativeTolerance: 1e-10,
  absoluteTolerance: 0,
  breakpoints: Object.freeze([]),
});

/** A quadrature rule on [-1, 1]: both Float64Array of n, nodes ascending; owned by the caller. */
export interface QuadratureRule {
  readonly nodes: Float64Array;
  readonly weights: Float64Array;
}

const MOST_INTERVALS = 4000;

// Kronrod's 15-point rule and the 7-point Gauss rule it extends, by descending node; the odd ones are Gauss nodes.
const NODES = [
  0.9914553711208126, 0.9491079123427585, 0.8648644233597691, 0.7415311855993945, 0.5860872354676911,
  0.4058451513773972, 0.20778495500789848, 0,
];
const KRONROD_WEIGHTS = [
  0.022935322010529224, 0.06309209262997856, 0.10479001032225019, 0.14065325971552592, 0.1690047266392679,
  0.19035057806478542, 0.20443294007529889, 0.20948214108472782,
];
const GAUSS_WEIGHTS = [0.1294849661688697, 0.27970539148927664, 0.3818300505051189, 0.4179591836734694];

interface Interval {
  readonly from: number;
  readonly to: number;
  readonly value: number;
  readonly error: number;
}

/**
 * Integral of a smooth function over [a, b], adaptively by the Gauss-Kronrod pair of 7 and 15 points: the interval of
 * the largest error estimate is halved until their sum is within the tolerance.
 * Source: rule and error estimate of Piessens et al. 1983 (from memory).
 * Check: exact for polynomials of degree 22; closed forms, test/unit/math/quadrature.test.ts.
 *
 * @param f integrand; must be finite on (a, b)
 * @param options missing ones are taken from `INTEGRAL_DEFAULTS`
 * @throws RangeError if the tolerance is not met with 4000 intervals, or a value is not finite
 */
export function integral(
  f: (x: number) => number,
  a: number,
  b: number,
  options: Partial<IntegralOptions> = {},
): number {
  const { relativeTolerance, absoluteTolerance, breakpoints } = { ...INTEGRAL_DEFAULTS, ...options };
  const edges = [a, ...breakpoints, b];
  const intervals = edges.slice(1).map((to, index) => gaussKronrod(f, edges[index], to));
  for (;;) {
    let value = 0;
    let error = 0;
    let worst = 0;
    for (let i = 0; i < intervals.length; i += 1) {
      value += intervals[i].value;
      error += intervals[i].error;
      if (intervals[i].error > intervals[worst].error) worst = i;
    }
    if (!Number.isFinite(value)) throw new RangeError(`integrand is not finite between ${a} and ${b}`);
    if (error <= Math.max(absoluteTolerance, relativeTolerance * Math.abs(value))) return value;
    if (intervals.length >= MOST_INTERVALS)
      throw new RangeError(`integral from ${a} to ${b} does not converge`);
    const { from, to } = intervals[worst];
    const middle = 0.5 * (from + to);
    intervals[worst] = gaussKronrod(f, from, middle);
    intervals.push(gaussKronrod(f, middle, to));
  }
}

/**
 * Nodes and weights of the n-point Gauss-Legendre rule, exact for polynomials of degree 2n - 1.
 * Newton's method on the Legendre polynomial by its three-term recurrence, from the asymptotic nodes.
 * Accuracy: 1e-15 for n up to 100; test/unit/math/quadrature.test.ts.
 *
 * @param n number of nodes, >= 1
 */
export function gaussLegendre(n: number): QuadratureRule {
  const nodes = new Float64Array(n);
  const weights = new Float64Array(n);
  for (let i = 0; i < n; i += 1) {
    let x = -Math.cos((Math.PI * (i + 0.75)) / (n + 0.5));
    let slope = 1;
    for (let step = 0; step < 20; step += 1) {
      let previous = 1;
      let p = x;
      for (let degree = 2; degree <= n; degree += 1) {
        const next = ((2 * degree - 1) * x * p - (degree - 1) * previous) / degree;
        previous = p;
        p = next;
      }
      slope = (n * (x * p - previous)) / (x * x - 1);
      const change = p / slope;
      x -= change;
      if (Math.abs(change) < 1e-15) break;
    }
    nodes[i] = x;
    weights[i] = 2 / ((1 - x * x) * slope * slope);
  }
  return { nodes, weights };
}

function gaussKronrod(f: (x: number) => number, from: number, to: number): Interval {
  const centre = 0.5 * (from + to);
  const half = 0.5 * (to - from);
  const middle = f(centre);
  let kronrod = KRONROD_WEIGHTS[7] * middle;
  let gauss = GAUSS_WEIGHTS[3] * middle;
  const below = new Float64Array(7);
  const above = new Float64Array(7);
  for (let i = 0; i < 7; i += 1) {
    below[i] = f(centre - half * NODES[i]);
    above[i] = f(centre + half * NODES[i]);
    kronrod += KRONROD_WEIGHTS[i] * (below[i] + above[i]);
    if (i % 2 === 1) gauss += GAUSS_WEIGHTS[(i - 1) / 2] * (below[i] + above[i]);
  }
  const mean = 0.5 * kronrod;
  let spread = KRONROD_WEIGHTS[7] * Math.abs(middle - mean);
  for (let i = 0; i < 7; i += 1) {
    spread += KRONROD_WEIGHTS[i] * (Math.abs(below[i] - mean) + Math.abs(above[i] - mean));
  }
  // The difference of the two rules measures the error of the worse one; scaled, it measures that of the better.
  const difference = Math.abs(kronrod - gauss);
  const scaled = spread === 0 ? 0 : spread * Math.min(1, ((200 * difference) / spread) ** 1.5);
  // Below the rounding of the interval's own sum, halving it cannot help.
  const error = scaled > 8 * Number.EPSILON * Math.abs(kronrod) ? scaled : 0;
  return { from, to, value: kronrod * half, error: error * Math.abs(half) };
}
