/** Mean square slopes of a sea surface, dimensionless. */
export interface SlopeVariance {
  /** Along the wind. */
  readonly upwind: number;
  readonly crosswind: number;
  /** A fit of its own in the source: it exceeds the sum of the other two by 4e-5 W. */
  readonly total: number;
}

/**
 * Mean square slopes of the clean sea, all waves down to ripples, from photographs of sun glitter.
 *
 *     up = .000 + .00316 W;  cross = .003 + .00192 W;  total = .003 + .00512 W  (+- .004)
 *
 * Source: Cox & Munk 1954; W at 12.5 m, 1 to 14 m/s. Check: test/published/slope-variance.test.ts.
 *
 * @param windSpeed12p5mMps W, m/s
 */
export function coxMunkSlopeVariance(windSpeed12p5mMps: number): SlopeVariance {
  const W = windSpeed12p5mMps;
  return { upwind: 0.00316 * W, crosswind: 0.003 + 0.00192 * W, total: 0.003 + 0.00512 * W };
}

/**
 * Total mean square slope of a sea under an oil film, which has no waves below some 30 cm.
 *
 *     total = .008 + .00156 W
 *
 * Source: Cox & Munk 1954 (from memory). Check: test/published/slope-variance.test.ts.
 *
 * @param windSpeed12p5mMps W, m/s
 */
export function slickSlopeVariance(windSpeed12p5mMps: number): number {
  return 0.008 + 0.00156 * windSpeed12p5mMps;
}
