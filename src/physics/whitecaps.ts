/** The strongest wind the whitecap law is used for, m/s; it would cover half the sea at 32 m/s. */
export const STRONGEST_WHITECAP_WIND_MPS = 25;

/**
 * Share of the sea's surface covered by whitecaps.
 *
 *     W = 3.84e-6 U10^3.41
 *
 * Source: Monahan & O'Muircheartaigh 1980. Check: test/published/whitecaps.test.ts.
 *
 * @param windSpeedMps U10, 0 .. 25 m/s
 * @returns 0 .. .225
 * @throws RangeError outside that range
 */
export function whitecapCoverage(windSpeedMps: number): number {
  if (!(windSpeedMps >= 0 && windSpeedMps <= STRONGEST_WHITECAP_WIND_MPS)) {
    throw new RangeError(
      `whitecap coverage is known for winds of 0 .. ${STRONGEST_WHITECAP_WIND_MPS} m/s, found ${windSpeedMps}`,
    );
  }
  return 3.84e-6 * windSpeedMps ** 3.41;
}

/**
 * e-folding time of whitecap foam on salt water, s. Field values run from .5 to 8 s (Callaghan et al. 2012).
 * Source: Monahan & Zietlow 1969, in a tank.
 */
export const FOAM_DECAY_SALT_S = 3.85;

/** e-folding time of whitecap foam on fresh water, s. Source: Monahan & Zietlow 1969, in a tank. */
export const FOAM_DECAY_FRESH_S = 2.54;
