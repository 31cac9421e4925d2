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
  /** Angular frequencies, ascending, where S bends sharply, for forms that are tables: integrals meet there. */
  readonly knots?: readonly number[];
}

/**
 * A directional spreading D(omega, theta), split so that everything that depends on omega alone is computed once a
 * frequency: D = normaliser(p) * shape(theta, p) with p = parameter(omega). `theta` is relative to the system's
 * direction of travel, rad in [-pi, pi], counter-clockwise; the integral over the circle is 1 for every p.
 *
 * The published forms are even in theta and largest at 0. A measured sea's directions turn with frequency: its shape is
 * neither, and p says where in its table omega stands.
 */
export interface DirectionalSpreading {
  /** Key of the published form in the registry, e.g. `hasselmann`. */
  readonly form: string;
  /** The form's own parameter (s, beta, sigma, Delta...) at this angular frequency; it varies smoothly with it. */
  readonly parameter: (omega: number) => number;
  /** Unnormalised shape, >= 0; of the published forms 1 at its maximum. */
  readonly shape: (theta: number, p: number) => number;
  /** 1 / integral of the shape over the circle. */
  readonly normaliser: (p: number) => number;
}
