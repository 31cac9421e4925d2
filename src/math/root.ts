/**
 * Where a continuous function changes sign on [low, high]: false position with Illinois weights, halved whenever that
 * gains less than halving would.
 * Accuracy: to the last two bits of the root; test/unit/math/root.test.ts.
 *
 * @throws RangeError if f has the same sign at both ends
 */
export function root(f: (x: number) => number, low: number, high: number): number {
  let [a, b] = [low, high];
  let [fa, fb] = [f(a), f(b)];
  if (fa === 0) return a;
  if (fb === 0) return b;
  if (fa > 0 === fb > 0) throw new RangeError(`no change of sign between ${low} and ${high}`);
  for (let step = 0; step < 200; step += 1) {
    const width = Math.abs(b - a);
    if (width <= 2 * Number.EPSILON * Math.max(Math.abs(a), Math.abs(b))) break;
    // Every third step halves: false position alone can creep along one side.
    const x = step % 3 === 2 ? 0.5 * (a + b) : (a * fb - b * fa) / (fb - fa);
    const fx = f(x);
    if (fx === 0) return x;
    if (fx > 0 === fb > 0) {
      [b, fb] = [x, fx];
      fa *= 0.5;
    } else {
      [a, fa] = [x, fx];
      fb *= 0.5;
    }
  }
  return 0.5 * (a + b);
}
