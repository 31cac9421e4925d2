import { SPREADING_DEFAULTS } from './defaults.ts';
import type { SpreadingDocument } from './document.ts';
import { type DocumentPath, type Finding, valueText } from './findings.ts';
import type { SpectrumName, SpreadingName, SpreadingRequest } from './sea.ts';

/** What the defaults and needs of a spreading depend on. */
export interface SpreadingContext {
  readonly kind: 'wind-sea' | 'swell';
  readonly spectrum: SpectrumName;
  readonly isWindKnown: boolean;
}

/** Forms whose shape follows from how old the wind sea is. */
const NEEDS_WIND: ReadonlySet<SpreadingName> = new Set(['mitsuyasu', 'elfouhaily']);
/** Forms with an exponent s that swell narrowing can add to. */
const HAS_EXPONENT: ReadonlySet<SpreadingName> = new Set(['cos-2s', 'mitsuyasu', 'hasselmann']);

/** The spreading of a document with its defaults; numbers that its form does not have are findings. */
export function resolvedSpreading(
  document: SpreadingDocument | undefined,
  { kind, spectrum, isWindKnown }: SpreadingContext,
  path: DocumentPath,
  findings: Finding[],
): SpreadingRequest {
  const form = document?.form ?? naturalForm(document, kind, spectrum);
  const refuse = (key: string, value: number, expected: string, remedy: string): void => {
    findings.push({ path: [...path, 'spreading', key], expected, found: valueText(value), remedy });
  };
  if (form !== 'cos-2s' && document?.s !== undefined) {
    refuse('s', document.s, `no exponent for \`${form}\``, 'Remove it, or use `form: cos-2s`.');
  }
  if (form !== 'wrapped-normal' && document?.width !== undefined) {
    const degrees = Number(((document.width * 180) / Math.PI).toPrecision(4));
    const expected = `no width for \`${form}\``;
    refuse('width', degrees, expected, 'Remove it, or use `form: wrapped-normal`.');
  }
  const swellNarrowing = document?.swellNarrowing ?? SPREADING_DEFAULTS.swellNarrowing;
  if (!HAS_EXPONENT.has(form) && swellNarrowing > 0) {
    const expected = `no swell narrowing for \`${form}\`, which has no exponent it could add to`;
    refuse('swellNarrowing', swellNarrowing, expected, 'Remove it, or use `form: hasselmann`.');
  }
  if (NEEDS_WIND.has(form) && !isWindKnown) {
    findings.push({
      path: [...path, 'spreading'],
      expected: `a windSpeed for \`${form}\``,
      found: 'none',
      remedy: kind === 'swell' ? 'Use `form: cos-2s` for a swell.' : 'Add windSpeed, or use `hasselmann`.',
    });
  }
  const fixedS = kind === 'swell' ? SPREADING_DEFAULTS.swellS : SPREADING_DEFAULTS.windSeaS;
  return {
    form,
    s: form === 'cos-2s' ? (document?.s ?? fixedS) : null,
    widthRad: form === 'wrapped-normal' ? (document?.width ?? widthOfExponent(fixedS)) : null,
    swellNarrowing,
  };
}

/** The form of a document that names none: naming its number asks for the form that has one. */
function naturalForm(
  document: SpreadingDocument | undefined,
  kind: SpreadingContext['kind'],
  spectrum: SpectrumName,
): SpreadingName {
  if (document?.width !== undefined) return 'wrapped-normal';
  if (kind === 'swell' || document?.s !== undefined) return 'cos-2s';
  return spectrum === 'elfouhaily' ? 'elfouhaily' : 'hasselmann';
}

/**
 * The width of a wrapped normal that spreads as much as cos-2s, by the first moment: exp(-sigma^2 / 2) = s / (s + 1).
 * 25 degrees for s = 10, 16 for s = 25.
 */
function widthOfExponent(s: number): number {
  return Math.sqrt(2 * Math.log1p(1 / s));
}
