/** Largest denominator of the fractions that patch ratios are kept away from. */
const LARGEST_DENOMINATOR = 12;
/** Ratios this far from simple fractions are clear of them (.38 is the most that can be). */
const CLEAR_DISTANCE = 0.2;
/** A patch is lengthened by no more than this to be clear. */
const FARTHEST = 1.005;

/**
 * The ratio in [0.9 R, R] farthest from simple fractions with every longer patch, leaning slightly to the larger: tiles
 * whose lengths share a small multiple line up and repeat together.
 */
export function unrelatedRatio(patches: readonly number[], R: number): number {
  const last = patches[patches.length - 1];
  let best = R;
  let bestScore = -Infinity;
  for (let step = 0; step <= 50; step++) {
    const r = (0.9 + 0.002 * step) * R;
    const score = leastDistance(patches, last / r) + (0.02 * r) / R;
    if (score > bestScore) {
      best = r;
      bestScore = score;
    }
  }
  return best;
}

/**
 * A patch as it is written, m: the first length of four digits from `ideal` on whose ratios to every longer patch are
 * clear of simple fractions, for rounding can bring two into line; the clearest within half a per cent if none is.
 */
export function writtenPatch(ideal: number, longer: readonly number[]): number {
  const digit = 10 ** (Math.floor(Math.log10(ideal)) - 3);
  let best = fourDigits(ideal);
  let bestDistance = -Infinity;
  for (let n = Math.round(ideal / digit); n * digit <= FARTHEST * ideal; n++) {
    const candidate = fourDigits(n * digit);
    const distance = leastDistance(longer, candidate);
    if (distance >= CLEAR_DISTANCE) return candidate;
    if (distance > bestDistance) {
      best = candidate;
      bestDistance = distance;
    }
  }
  return best;
}

/** Least distance of the ratios of some longer patches to this one from simple fractions. */
function leastDistance(longer: readonly number[], patch: number): number {
  return Math.min(...longer.map((length) => distanceToFractions(length / patch)));
}

/** min over q = 1..12 of q * |q R - nearest whole number|; 0 for R a fraction with a denominator up to 12. */
export function distanceToFractions(R: number): number {
  let distance = Infinity;
  for (let q = 1; q <= LARGEST_DENOMINATOR; q++) {
    distance = Math.min(distance, q * Math.abs(q * R - Math.round(q * R)));
  }
  return distance;
}

/** Lengths are rounded to four digits, so that a shader can carry them as written. */
export function fourDigits(value: number): number {
  return Number(value.toPrecision(4));
}
