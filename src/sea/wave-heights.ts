import { wavenumber } from '../physics/dispersion.ts';
import type { Water } from '../physics/water.ts';
import type { Finding } from './findings.ts';
import type { StatedHeight, WaveSystemRequest } from './sea.ts';

/** Waves break where the height reaches about a seventh of the length. Source: Michell 1893, 0.142 in deep water. */
export const STEEPEST: number = 1 / 7;

/**
 * Significant steepness above which we warn. Swell is much flatter, as the steep waves stayed behind in the storm;
 * the youngest wind sea of the JONSWAP growth law (g X / U^2 = 10) has 1/13. Common practice, no source.
 */
export const STEEP: Readonly<Record<'swell' | 'wind-sea', number>> = Object.freeze({
  swell: 1 / 20,
  'wind-sea': 1 / 10,
});

/**
 * Largest ratio of height to depth of a single wave over a flat bed (McCowan 1894), and the ratio of significant
 * height to depth above which breaking would shape the sea (common practice, no source).
 */
export const HEIGHT_PER_DEPTH: Readonly<{ largest: number; large: number }> = Object.freeze({
  largest: 0.78,
  large: 0.5,
});

/** Wavelength of the peak in this water, m. */
export function peakWavelengthM({ peakPeriodS }: StatedHeight, water: Water): number {
  return (2 * Math.PI) / wavenumber((2 * Math.PI) / peakPeriodS, water);
}

/** A significant height that is known before any formula is applied, and the key that states it, if one does. */
interface KnownHeight {
  readonly heightM: number;
  readonly key: readonly ('scaleTo' | 'seaState' | 'significantHeight')[];
}

function knownHeight(system: WaveSystemRequest | null): KnownHeight | null {
  if (system === null) return null;
  if (system.scaleToM !== null) return { heightM: system.scaleToM, key: ['scaleTo'] };
  if (system.kind === 'measured') {
    return { heightM: system.spectrum.significantHeightM, key: [] };
  }
  if (system.stated === null) return null;
  const isBySeaState = system.kind === 'wind-sea' && system.seaState !== null;
  return {
    heightM: system.stated.significantHeightM,
    key: [isBySeaState ? 'seaState' : 'significantHeight'],
  };
}

/** Height and period as a system's user states them; null where a wind or a record does. */
export function statedHeight(system: WaveSystemRequest): StatedHeight | null {
  return system.kind === 'measured' ? null : system.stated;
}

/** The significant height that a system is known to have, m; null where a growth law will tell. */
export function knownHeightM(system: WaveSystemRequest): number | null {
  return knownHeight(system)?.heightM ?? null;
}

/** Significant height of all systems whose height is known, as their energies add up, m. */
export function statedHeightM(systems: readonly (WaveSystemRequest | null)[]): number {
  return Math.hypot(...systems.map((system) => knownHeight(system)?.heightM ?? 0));
}

/** Stated heights that waves of this length cannot have, or that this water is too shallow for. */
export function heightFindings(systems: readonly (WaveSystemRequest | null)[], water: Water): Finding[] {
  const findings: Finding[] = [];
  const highest = HEIGHT_PER_DEPTH.largest * water.depthM;
  systems.forEach((system, i) => {
    const known = knownHeight(system);
    if (known === null) return;
    const path = ['systems', i, ...known.key];
    const { heightM: Hs } = known;
    const stated = system === null ? null : statedHeight(system);
    const wavelength = stated === null ? Infinity : peakWavelengthM(stated, water);
    if (Hs / wavelength > STEEPEST) {
      findings.push({
        path,
        expected: `at most ${metres(wavelength * STEEPEST)}, a seventh of the peak wavelength of ${metres(wavelength)}`,
        found: metres(Hs),
        remedy: 'Lower the height or lengthen the period: steeper waves break.',
      });
    }
    if (Hs > highest) {
      findings.push({
        path,
        expected: `at most ${metres(highest)}, ${HEIGHT_PER_DEPTH.largest} of the depth`,
        found: metres(Hs),
        remedy: 'Lower the height or deepen the water: higher waves break.',
      });
    }
  });
  const isOneTooHigh = systems.some((system) => (knownHeight(system)?.heightM ?? 0) > highest);
  const total = statedHeightM(systems);
  if (total > highest && !isOneTooHigh) {
    findings.push({
      path: ['water', 'depth'],
      expected: `at least ${metres(total / HEIGHT_PER_DEPTH.largest)} for a significant height of ${metres(total)} in all`,
      found: metres(water.depthM),
      remedy: 'Deepen the water or lower the waves.',
    });
  }
  return findings;
}

/** A length to three digits: `2.5 m`. */
export function metres(lengthM: number): string {
  return `${Number(lengthM.toPrecision(3))} m`;
}
