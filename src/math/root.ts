/**
 * Where a continuous function changes sign on [low, high]: false position with the Illinois rule (an end kept twice
 * counts half), every third step a halving.
 * Accuracy: the last two bits of the root, if f is right to them; test/unit/math/root.test.ts.
 *
 * @throws RangeError if f has the same sign at both ends
 */
export function root(f: (x: number) => number, low: number, high: number): number {
  let [a, b] = [low, high];
  let [fa, fb] = [f(a), f(b)];
  if (fa === 0) return a;
  if (fb === 0) return b;
  if (fa > 0 === fb > 0) throw new RangeError(`no change of sign between ${low} and ${high}`);
  let kept = 0;
  for (let step = 0; step < 200; step += 1) {
    if (Math.abs(b - a) <= 2 * Number.EPSILON * Math.max(Math.abs(a), Math.abs(b))) break;
    const x = step % 3 === 2 ? 0.5 * (a + b) : (a * fb - b * fa) / (fb - fa);
    const fx = f(x);
    if (fx === 0) return x;
    if (fx > 0 === fb > 0) {
      [b, fb] = [x, fx];
      if (kept < 0) fa *= 0.5;
      kept = -1;
    } else {
      [a, fa] = [x, fx];
      if (kept > 0) fb *= 0.5;
      kept = 1;
    }
  }
  return 0.5 * (a + b);
}
