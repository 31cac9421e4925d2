import { InputError } from '../errors.ts';
import { cothKh } from '../physics/dispersion.ts';
import { FOAM_DECAY_SALT_S, whitecapCoverage } from '../physics/whitecaps.ts';
import { loopSeconds } from '../sea/loop-length.ts';
import type { FoamRequest, Sea } from '../sea/sea.ts';
import { type Band, bandWeight } from '../waves/band.ts';
import type { FieldDeviations } from '../waves/field-deviations.ts';
import { type RadialTable, radialIntegral } from '../waves/radial-table.ts';
import type { CascadeLayout } from './cascade-layout.ts';
import { jacobianDecode } from './encodings.ts';
import type { CascadeFoam, PlannedFoam } from './plan.ts';
import type { ResolvedSystem } from './systems.ts';

/** Waves shorter than this ripple without entraining air: common practice, no source. */
const SHORTEST_BREAKER_M = 1;

/**
 * Foam is full where J lies this many standard deviations below the breaking level: softer is a grey haze, harder
 * pops in within a frame. Common practice, no source; measured on loops, see DEVELOPERS.md.
 */
const RAMP_SIGMAS = 0.5;

/** In a loop shorter than three decay times foam has no time to fade. */
const DECAY_TIMES_PER_LOOP = 3;

/** A breaking level above this would put foam on water that is hardly compressed at all. */
export const HIGHEST_BREAKING_J = 0.9;

/** What sets the amount of foam of a sea, or null for none. */
export function plannedFoam(sea: Sea, systems: readonly ResolvedSystem[]): PlannedFoam | null {
  const { target, residue } = sea.foam;
  if (!sea.maps.some(({ map }) => map === 'foam')) return null;
  switch (target.by) {
    case 'off':
      return null;
    case 'breaking-level':
      return { by: target.by, coverage: null, residue };
    case 'coverage':
      return { by: target.by, coverage: target.coverage, residue };
    case 'wind': {
      const winds = systems.flatMap(({ windSpeedMps }) => windSpeedMps ?? []);
      return winds.length === 0
        ? null
        : { by: 'wind', coverage: whitecapCoverage(Math.max(...winds)), residue };
    }
  }
}

/**
 * Shares of the foam by cascade: shares of the compression variance of waves of at least 1 m,
 *
 *     q_c = integral of k^2 coth^2(kh) E w_c dk over lambda >= 1 m, normalised.
 *
 * @throws InputError where the user's shares are not one for each cascade
 */
export function foamShares(
  request: FoamRequest,
  layouts: readonly CascadeLayout[],
  tables: readonly RadialTable[],
  depthM: number,
): readonly number[] {
  if (request.shares !== null) return checkedShares(request.shares, layouts.length);
  const compression = layouts.map(({ band }) => compressionVariance(tables, band, depthM));
  const sum = compression.reduce((a, b) => a + b, 0);
  return sum === 0 ? compression : compression.map((variance) => variance / sum);
}

/** A planned sea can need fewer cascades than were allowed, which no sea file shows. */
function checkedShares(shares: readonly number[], cascades: number): readonly number[] {
  if (shares.length === cascades) return shares;
  throw new InputError('<sea>', [
    {
      path: 'foam.shares',
      line: 0,
      column: 0,
      expected: `${cascades} shares, one for each planned cascade`,
      found: `${shares.length}`,
      remedy: 'Give each cascade its share (0 is one), or leave the shares to the plan.',
    },
  ]);
}

function compressionVariance(tables: readonly RadialTable[], band: Band, depthM: number): number {
  const kMax = (2 * Math.PI) / SHORTEST_BREAKER_M;
  const integrand = (k: number): number =>
    k > kMax ? 0 : (k * cothKh(k, depthM)) ** 2 * bandWeight(k, band);
  return tables.reduce((sum, table) => sum + radialIntegral(table, integrand), 0);
}

/** The foam of one cascade; null where it gets no share. */
export function cascadeFoam(
  foam: PlannedFoam,
  request: FoamRequest,
  share: number,
  layout: CascadeLayout,
  deviations: FieldDeviations,
): CascadeFoam | null {
  if (share === 0 && foam.coverage !== null) return null;
  const T = loopSeconds(layout.loop);
  const decayTimeS = request.decayTimeS ?? Math.min(FOAM_DECAY_SALT_S, T / DECAY_TIMES_PER_LOOP);
  const { scale, offset } = jacobianDecode(deviations.compression);
  return {
    share,
    // Screened together the cascades' coverages give the whole: 1 - prod (1 - W_c) = W.
    coverage: foam.coverage === null ? null : 1 - (1 - foam.coverage) ** share,
    breakingJ: request.target.by === 'breaking-level' ? request.target.breakingJ : null,
    rampJ: RAMP_SIGMAS * deviations.compression,
    decayTimeS,
    loopResidue: Math.exp(-T / decayTimeS),
    jacobianCodes: { zeroJ: offset, stepJ: scale / 65535 },
  };
}
