import type { FrequencySpectrum } from './form.ts';

/** A measured spectrum as a table. */
export interface TabulatedParameters {
  readonly form: 'tabulated';
  /** Frequencies of the table, Hz, > 0, ascending, at least two. */
  readonly frequencyHz: readonly number[];
  /** Density S_f at each of them, m^2/Hz, >= 0. */
  readonly densityM2PerHz: readonly number[];
}

/**
 * A spectrum that is measured and not a formula: straight lines between the frequencies of a table, nothing outside.
 *
 *     S(omega) = S_f(omega / 2 pi) / 2 pi
 *
 * The first and the last line fall to zero over as much as the table's outermost step, so that each entry counts for
 * the mean of its two steps: the integral is the sum of entries times widths of bands that meet half way, exactly.
 * Check: that sum, and the stated laws of every form, test/unit/spectrum/tabulated.test.ts.
 */
export function tabulated({ frequencyHz, densityM2PerHz }: TabulatedParameters): FrequencySpectrum {
  const last = frequencyHz.length - 1;
  const f = Float64Array.of(
    Math.max(0, 2 * frequencyHz[0] - frequencyHz[1]),
    ...frequencyHz,
    2 * frequencyHz[last] - frequencyHz[last - 1],
  );
  const S = Float64Array.of(0, ...densityM2PerHz, 0);
  const highest = densityM2PerHz.indexOf(Math.max(...densityM2PerHz));
  return {
    form: 'tabulated',
    omegaPeak: 2 * Math.PI * frequencyHz[highest],
    density: (omega) => {
      const position = tablePosition(f, omega / (2 * Math.PI));
      if (position < 0 || position >= f.length - 1) return 0;
      const i = Math.floor(position);
      return (S[i] + (position - i) * (S[i + 1] - S[i])) / (2 * Math.PI);
    },
    knots: [...f].map((hertz) => 2 * Math.PI * hertz),
  };
}

/**
 * Where a value stands in an ascending table: the entry below it plus the share of the step it has made. -1 below the
 * first entry, the last index from the last entry on.
 */
export function tablePosition(entries: ArrayLike<number>, value: number): number {
  const last = entries.length - 1;
  if (!(value >= entries[0])) return -1;
  if (value >= entries[last]) return last;
  let [low, high] = [0, last];
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (entries[middle] <= value) low = middle;
    else high = middle;
  }
  return low + (value - entries[low]) / (entries[high] - entries[low]);
}
