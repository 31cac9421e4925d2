const SCAN_STEPS = 200;
const GOLDEN = (Math.sqrt(5) - 1) / 2;

/**
 * Where a function of one variable is largest on [a, b]: a scan of 200 steps finds the hill, golden section its top.
 * A hill narrower than a step can be missed. Accuracy: 1e-8 of b - a, the limit of any search by values alone;
 * test/unit/math/maximum.test.ts.
 */
export function argumentOfMaximum(f: (x: number) => number, a: number, b: number): number {
  const step = (b - a) / SCAN_STEPS;
  let best = 0;
  let highest = -Infinity;
  for (let i = 0; i <= SCAN_STEPS; i += 1) {
    const value = f(a + i * step);
    if (value > highest) {
      highest = value;
      best = i;
    }
  }
  let low = a + Math.max(0, best - 1) * step;
  let high = a + Math.min(SCAN_STEPS, best + 1) * step;
  let left = high - GOLDEN * (high - low);
  let right = low + GOLDEN * (high - low);
  let fLeft = f(left);
  let fRight = f(right);
  while (high - low > 1e-9 * (b - a)) {
    if (fLeft >= fRight) {
      high = right;
      right = left;
      fRight = fLeft;
      left = high - GOLDEN * (high - low);
      fLeft = f(left);
    } else {
      low = left;
      left = right;
      fLeft = fRight;
      right = low + GOLDEN * (high - low);
      fRight = f(right);
    }
  }
  return 0.5 * (low + high);
}
