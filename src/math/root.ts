/**
 * Where a continuous function changes sign on [low, high], by halving until no number is left in between: some 55
 * evaluations, whatever the function.
 * Accuracy: the last bit of the root, if f is right to it; test/unit/math/root.test.ts.
 *
 * @throws RangeError if f has the same sign at both ends
 */
export function root(f: (x: number) => number, low: number, high: number): number {
  let [a, b] = [low, high];
  const [fa, fb] = [f(a), f(b)];
  if (fa === 0) return a;
  if (fb === 0) return b;
  if (fa > 0 === fb > 0) throw new RangeError(`no change of sign between ${low} and ${high}`);
  for (;;) {
    const x = 0.5 * (a + b);
    if (x === a || x === b) return x;
    const fx = f(x);
    if (fx === 0) return x;
    if (fx > 0 === fa > 0) a = x;
    else b = x;
  }
}
