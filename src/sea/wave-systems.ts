import type { Water } from '../physics/water.ts';
import { directionRad } from './direction.ts';
import type { SwellDocument, SystemDocument } from './document.ts';
import type { DocumentPath, Finding } from './findings.ts';
import { type DataFiles, resolvedMeasured } from './measured.ts';
import type { SwellRequest, WaveSystemRequest } from './sea.ts';
import { checkSpectrumNumbers, checkSwellSpectrum } from './spectra.ts';
import { resolvedSpreading } from './spreading.ts';
import { resolvedWindSea } from './wind-sea.ts';

/**
 * The wave systems of a document, each with its name and defaults; null in place of one that cannot be resolved (or
 * did not pass the schema), with findings.
 */
export function resolvedSystems(
  documents: readonly (SystemDocument | null)[],
  water: Water | null,
  files: DataFiles,
  findings: Finding[],
): (WaveSystemRequest | null)[] {
  const names = systemNames(documents, findings);
  return documents.map((document, i) => {
    if (document === null) return null;
    const path = ['systems', i];
    if (document.kind === 'wind-sea') return resolvedWindSea(document, names[i], water, path, findings);
    if (document.kind === 'swell') return resolvedSwell(document, names[i], path, findings);
    return resolvedMeasured(document, names[i], path, files, findings);
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

function resolvedSwell(
  document: SwellDocument,
  name: string,
  path: DocumentPath,
  findings: Finding[],
): SwellRequest | null {
  const before = findings.length;
  const spectrum = document.spectrum?.form ?? 'jonswap';
  checkSwellSpectrum(spectrum, path, findings);
  checkSpectrumNumbers(document, spectrum, path, findings);
  const context = { kind: 'swell', spectrum, isWindKnown: false } as const;
  const spreading = resolvedSpreading(document.spreading, context, path, findings);
  if (findings.length > before) return null;
  const { significantHeight: significantHeightM, peakPeriod: peakPeriodS } = document;
  return {
    kind: 'swell',
    name,
    fromRad: directionRad(document.from),
    spectrum,
    spectrumRow: null,
    peakEnhancement: document.peakEnhancement ?? null,
    spreading,
    scaleToM: document.scaleTo ?? null,
    stated: { significantHeightM, peakPeriodS },
  };
}
