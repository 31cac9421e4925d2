import type { SpectrumDocument, SwellDocument, WindSeaDocument } from './document.ts';
import { type DocumentPath, type Finding, valueText } from './findings.ts';
import type { SpectrumName } from './sea.ts';

/** How the numbers of a wave system are given: by a wind and what it blew over, or by height and period. */
export type SystemRoute = 'wind' | 'stated';

/** Forms that a height and period (or a height alone) describe, and no wind. */
const STATED_ONLY: ReadonlySet<SpectrumName> = new Set(['bretschneider', 'ochi-hubble', 'torsethaugen']);
/** Forms that follow from the wind alone, by a growth of their own. */
const WIND_ONLY: ReadonlySet<SpectrumName> = new Set(['pierson-moskowitz', 'elfouhaily']);
/** Forms with a peak enhancement to be chosen. */
const HAS_PEAK_ENHANCEMENT: ReadonlySet<SpectrumName> = new Set(['jonswap', 'tma']);
/** Forms that a swell can take. */
const OF_SWELL: ReadonlySet<SpectrumName> = new Set(['jonswap', 'tma', 'bretschneider', 'torsethaugen']);

/** Whether a form comes with its own law of growth. */
export function growsByItself(spectrum: SpectrumName): boolean {
  return WIND_ONLY.has(spectrum);
}

/** What a wind sea's spectrum cannot be made from. */
export function checkWindSeaSpectrum(
  document: WindSeaDocument,
  spectrum: SpectrumName,
  route: SystemRoute,
  isWindKnown: boolean,
  path: DocumentPath,
  findings: Finding[],
): void {
  const at = [...path, 'spectrum'];
  const { fetch, duration, growth } = document;
  const isLimited = (fetch !== undefined && fetch !== Infinity) || duration !== undefined;
  if (spectrum === 'pierson-moskowitz' && (route === 'stated' || isLimited)) {
    findings.push({
      path: at,
      expected: 'a spectrum that takes a height and period or a fetch',
      found: '`pierson-moskowitz`, which knows only the wind speed of a fully developed sea',
      remedy:
        route === 'stated' ? 'Use `bretschneider`, the same shape.' : 'Use `jonswap`, or `fetch: unlimited`.',
    });
  } else if (WIND_ONLY.has(spectrum) && route === 'stated') {
    findings.push({
      path: at,
      expected: 'a spectrum that takes a height and period',
      found: `\`${spectrum}\`, which follows from wind and fetch`,
      remedy: 'Give windSpeed and fetch, with `scaleTo` for the height.',
    });
  }
  if (STATED_ONLY.has(spectrum) && route === 'wind') {
    findings.push({
      path: at,
      expected: `a significantHeight ${spectrum === 'ochi-hubble' ? '' : 'and peakPeriod '}for \`${spectrum}\``,
      found: 'a wind speed',
      remedy: 'State the height and period, or use `jonswap`.',
    });
  }
  if (spectrum === 'donelan-hamilton-hui' && !isWindKnown) {
    findings.push({
      path: at,
      expected: 'a windSpeed for `donelan-hamilton-hui`, whose shape follows from the age of the sea',
      found: 'none',
      remedy: 'Add windSpeed, or use `jonswap`.',
    });
  }
  if (WIND_ONLY.has(spectrum) && growth !== undefined) {
    findings.push({
      path: [...path, 'growth'],
      expected: `no growth law for \`${spectrum}\`, which has its own`,
      found: valueText(growth),
      remedy: 'Remove it, or use `jonswap`.',
    });
  }
}

/** What a swell's spectrum cannot be. */
export function checkSwellSpectrum(spectrum: SpectrumName, path: DocumentPath, findings: Finding[]): void {
  if (OF_SWELL.has(spectrum)) return;
  const isDeveloped = spectrum === 'pierson-moskowitz';
  findings.push({
    path: [...path, 'spectrum'],
    expected: 'a spectrum that takes a height and period',
    found: isDeveloped
      ? '`pierson-moskowitz`, which knows only the wind speed of a fully developed sea'
      : spectrum === 'ochi-hubble'
        ? '`ochi-hubble`, whose periods follow from the height'
        : `\`${spectrum}\`, which follows from the wind`,
    remedy: isDeveloped ? 'Use `bretschneider`, the same shape.' : 'Use `jonswap`, or `kind: wind-sea`.',
  });
}

/** Numbers of a spectrum that its form does not have. */
export function checkSpectrumNumbers(
  { spectrum: document, peakEnhancement }: Pick<SwellDocument, 'spectrum' | 'peakEnhancement'>,
  spectrum: SpectrumName,
  path: DocumentPath,
  findings: Finding[],
): void {
  if (peakEnhancement !== undefined && !HAS_PEAK_ENHANCEMENT.has(spectrum)) {
    findings.push({
      path: [...path, 'peakEnhancement'],
      expected: 'no peak enhancement for this spectrum',
      found: `${valueText(peakEnhancement)} with \`${spectrum}\``,
      remedy: 'Remove it, or use `jonswap` or `tma`.',
    });
  }
  if (document?.row !== undefined && spectrum !== 'ochi-hubble') {
    findings.push({
      path: [...path, 'spectrum', 'row'],
      expected: 'no row for this spectrum',
      found: `${valueText(document.row)} with \`${spectrum}\``,
      remedy: 'Remove it, or use `ochi-hubble`.',
    });
  }
}

/** Member of the Ochi-Hubble family that a document asks for; null with every other form. */
export function spectrumRow(document: SpectrumDocument | undefined): number | null {
  return document?.form === 'ochi-hubble' ? (document.row ?? 0) : null;
}
