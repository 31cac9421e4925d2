/** One-sided spectral density S(omega) over intrinsic angular frequency: rad/s in, m^2 s/rad out. */
export type SpectralDensity = (omega: number) => number;

/** A frequency spectrum, ready to be evaluated. */
export interface FrequencySpectrum {
  /** Key of the published form in the registry, e.g. `jonswap`. */
  readonly form: string;
  /** S(omega); 0 at omega = 0, finite and non-negative everywhere. */
  readonly density: SpectralDensity;
  /** Angular frequency of the largest S, rad/s. */
  readonly omegaPeak: number;
}

/**
 * A directional spreading D(omega, theta), split so that everything that depends on omega alone is computed once a
 * frequency: D = normaliser(p) * shape(theta, p) with p = parameter(omega). `theta` is relative to the mean
 * direction, rad, in [-pi, pi]; the integral over the circle is 1 for every p.
 */
export interface DirectionalSpreading {
  /** Key of the published form in the registry, e.g. `hasselmann`. */
  readonly form: string;
  /** The form's own parameter (s, beta, sigma, Delta...) at this angular frequency. */
  readonly parameter: (omega: number) => number;
  /** Unnormalised shape, 1 at its maximum. */
  readonly shape: (theta: number, p: number) => number;
  /** 1 / integral of the shape over the circle. */
  readonly normaliser: (p: number) => number;
}
