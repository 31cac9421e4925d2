import { jonswap1973 } from './jonswap-1973.ts';
import { kahmaCalkoen } from './kahma-calkoen.ts';
import type { GrowthConditions, GrowthLaw, WaveGrowth } from './law.ts';
import { shoreProtectionManual } from './shore-protection-manual.ts';
import { wilson } from './wilson.ts';
import { youngVerhagen } from './young-verhagen.ts';

export type GrowthLawName =
  | 'jonswap-1973'
  | 'kahma-calkoen'
  | 'shore-protection-manual'
  | 'wilson'
  | 'young-verhagen';

const GROWTH_LAWS: Readonly<Record<GrowthLawName, GrowthLaw>> = {
  'jonswap-1973': jonswap1973,
  'kahma-calkoen': kahmaCalkoen,
  'shore-protection-manual': shoreProtectionManual,
  wilson,
  'young-verhagen': youngVerhagen,
};

/** The published laws there are, in the order of registration. */
export const GROWTH_LAW_NAMES: readonly GrowthLawName[] = Object.freeze(
  Object.keys(GROWTH_LAWS) as GrowthLawName[],
);

/**
 * The sea that a law says grows under these conditions.
 *
 * @throws RangeError if wind, fetch or depth is not positive
 */
export function waveGrowth(law: GrowthLawName, conditions: GrowthConditions): WaveGrowth {
  const { windSpeedMps, fetchM, depthM } = conditions;
  if (!(windSpeedMps > 0)) throw new RangeError(`wind speed must be > 0 m/s, found ${windSpeedMps}`);
  if (!(fetchM > 0)) throw new RangeError(`fetch must be > 0 m, found ${fetchM}`);
  if (!(depthM > 0)) throw new RangeError(`depth must be > 0 m, found ${depthM}`);
  return GROWTH_LAWS[law](conditions);
}
