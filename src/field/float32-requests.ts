import type { FieldName } from './frame-fields.ts';

/** What a sample can hold: a field as it is, a part of the unit normal of the displaced surface, or J. */
export type SampledValue = FieldName | 'normalEast' | 'normalNorth' | 'normalUp' | 'jacobian';

/** One channel: `stored = value * gain + shift`, in codes for integer samples. */
export interface SampledChannel {
  readonly value: SampledValue;
  readonly gain: number;
  readonly shift: number;
  /** Offsets in codes: Float32Array N*N in the order of the samples; null for none. Integer samples only. */
  readonly dither: Float32Array | null;
}

export interface SamplesRequest {
  readonly sample: 'uint8' | 'uint16' | 'half' | 'float';
  /** Up to three. */
  readonly channels: readonly SampledChannel[];
  /** Which edge the first row is. */
  readonly rowZero: 'north' | 'south';
  readonly target: SamplesTarget;
}

/**
 * Where samples go, row by row in the request's order. `planes`: one array a channel, N*N samples of its type (halves as
 * their bits). `texels`: bytes as PNG wants them, channels side by side and 16-bit samples with the high byte first;
 * one or three channels of integer samples.
 */
export type SamplesTarget =
  | { readonly planes: readonly (Uint8Array | Uint16Array | Float32Array)[] }
  | { readonly texels: Uint8Array };

/**
 * What was stored in a channel, in stored units (codes for integers). Sums are of `stored - centre` and its square;
 * those of codes are exact.
 */
export interface SampleStatistics {
  readonly centre: number;
  readonly sum: number;
  readonly sumOfSquares: number;
  readonly min: number;
  readonly max: number;
  /** Codes that were beyond the range. */
  readonly clipped: number;
  /** False where a value was not finite, or has no finite half: the samples must not be used. */
  readonly finite: boolean;
}

/** The largest code of an integer sample. */
export const LARGEST = { uint8: 255, uint16: 65535 } as const;

export function isInteger(sample: SamplesRequest['sample']): sample is 'uint8' | 'uint16' {
  return sample in LARGEST;
}
