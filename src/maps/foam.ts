/*
 * Foam remembers, so it is made after all Jacobians of the loop exist, from their 16-bit codes:
 *
 *     source[n] = clamp((Jb - J[n]) / ramp, 0, 1)
 *     f[n]      = max(source[n], d f[n-1]),  d = exp(-dt / tau)
 *
 * The loop closes exactly: f[n] is the largest of d^j source[n - j] over all past frames, and a source one whole loop
 * older is weaker by d^N, so one loop's warm-up from nothing already holds the periodic state, to the bit.
 */

/**
 * Source strength of every J code; Float64Array of 65536.
 *
 * @param breakingCode code of J at which foam starts (may be fractional)
 * @param rampCodes fall of code from there to full foam, positive
 */
export function foamSourceTable(breakingCode: number, rampCodes: number): Float64Array {
  const table = new Float64Array(65536);
  for (let code = 0; code < table.length; code++) {
    table[code] = Math.min(1, Math.max(0, (breakingCode - code) / rampCodes));
  }
  return table;
}

/**
 * One frame of foam, in place.
 *
 * @param foam Float64Array, one entry a texel: f[n-1] in, f[n] out
 * @param codes Uint16Array, J codes of frame n in the same order
 * @param source source strength by code
 * @param decayPerFrame d
 */
export function advanceFoam(
  foam: Float64Array,
  codes: Uint16Array,
  source: Float64Array,
  decayPerFrame: number,
): void {
  for (let i = 0; i < foam.length; i++) {
    foam[i] = Math.max(source[codes[i]], foam[i] * decayPerFrame);
  }
}

/**
 * Foam as the map shows it: with the part that never fades in a short loop taken out, max(0, (f - r) / (1 - r)).
 */
export function shownFoam(foam: number, removedResidue: number): number {
  return foam <= removedResidue ? 0 : (foam - removedResidue) / (1 - removedResidue);
}
