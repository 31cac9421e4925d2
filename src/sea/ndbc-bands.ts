import { halfwayBandwidths } from './spectral-record.ts';

/** Frequencies and widths of analysis bands, Hz. */
export interface Bands {
  readonly frequencyHz: readonly number[];
  readonly bandwidthHz: readonly number[];
}

/**
 * The bands of the wave processors in use since the nineties: runs of centres from, to, in steps of their width, Hz.
 * Source: NDBC's files, whose history prints four decimals (.0325) and real time three (.033).
 */
const RUNS: readonly (readonly [from: number, to: number, width: number])[] = [
  [0.02, 0.02, 0.005],
  [0.0325, 0.0925, 0.005],
  [0.1, 0.35, 0.01],
  [0.365, 0.485, 0.02],
];

const STANDARD: readonly (readonly [centre: number, width: number])[] = RUNS.flatMap(([from, to, width]) =>
  Array.from(
    { length: Math.round((to - from) / width) + 1 },
    (_, i) => [Math.round(1e4 * (from + i * width)) / 1e4, width] as const,
  ),
);

/** Half a unit of the third decimal, and a little for the binary fraction. */
const ROUNDING = 5.1e-4;

/**
 * The true bands of printed frequencies: the standard ones where all are, as rounding hides half a step of the narrow
 * ones; otherwise (files of the eighties, .03 to .40 Hz) as printed, in bands that meet half way.
 */
export function ndbcBands(printedHz: readonly number[]): Bands {
  const bands = printedHz.map((printed) =>
    STANDARD.find(([centre]) => Math.abs(centre - printed) <= ROUNDING),
  );
  if (bands.every((band) => band !== undefined)) {
    return {
      frequencyHz: bands.map(([centre]) => centre),
      bandwidthHz: bands.map(([, width]) => width),
    };
  }
  return { frequencyHz: printedHz, bandwidthHz: halfwayBandwidths(printedHz) };
}
