/*
 * The waves of one frame: amplitudes turned by their phases, four waves of the half plane at a time.
 *
 *     h(k) = A(k) e^{-i phi(k)} + conj A(-k) e^{+i phi(-k)}
 *
 * Only the half plane ny >= 0 is made: h(-k) = conj h(k). Phases come from a table of (cos, sin), one entry a number of
 * turns, filled for the frame; `turns` holds, by wave, the byte offset of its entry.
 *
 * Contributor notes (Xeon, Node 20; 1024 x 1024 with waves to half the Nyquist index): 1.1 ns a wave on still water,
 * 1.5 ns with a current, 0.1 ms a frame; the float64 engine, which turns every cell of the lattice, 85 ms. That is 1 to
 * 2 % of a frame's transforms, so nothing is to be gained from doing it inside the row pass. A sine and cosine by
 * polynomial instead of the table would need m n mod N, a whole number, in float32, which loses the phase.
 */

/**
 * Still water, m(k) = m(-k): with A(k) = a + ib and A(-k) = c + id,
 *
 *     h = (a + c) cos + (b + d) sin  +  i [ (b - d) cos + (c - a) sin ]
 *
 * @param h out: `count` complex vectors
 * @param coefficients by vector: a + c, b + d, b - d, c - a, four floats each
 * @param turns by vector: four 32-bit byte offsets into `phases`
 * @param phases (cos, sin) pairs of float32
 * @param count number of vectors
 */
export function evolveStill(h: usize, coefficients: usize, turns: usize, phases: usize, count: usize): void {
  for (const end = h + (count << 5); h < end; h += 32) {
    const low = twoPhases(phases, turns);
    const high = twoPhases(phases, turns + 8);
    const c = cosines(low, high);
    const s = sines(low, high);
    v128.store(h, weighted(coefficients, c, coefficients + 16, s));
    v128.store(h, weighted(coefficients + 32, c, coefficients + 48, s), 16);
    coefficients += 64;
    turns += 16;
  }
}

/**
 * The rate of change of h on still water,
 *
 *     h' = omega { (b + d) cos - (a + c) sin  +  i [ (c - a) cos - (b - d) sin ] }
 *
 * @param rate out: `count` complex vectors
 * @param omega by vector: four angular frequencies, rad/s
 */
export function evolveStillRate(
  rate: usize,
  coefficients: usize,
  turns: usize,
  phases: usize,
  omega: usize,
  count: usize,
): void {
  for (const end = rate + (count << 5); rate < end; rate += 32) {
    const low = twoPhases(phases, turns);
    const high = twoPhases(phases, turns + 8);
    const w = v128.load(omega);
    const c = f32x4.mul(w, cosines(low, high));
    const s = f32x4.neg(f32x4.mul(w, sines(low, high)));
    v128.store(rate, weighted(coefficients + 16, c, coefficients, s));
    v128.store(rate, weighted(coefficients + 48, c, coefficients + 32, s), 16);
    coefficients += 64;
    turns += 16;
    omega += 16;
  }
}

/**
 * Any water: k and -k turn on their own.
 *
 *     h = a cos + b sin + c cos' + d sin'  +  i [ b cos - a sin + c sin' - d cos' ]
 *
 * @param coefficients by vector: a, b, c, d, four floats each
 * @param turns by vector: four 32-bit byte offsets of k, four of -k
 */
export function evolveMoving(h: usize, coefficients: usize, turns: usize, phases: usize, count: usize): void {
  for (const end = h + (count << 5); h < end; h += 32) {
    let low = twoPhases(phases, turns);
    let high = twoPhases(phases, turns + 8);
    let c = cosines(low, high);
    let s = sines(low, high);
    const re = weighted(coefficients, c, coefficients + 16, s);
    const im = weighted(coefficients + 16, c, coefficients, f32x4.neg(s));
    low = twoPhases(phases, turns + 16);
    high = twoPhases(phases, turns + 24);
    c = cosines(low, high);
    s = sines(low, high);
    v128.store(h, f32x4.add(re, weighted(coefficients + 32, c, coefficients + 48, s)));
    v128.store(h, f32x4.add(im, weighted(coefficients + 32, s, coefficients + 48, f32x4.neg(c))), 16);
    coefficients += 64;
    turns += 32;
  }
}

/**
 * The rate of change of h in any water,
 *
 *     h' = -i omega A e^{-i phi} + i omega' conj A(-k) e^{+i phi'}
 *
 * @param omega by vector: four angular frequencies of k, four of -k, rad/s
 */
export function evolveMovingRate(
  rate: usize,
  coefficients: usize,
  turns: usize,
  phases: usize,
  omega: usize,
  count: usize,
): void {
  for (const end = rate + (count << 5); rate < end; rate += 32) {
    let low = twoPhases(phases, turns);
    let high = twoPhases(phases, turns + 8);
    let w = v128.load(omega);
    let c = f32x4.mul(w, cosines(low, high));
    let s = f32x4.neg(f32x4.mul(w, sines(low, high)));
    const re = weighted(coefficients + 16, c, coefficients, s);
    const im = weighted(coefficients, f32x4.neg(c), coefficients + 16, s);
    low = twoPhases(phases, turns + 16);
    high = twoPhases(phases, turns + 24);
    w = v128.load(omega, 16);
    c = f32x4.mul(w, cosines(low, high));
    s = f32x4.mul(w, sines(low, high));
    v128.store(rate, f32x4.add(re, weighted(coefficients + 48, c, coefficients + 32, f32x4.neg(s))));
    v128.store(rate, f32x4.add(im, weighted(coefficients + 32, c, coefficients + 48, s)), 16);
    coefficients += 64;
    turns += 32;
    omega += 32;
  }
}

/** cos, sin, cos, sin of the two waves whose offsets stand at `turns`. */
function twoPhases(phases: usize, turns: usize): v128 {
  const first = v128.load64_zero(phases + <usize>load<u32>(turns));
  return v128.load64_lane(phases + <usize>load<u32>(turns, 4), first, 1);
}

function cosines(low: v128, high: v128): v128 {
  return v128.shuffle<f32>(low, high, 0, 2, 4, 6);
}

function sines(low: v128, high: v128): v128 {
  return v128.shuffle<f32>(low, high, 1, 3, 5, 7);
}

/** a b + c d, with a and c in memory. */
function weighted(a: usize, b: v128, c: usize, d: v128): v128 {
  return f32x4.add(f32x4.mul(v128.load(a), b), f32x4.mul(v128.load(c), d));
}
