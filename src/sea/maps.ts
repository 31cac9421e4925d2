import { MAPS_DEFAULTS, RANGE_DEFAULTS } from './defaults.ts';
import type { MapDocument, MapGroupDocument, MapsDocument } from './document.ts';
import { type DocumentPath, type Finding, valueText } from './findings.ts';
import { nearestOrPrefix } from './nearest.ts';
import { MAP_NAMES, type MapName, type MapRequest, type RangePolicy } from './sea.ts';
import { type Dimension, quantityFromText, unitNames } from './units.ts';

interface MapNature {
  /** What the largest magnitude of its range is measured in. */
  readonly extent: Dimension;
  /** Its range follows from its definition: +-1 for normals, 0..1 for foam. */
  readonly isBounded: boolean;
  /** Bits of a png that states none. Steps show at 8 bits wherever values move geometry: that must be asked for. */
  readonly bits: 8 | 16;
  /** Whether 8 bits dither unless told otherwise; foam is grey anyway. */
  readonly dithers: boolean;
}

const UNBOUNDED: MapNature = { extent: 'ratio', isBounded: false, bits: 16, dithers: true };

const NATURES: Readonly<Record<MapName, MapNature>> = Object.freeze({
  displacement: { ...UNBOUNDED, extent: 'length' },
  height: { ...UNBOUNDED, extent: 'length' },
  velocity: { ...UNBOUNDED, extent: 'speed' },
  slope: UNBOUNDED,
  strain: UNBOUNDED,
  jacobian: UNBOUNDED,
  normal: { extent: 'ratio', isBounded: true, bits: 8, dithers: true },
  foam: { extent: 'ratio', isBounded: true, bits: 8, dithers: false },
});

const NATURAL: RangePolicy = Object.freeze({ policy: 'natural' });

/**
 * The maps to write, in the order of MAP_NAMES.
 *
 * @param hasFoam whether foam has a target; if not, the default foam map is left out
 */
export function resolvedMaps(
  document: MapsDocument | undefined,
  hasFoam: boolean,
  findings: Finding[],
): MapRequest[] {
  const asked: MapsDocument = document ?? (hasFoam ? MAPS_DEFAULTS : { ...MAPS_DEFAULTS, foam: undefined });
  const maps = MAP_NAMES.flatMap((map) => {
    const written = asked[map];
    return written === undefined ? [] : [resolvedMap(map, written, findings)];
  });
  if (maps.length === 0) {
    findings.push({
      path: ['maps'],
      expected: `at least one of ${MAP_NAMES.join(', ')}`,
      found: 'none',
      remedy: 'Add for example `displacement: exr`, or remove `maps` for the default.',
    });
  }
  return maps;
}

function resolvedMap(map: MapName, written: MapDocument, findings: Finding[]): MapRequest {
  const path = ['maps', map];
  const group: MapGroupDocument = typeof written === 'string' ? { format: written } : written;
  const nature = NATURES[map];
  const { format, bits, sample } = group;
  if (format === 'exr') {
    refuse({ bits, range: group.range }, 'exr, which stores values as they are', path, findings);
    checkDither(group.dither, 'exr', path, findings);
    return { map, format, sample: sample ?? 'half', range: NATURAL, dither: false };
  }
  refuse({ sample }, 'png, whose samples are integers of 8 or 16 bits', path, findings);
  const chosenBits = bits ?? nature.bits;
  if (chosenBits === 16) checkDither(group.dither, '16 bits', path, findings);
  return {
    map,
    format,
    sample: chosenBits === 8 ? 'uint8' : 'uint16',
    range: resolvedRange(map, group.range, chosenBits, [...path, 'range'], findings),
    dither: chosenBits === 8 && (group.dither ?? nature.dithers),
  };
}

function refuse(
  options: Readonly<Record<string, unknown>>,
  reason: string,
  path: DocumentPath,
  findings: Finding[],
): void {
  for (const [key, value] of Object.entries(options)) {
    if (value === undefined) continue;
    const expected = `no ${key} for ${reason}`;
    findings.push({ path: [...path, key], expected, found: valueText(value), remedy: 'Remove it.' });
  }
}

function checkDither(
  dither: boolean | undefined,
  where: string,
  path: DocumentPath,
  findings: Finding[],
): void {
  if (dither !== true) return;
  const expected = `no dithering for ${where}: it hides the steps of 8 bits`;
  findings.push({ path: [...path, 'dither'], expected, found: '`true`', remedy: 'Remove it.' });
}

/** `6 sigmas`, `survey`, `natural`, a bare largest magnitude or one with its unit. */
function resolvedRange(
  map: MapName,
  written: number | string | undefined,
  bits: 8 | 16,
  path: DocumentPath,
  findings: Finding[],
): RangePolicy {
  const { extent, isBounded } = NATURES[map];
  // A Jacobian's natural range is lopsided (1 - 5.5 to 1 + 7 standard deviations), as its distribution is.
  const isNatural = isBounded || map === 'jacobian';
  if (written === undefined) {
    if (isNatural) return NATURAL;
    return bits === 8 ? { policy: 'survey' } : { policy: 'sigmas', sigmas: RANGE_DEFAULTS.sigmas };
  }
  const range =
    typeof written === 'number' ? { policy: 'extent' as const, extent: written } : rangeOf(written, extent);
  if (range !== null && (isBounded ? range.policy === 'natural' : isNatural || range.policy !== 'natural'))
    return range;
  const units = extent === 'ratio' ? 'a number' : `a number with ${unitNames(extent)}`;
  const words = isNatural ? ['survey', 'natural'] : ['survey'];
  const nearest = typeof written === 'string' ? nearestOrPrefix(written, words) : null;
  findings.push({
    path,
    expected: isBounded
      ? `\`natural\`, the one range of a ${map} map`
      : `2 to 20 sigmas, \`survey\`${isNatural ? ', `natural`' : ''}, or the largest magnitude (${units})`,
    found: valueText(written),
    remedy:
      nearest === null || isBounded
        ? 'Write for example `6 sigmas`, or remove it for the default.'
        : `Did you mean \`${nearest}\`?`,
  });
  return NATURAL;
}

function rangeOf(text: string, extent: Dimension): RangePolicy | null {
  const word = text.trim();
  if (word === 'survey' || word === 'natural') return { policy: word };
  const sigmas = /^([0-9]+(?:\.[0-9]+)?)\s*sigmas?$/.exec(word);
  if (sigmas) {
    const count = Number(sigmas[1]);
    return count >= 2 && count <= 20 ? { policy: 'sigmas', sigmas: count } : null;
  }
  const largest = quantityFromText(word, extent);
  return largest !== null && largest > 0 && largest <= 1e6 ? { policy: 'extent', extent: largest } : null;
}
