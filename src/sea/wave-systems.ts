import type { Water } from '../physics/water.ts';
import { SPREADING_DEFAULTS } from './defaults.ts';
import type { SpreadingDocument, SwellDocument, SystemDocument, WindSeaDocument } from './document.ts';
import { type DocumentPath, type Finding, valueText } from './findings.ts';
import type {
  SpectrumName,
  SpreadingRequest,
  SwellRequest,
  WaveSystemRequest,
  WindGrowth,
  WindSeaRequest,
} from './sea.ts';

const FULL_TURN = 2 * Math.PI;

/**
 * The wave systems of a document, each with its name and defaults; null in place of one that cannot be resolved (or
 * did not pass the schema), with findings.
 */
export function resolvedSystems(
  documents: readonly (SystemDocument | null)[],
  water: Water | null,
  findings: Finding[],
): (WaveSystemRequest | null)[] {
  const names = systemNames(documents, findings);
  return documents.map((document, i) => {
    if (document === null) return null;
    const path = ['systems', i];
    return document.kind === 'wind-sea'
      ? resolvedWindSea(document, names[i], water, path, findings)
      : resolvedSwell(document, names[i], path, findings);
  });
}

/** Names as given, else the kind, numbered from its second: `swell`, `swell-2`. */
function systemNames(documents: readonly (SystemDocument | null)[], findings: Finding[]): string[] {
  const taken = new Set<string>();
  documents.forEach((document, i) => {
    const name = document?.name;
    if (name === undefined) return;
    if (taken.has(name)) {
      findings.push({
        path: ['systems', i, 'name'],
        expected: 'a name that no other system has',
        found: `\`${name}\` again`,
        remedy: 'Rename one of the two; the name keys the random waves of its system.',
      });
    }
    taken.add(name);
  });
  return documents.map((document) => {
    if (document === null) return '';
    if (document.name !== undefined) return document.name;
    let name: string = document.kind;
    for (let n = 2; taken.has(name); n++) name = `${document.kind}-${n}`;
    taken.add(name);
    return name;
  });
}

function resolvedWindSea(
  document: WindSeaDocument,
  name: string,
  water: Water | null,
  path: DocumentPath,
  findings: Finding[],
): WindSeaRequest | null {
  const { windSpeed, fetch, significantHeight, peakPeriod } = document;
  const before = findings.length;
  // Depth matters to a wind sea's form: TMA is JONSWAP that feels the bottom, and equals it in deep water.
  const spectrum = document.spectrum ?? (water !== null && water.depthM !== Infinity ? 'tma' : 'jonswap');
  const isFullyDeveloped = spectrum === 'pierson-moskowitz';
  const isStated = significantHeight !== undefined || peakPeriod !== undefined;

  if (isStated && fetch !== undefined) {
    findings.push({
      path,
      expected: 'either windSpeed and fetch, or significantHeight and peakPeriod',
      found: 'a fetch beside a stated height or period',
      remedy: 'Remove fetch, or significantHeight and peakPeriod.',
    });
  } else if (isStated) {
    for (const key of ['significantHeight', 'peakPeriod'] as const) {
      if (document[key] !== undefined) continue;
      const expected = 'significantHeight and peakPeriod together';
      findings.push({ path: [...path, key], expected, found: 'nothing', remedy: `Add ${key}.` });
    }
  } else if (windSpeed === undefined) {
    findings.push({
      path: [...path, 'windSpeed'],
      expected: 'windSpeed and fetch, or significantHeight and peakPeriod',
      found: fetch === undefined ? 'neither' : 'fetch alone',
      remedy: 'Add for example `windSpeed: 20 kn` and `fetch: 50 km`.',
    });
  } else if (fetch === undefined && !isFullyDeveloped) {
    findings.push({
      path: [...path, 'fetch'],
      expected: 'the fetch beside the wind speed',
      found: 'nothing',
      remedy: 'Add for example `fetch: 50 km`, or `fetch: unlimited` for a fully developed sea.',
    });
  }
  if (isFullyDeveloped && (isStated || (fetch !== undefined && fetch !== Infinity))) {
    findings.push({
      path: [...path, 'spectrum'],
      expected: 'a spectrum that takes a height and period or a fetch',
      found: '`pierson-moskowitz`, which knows only the wind speed of a fully developed sea',
      remedy: isStated ? 'Use `bretschneider`, the same shape.' : 'Use `jonswap`, or `fetch: unlimited`.',
    });
  }
  if (spectrum === 'bretschneider' && !isStated) {
    findings.push({
      path: [...path, 'spectrum'],
      expected: 'a significantHeight and peakPeriod for `bretschneider`',
      found: 'a wind speed',
      remedy: 'State the height and period, or use `jonswap`.',
    });
  }
  checkPeakEnhancement(document, spectrum, path, findings);
  const spreading = resolvedSpreading(
    document.spreading,
    'wind-sea',
    windSpeed !== undefined,
    path,
    findings,
  );
  if (findings.length > before) return null;

  const growth: WindGrowth | null = isStated
    ? null
    : { windSpeedMps: windSpeed as number, fetchM: fetch ?? Infinity };
  const stated = isStated
    ? { significantHeightM: significantHeight as number, peakPeriodS: peakPeriod as number }
    : null;
  return {
    kind: 'wind-sea',
    name,
    fromRad: directionRad(document.from),
    spectrum,
    peakEnhancement: document.peakEnhancement ?? null,
    spreading,
    growth,
    stated,
    windSpeedMps: windSpeed ?? null,
  };
}

