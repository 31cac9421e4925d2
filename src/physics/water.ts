/** The water the waves run on. */
export interface Water {
  /** Still-water depth in metres; `Infinity` for deep water. */
  readonly depthM: number;
  readonly gravityMps2: number;
  readonly densityKgpm3: number;
  /** Surface tension against air, N/m. */
  readonly surfaceTensionNpm: number;
}

/** A steady current, uniform over the depth, as a velocity toward east and north. */
export interface Current {
  readonly eastMps: number;
  readonly northMps: number;
}

/** Standard gravity, m/s^2. Source: CGPM 1901 (from memory). */
export const STANDARD_GRAVITY_MPS2 = 9.80665;

/**
 * Deep sea water of 15 to 20 degC and 35 g/kg, with standard gravity.
 * Source: density TEOS-10 (1025.98 at 15 degC, 1024.77 at 20 degC), tension IAPWS G14-19
 * (74.5 mN/m at 15 degC, 73.8 at 20 degC); rounded in between.
 */
export const SEA_WATER_DEFAULTS: Water = Object.freeze({
  depthM: Infinity,
  gravityMps2: STANDARD_GRAVITY_MPS2,
  densityKgpm3: 1025,
  surfaceTensionNpm: 0.0742,
});
