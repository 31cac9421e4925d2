import { beaufortWindSpeed } from '../physics/sea-states.ts';
import { windSpeedAt10m, windSpeedAtHeight } from '../physics/wind.ts';
import type { WindDocument } from './document.ts';
import type { DocumentPath, Finding } from './findings.ts';
import type { WindWords } from './sea.ts';

/** Fastest wind at 10 m that a sea may have, m/s. The schema's limit of windSpeed, for winds given otherwise. */
const STRONGEST_MPS = 60;

const STANDARD_HEIGHT_M = 10;

/** A wind as it was given and what it is at 10 m. */
export interface ResolvedWind {
  readonly words: WindWords;
  readonly windSpeedMps: number;
}

/** The wind of a document by its speed or its Beaufort force; null where there is none, or with findings. */
export function resolvedWind(
  { windSpeed, windHeight, beaufort }: WindDocument,
  path: DocumentPath,
  findings: Finding[],
): ResolvedWind | null {
  if (windSpeed !== undefined && beaufort !== undefined) {
    findings.push({
      path: [...path, 'beaufort'],
      expected: 'either windSpeed or beaufort',
      found: 'both',
      remedy: 'Remove one of the two.',
    });
    return null;
  }
  if (windHeight !== undefined && windSpeed === undefined) {
    findings.push({
      path: [...path, 'windHeight'],
      expected: 'the height at which a windSpeed was measured',
      found: beaufort === undefined ? 'no windSpeed' : 'a Beaufort force, which means the wind at 10 m',
      remedy: 'Remove it, or give windSpeed.',
    });
    return null;
  }
  if (beaufort !== undefined) {
    return { words: { by: 'beaufort', force: beaufort }, windSpeedMps: beaufortWindSpeed(beaufort) };
  }
  if (windSpeed === undefined) return null;
  const heightM = windHeight ?? STANDARD_HEIGHT_M;
  const words: WindWords = { by: 'speed', speedMps: windSpeed, heightM };
  if (heightM === STANDARD_HEIGHT_M) return { words, windSpeedMps: windSpeed };
  const strongest = windSpeedAtHeight(STRONGEST_MPS, heightM);
  if (windSpeed > strongest) {
    findings.push({
      path: [...path, 'windSpeed'],
      expected: `at most ${strongest.toFixed(1)} m/s at ${heightM} m, which is ${STRONGEST_MPS} m/s at 10 m`,
      found: `${Number(windSpeed.toPrecision(3))} m/s`,
      remedy: 'Check the speed, or the height it was measured at.',
    });
    return null;
  }
  return { words, windSpeedMps: windSpeedAt10m(windSpeed, heightM) };
}