function resolvedSwell(
  document: SwellDocument,
  name: string,
  path: DocumentPath,
  findings: Finding[],
): SwellRequest | null {
  const before = findings.length;
  const spectrum = document.spectrum ?? 'jonswap';
  if (spectrum === 'pierson-moskowitz') {
    findings.push({
      path: [...path, 'spectrum'],
      expected: 'a spectrum that takes a height and period',
      found: '`pierson-moskowitz`, which knows only the wind speed of a fully developed sea',
      remedy: 'Use `bretschneider`, the same shape.',
    });
  }
  checkPeakEnhancement(document, spectrum, path, findings);
  const spreading = resolvedSpreading(document.spreading, 'swell', false, path, findings);
  if (findings.length > before) return null;
  const { significantHeight: significantHeightM, peakPeriod: peakPeriodS } = document;
  return {
    kind: 'swell',
    name,
    fromRad: directionRad(document.from),
    spectrum,
    peakEnhancement: document.peakEnhancement ?? null,
    spreading,
    stated: { significantHeightM, peakPeriodS },
  };
}

function checkPeakEnhancement(
  { peakEnhancement }: SystemDocument,
  spectrum: SpectrumName,
  path: DocumentPath,
  findings: Finding[],
): void {
  if (peakEnhancement === undefined || spectrum === 'jonswap' || spectrum === 'tma') return;
  findings.push({
    path: [...path, 'peakEnhancement'],
    expected: 'no peak enhancement for this spectrum',
    found: `${valueText(peakEnhancement)} with \`${spectrum}\``,
    remedy: 'Remove it, or use `jonswap` or `tma`.',
  });
}

function resolvedSpreading(
  document: SpreadingDocument | undefined,
  kind: SystemDocument['kind'],
  isWindKnown: boolean,
  path: DocumentPath,
  findings: Finding[],
): SpreadingRequest {
  // Naming an exponent asks for the form that has one.
  const natural = kind === 'swell' || document?.s !== undefined ? 'cos-2s' : 'hasselmann';
  const form = document?.form ?? natural;
  const swellNarrowing = document?.swellNarrowing ?? SPREADING_DEFAULTS.swellNarrowing;
  if (form !== 'cos-2s' && document?.s !== undefined) {
    findings.push({
      path: [...path, 'spreading', 's'],
      expected: `no exponent for \`${form}\`, whose s follows from frequency`,
      found: valueText(document.s),
      remedy: 'Remove it, or use `form: cos-2s`.',
    });
  }
  if (form === 'mitsuyasu' && !isWindKnown) {
    findings.push({
      path: [...path, 'spreading'],
      expected: 'a windSpeed for `mitsuyasu`',
      found: 'none',
      remedy: kind === 'swell' ? 'Use `form: cos-2s` for a swell.' : 'Add windSpeed, or use `hasselmann`.',
    });
  }
  const fixedS = kind === 'swell' ? SPREADING_DEFAULTS.swellS : SPREADING_DEFAULTS.windSeaS;
  return { form, s: form === 'cos-2s' ? (document?.s ?? fixedS) : null, swellNarrowing };
}

/** A direction in [0, 2 pi). */
export function directionRad(direction: number): number {
  const turned = direction % FULL_TURN;
  // Added only where needed: the sum is rounded. 360 deg and -0 come out as 0 exactly.
  const positive = turned < 0 ? turned + FULL_TURN : turned;
  return positive >= FULL_TURN || positive === 0 ? 0 : positive;
}
