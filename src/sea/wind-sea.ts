import { developedPeakPeriod } from '../physics/growth-laws/developed.ts';
import { SEA_STATES } from '../physics/sea-states.ts';
import type { Water } from '../physics/water.ts';
import { ochiHubble, ochiHubbleMember } from '../spectrum/ochi-hubble.ts';
import { directionRad } from './direction.ts';
import type { WindSeaDocument } from './document.ts';
import type { DocumentPath, Finding } from './findings.ts';
import type { StatedHeight, WindGrowth, WindSeaRequest } from './sea.ts';
import { checkSpectrumNumbers, checkWindSeaSpectrum, growsByItself, spectrumRow } from './spectra.ts';
import { resolvedSpreading } from './spreading.ts';
import { resolvedWind } from './wind.ts';

/** A wind sea with its defaults; null, with findings, where it cannot be. */
export function resolvedWindSea(
  document: WindSeaDocument,
  name: string,
  water: Water | null,
  path: DocumentPath,
  findings: Finding[],
): WindSeaRequest | null {
  const { significantHeight, seaState, peakPeriod, fetch, duration } = document;
  const before = findings.length;
  // Depth matters to a wind sea's form: TMA is JONSWAP that feels the bottom, and equals it in deep water.
  const isDeep = water === null || water.depthM === Infinity;
  const spectrum = document.spectrum?.form ?? (isDeep ? 'jonswap' : 'tma');
  const isStated = [significantHeight, seaState, peakPeriod].some((value) => value !== undefined);
  const route = isStated ? 'stated' : 'wind';

  const wind = resolvedWind(document, path, findings);
  const isWindKnown = document.windSpeed !== undefined || document.beaufort !== undefined;
  if (isStated) checkStated(document, path, findings);
  else if (!isWindKnown) {
    const beside =
      fetch !== undefined ? 'fetch alone' : duration !== undefined ? 'duration alone' : 'neither';
    findings.push({
      path: [...path, 'windSpeed'],
      expected: 'windSpeed and fetch, or significantHeight and peakPeriod',
      found: beside,
      remedy: 'Add for example `windSpeed: 20 kn` and `fetch: 50 km`.',
    });
  } else if (isFetchMissing(document)) {
    findings.push({
      path: [...path, 'fetch'],
      expected: 'the fetch beside the wind speed',
      found: 'nothing',
      remedy: 'Add for example `fetch: 50 km`, or `fetch: unlimited` for a fully developed sea.',
    });
  }
  checkWindSeaSpectrum(document, spectrum, route, isWindKnown, path, findings);
  checkSpectrumNumbers(document, spectrum, path, findings);
  const context = { kind: 'wind-sea', spectrum, isWindKnown } as const;
  const spreading = resolvedSpreading(document.spreading, context, path, findings);
  if (findings.length > before) return null;

  const windSpeedMps = wind?.windSpeedMps ?? null;
  const growth: WindGrowth | null = isStated
    ? null
    : {
        windSpeedMps: windSpeedMps as number,
        fetchM: fetch ?? Infinity,
        durationS: duration ?? Infinity,
        law: growsByItself(spectrum) ? null : (document.growth ?? 'jonswap'),
      };
  const stated = isStated ? statedHeight(document, water) : null;
  return {
    kind: 'wind-sea',
    name,
    fromRad: directionRad(document.from),
    spectrum,
    spectrumRow: spectrumRow(document.spectrum),
    peakEnhancement: document.peakEnhancement ?? null,
    spreading,
    scaleToM: document.scaleTo ?? null,
    growth,
    stated,
    windSpeedMps,
    wind: wind?.words ?? null,
    seaState: seaState ?? null,
    periodBy: isStated ? periodBy(document) : null,
  };
}

/** The Beaufort scale describes the open sea: alone of all winds it needs no fetch. */
function isFetchMissing({ fetch, duration, beaufort, spectrum }: WindSeaDocument): boolean {
  if (fetch !== undefined || duration !== undefined || beaufort !== undefined) return false;
  return spectrum?.form !== 'pierson-moskowitz';
}

function checkStated(document: WindSeaDocument, path: DocumentPath, findings: Finding[]): void {
  const { significantHeight, seaState, peakPeriod, spectrum } = document;
  const beside = (['fetch', 'duration', 'growth'] as const).find((key) => document[key] !== undefined);
  if (beside !== undefined) {
    findings.push({
      path,
      expected: 'either windSpeed and fetch, or significantHeight and peakPeriod',
      found: `a ${beside} beside a stated height or period`,
      remedy: `Remove ${beside}, or significantHeight and peakPeriod.`,
    });
    return;
  }
  const need = (key: 'significantHeight' | 'peakPeriod'): void => {
    const expected = 'significantHeight and peakPeriod together';
    findings.push({ path: [...path, key], expected, found: 'nothing', remedy: `Add ${key}.` });
  };
  if (significantHeight !== undefined && seaState !== undefined) {
    findings.push({
      path: [...path, 'seaState'],
      expected: 'either significantHeight or seaState',
      found: 'both',
      remedy: 'Remove one of the two.',
    });
  }
  if (significantHeight === undefined && seaState === undefined) need('significantHeight');
  if (spectrum?.form === 'ochi-hubble') {
    if (peakPeriod === undefined) return;
    findings.push({
      path: [...path, 'peakPeriod'],
      expected: 'no peak period for `ochi-hubble`, whose periods follow from the height',
      found: `${peakPeriod} s`,
      remedy: 'Remove it, or use `torsethaugen`, which takes a height and a period.',
    });
  } else if (peakPeriod === undefined && seaState === undefined) need('peakPeriod');
}

function periodBy({ peakPeriod, spectrum }: WindSeaDocument): NonNullable<WindSeaRequest['periodBy']> {
  if (spectrum?.form === 'ochi-hubble') return 'spectrum';
  return peakPeriod === undefined ? 'full-development' : 'user';
}

/** Height and period of a checked document; null where the water that a period would need is not known. */
function statedHeight(document: WindSeaDocument, water: Water | null): StatedHeight | null {
  const { significantHeight, seaState, peakPeriod } = document;
  const significantHeightM = significantHeight ?? heightOfSeaState(seaState as number);
  switch (periodBy(document)) {
    case 'user':
      return { significantHeightM, peakPeriodS: peakPeriod as number };
    case 'spectrum': {
      const member = ochiHubbleMember(spectrumRow(document.spectrum) ?? 0, significantHeightM);
      return { significantHeightM, peakPeriodS: (2 * Math.PI) / ochiHubble(member).omegaPeak };
    }
    case 'full-development':
      if (water === null) return null;
      return { significantHeightM, peakPeriodS: developedPeakPeriod(significantHeightM, water.gravityMps2) };
  }
}

/** The significant height that stands for a class of the code, m: its middle; of the highest, which is open, its least. */
export function heightOfSeaState(code: number): number {
  const { overM, upToM } = SEA_STATES[code];
  return upToM === Infinity ? overM : 0.5 * (overM + upToM);
}
