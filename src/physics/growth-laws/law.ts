/** What a sea grows under: a steady wind over a fetch, in water of one depth. */
export interface GrowthConditions {
  /** U10, m/s, > 0. */
  readonly windSpeedMps: number;
  /** m, > 0; `Infinity` is an open ocean. */
  readonly fetchM: number;
  /** m, > 0; `Infinity` is deep water. Only laws for shallow water look at it. */
  readonly depthM: number;
  readonly gravityMps2: number;
}

/** The sea that grows. */
export interface WaveGrowth {
  /** 4 sqrt(m0), m. */
  readonly significantHeightM: number;
  readonly peakPeriodS: number;
}

/** A published law of growth. */
export type GrowthLaw = (conditions: GrowthConditions) => WaveGrowth;

/** m0 g^2 / U10^4 and f_p U10 / g of a fully developed sea. Source: Pierson & Moskowitz 1964 with U at 10 m (from memory). */
export const DEVELOPED_ENERGY = 3.64e-3;
export const DEVELOPED_FREQUENCY = 0.133;

/** Dimensionless fetch g X / U10^2. */
export function dimensionlessFetch({ windSpeedMps, fetchM, gravityMps2 }: GrowthConditions): number {
  return (gravityMps2 * fetchM) / windSpeedMps ** 2;
}

/**
 * The sea of a dimensionless energy m0 g^2 / U10^4 and frequency f_p U10 / g, held at full development: laws without a
 * limit of their own run past it on long fetches.
 */
export function developedAtMost(conditions: GrowthConditions, energy: number, frequency: number): WaveGrowth {
  const { windSpeedMps: U10, gravityMps2: g } = conditions;
  return {
    significantHeightM: (4 * Math.sqrt(Math.min(energy, DEVELOPED_ENERGY)) * U10 ** 2) / g,
    peakPeriodS: U10 / (Math.max(frequency, DEVELOPED_FREQUENCY) * g),
  };
}
