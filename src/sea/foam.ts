import { FOAM_DEFAULTS } from './defaults.ts';
import type { CascadesDocument, FoamDocument, FoamGroupDocument } from './document.ts';
import type { Finding } from './findings.ts';
import type { FoamRequest, WaveSystemRequest } from './sea.ts';

/** Highest wind, m/s, for which we use the whitecap law; its records end near 20. Common practice, no source. */
export const STRONGEST_WHITECAP_WIND_MPS = 25;

const NO_FOAM: FoamRequest = Object.freeze({
  target: Object.freeze({ by: 'off' } as const),
  decayTimeS: null,
  residue: FOAM_DEFAULTS.residue,
  shares: null,
});

/**
 * Foam as asked for. Without a word on it, foam follows the wind where a wind is known, and is off elsewhere.
 *
 * @param isMapAsked whether the file names the foam map itself, so that "off" would drop what was asked for
 */
export function resolvedFoam(
  document: FoamDocument | undefined,
  systems: readonly WaveSystemRequest[],
  cascades: CascadesDocument | undefined,
  isMapAsked: boolean,
  findings: Finding[],
): FoamRequest {
  if (document === 'off') {
    if (isMapAsked) {
      findings.push({
        path: ['maps', 'foam'],
        expected: 'no foam map where foam is off',
        found: 'one',
        remedy: 'Remove it, or give `foam: { coverage: 2 % }`.',
      });
    }
    return NO_FOAM;
  }
  const group = document ?? {};
  const target = foamTarget(group, document !== undefined || isMapAsked, systems, findings);
  if (target === null || target.by === 'off') return NO_FOAM;
  checkShares(group.shares, cascades, findings);
  return {
    target,
    decayTimeS: group.decayTime ?? null,
    residue: group.residue ?? FOAM_DEFAULTS.residue,
    shares: group.shares ?? null,
  };
}

/** The strongest wind of the sea, m/s; null where none is stated. */
export function strongestWindMps(systems: readonly WaveSystemRequest[]): number | null {
  const winds = systems.flatMap((system) =>
    system.kind !== 'swell' && system.windSpeedMps !== null ? [system.windSpeedMps] : [],
  );
  return winds.length === 0 ? null : Math.max(...winds);
}

function foamTarget(
  { coverage, breakingLevel }: FoamGroupDocument,
  isAsked: boolean,
  systems: readonly WaveSystemRequest[],
  findings: Finding[],
): FoamRequest['target'] | null {
  if (breakingLevel !== undefined) {
    if (coverage === undefined) return { by: 'breaking-level', breakingJ: breakingLevel };
    findings.push({
      path: ['foam', 'breakingLevel'],
      expected: 'a coverage or a breaking level',
      found: 'both',
      remedy: 'Remove one of the two: either follows from the other.',
    });
    return null;
  }
  if (typeof coverage === 'number') return { by: 'coverage', coverage };
  const wind = strongestWindMps(systems);
  if (wind === null) {
    if (!isAsked) return { by: 'off' };
    findings.push({
      path: ['foam', 'coverage'],
      expected: 'a wind-sea with its windSpeed, from which coverage follows',
      found: 'no wind speed in this sea',
      remedy: 'Give `foam: { coverage: 2 % }`, add a windSpeed, or write `foam: off`.',
    });
    return null;
  }
  if (wind > STRONGEST_WHITECAP_WIND_MPS) {
    findings.push({
      path: ['foam', 'coverage'],
      expected: `a wind speed of at most ${STRONGEST_WHITECAP_WIND_MPS} m/s for foam by the wind`,
      found: `${Number(wind.toPrecision(4))} m/s`,
      remedy:
        'Beyond its records the whitecap law means nothing: give for example `foam: { coverage: 20 % }`, or `foam: off`.',
    });
    return null;
  }
  return { by: 'wind' };
}

function checkShares(
  shares: readonly number[] | undefined,
  cascades: CascadesDocument | undefined,
  findings: Finding[],
): void {
  if (shares === undefined) return;
  const path = ['foam', 'shares'];
  const sum = shares.reduce((a, b) => a + b, 0);
  // Shares written to three digits (0.333 each) pass.
  if (Math.abs(sum - 1) > 0.005) {
    const found = String(Number(sum.toPrecision(6)));
    findings.push({ path, expected: 'shares that add up to 1', found, remedy: 'Scale them to add up to 1.' });
  }
  // A planned sea may need fewer cascades than allowed; the plan checks that case.
  const count = Array.isArray(cascades) ? cascades.length : null;
  if (count !== null && shares.length !== count) {
    const expected = `${count} shares, one for each cascade`;
    findings.push({
      path,
      expected,
      found: `${shares.length}`,
      remedy: 'Give each cascade its share; 0 is one.',
    });
  }
}
