import { CASCADES_DEFAULTS } from './defaults.ts';
import type { CascadeDocument, CascadesDocument } from './document.ts';
import type { DocumentPath, Finding } from './findings.ts';
import { resolvedCascadeLoop } from './loop.ts';
import type { CascadesRequest, ListedCascade, Loop } from './sea.ts';
import { metres } from './wave-heights.ts';

const RESOLUTIONS = Object.freeze([16, 32, 64, 128, 256, 512, 1024, 2048, 4096, 8192] as const);

/** Shortest wave that a grid can carry: two texels. */
export function nyquistWavelengthM(patchLengthM: number, resolution: number): number {
  return (2 * patchLengthM) / resolution;
}

/**
 * The cascades of a document.
 *
 * @param whole the whole loop; null where it could not be resolved, then loops of single cascades go unchecked
 */
export function resolvedCascades(
  document: CascadesDocument | undefined,
  whole: Loop | null,
  findings: Finding[],
): CascadesRequest {
  if (Array.isArray(document)) return listedCascades(document as readonly CascadeDocument[], whole, findings);
  const given =
    document === undefined || document === 'auto'
      ? {}
      : (document as Exclude<CascadesDocument, 'auto' | readonly CascadeDocument[]>);
  const path = ['cascades'];
  const {
    count = CASCADES_DEFAULTS.count,
    resolution = CASCADES_DEFAULTS.resolution,
    shortestWavelength: shortestWavelengthM = CASCADES_DEFAULTS.shortestWavelengthM,
    longestPatch,
    headRoom = CASCADES_DEFAULTS.headRoom,
  } = given;
  checkResolution(resolution, [...path, 'resolution'], findings);
  if (longestPatch !== undefined && shortestWavelengthM >= longestPatch) {
    findings.push({
      path: [...path, 'shortestWavelength'],
      expected: `a wave shorter than the longest patch of ${metres(longestPatch)}`,
      found: metres(shortestWavelengthM),
      remedy: 'Shorten it or lengthen the patch.',
    });
  }
  const loops = (given.loops ?? []).map((loop, i) =>
    loop === 'whole' || whole === null
      ? null
      : resolvedCascadeLoop(loop, whole, [...path, 'loops', i], findings),
  );
  if (loops.length > count) {
    findings.push({
      path: [...path, 'loops'],
      expected: `at most ${count} loops, one for each cascade`,
      found: `${loops.length}`,
      remedy: 'Remove some or raise count.',
    });
  }
  const longestPatchM = longestPatch ?? null;
  return { plan: 'auto', count, resolution, shortestWavelengthM, longestPatchM, headRoom, loops };
}

function listedCascades(
  documents: readonly CascadeDocument[],
  whole: Loop | null,
  findings: Finding[],
): CascadesRequest {
  const list = documents.map((document, i): ListedCascade => {
    const path = ['cascades', i];
    const { patch: patchLengthM, resolution = CASCADES_DEFAULTS.resolution, band, loop } = document;
    checkResolution(resolution, [...path, 'resolution'], findings);
    checkBand(document, resolution, [...path, 'band'], findings);
    if (i > 0 && patchLengthM >= documents[i - 1].patch) {
      findings.push({
        path: [...path, 'patch'],
        expected: `a patch shorter than the ${metres(documents[i - 1].patch)} of the cascade before it`,
        found: metres(patchLengthM),
        remedy:
          'List cascades from the longest patch to the shortest; equal patches would carry the same waves.',
      });
    }
    return {
      patchLengthM,
      resolution,
      longestWavelengthM: band?.longest ?? null,
      shortestWavelengthM: band?.shortest ?? null,
      loop: loop && whole ? resolvedCascadeLoop(loop, whole, [...path, 'loop'], findings) : null,
    };
  });
  return { plan: 'list', list, headRoom: CASCADES_DEFAULTS.headRoom };
}

function checkResolution(resolution: number, path: DocumentPath, findings: Finding[]): void {
  if ((RESOLUTIONS as readonly number[]).includes(resolution)) return;
  const distance = (candidate: number): number => Math.abs(Math.log2(candidate / resolution));
  const nearest = RESOLUTIONS.reduce((a, b) => (distance(b) < distance(a) ? b : a));
  findings.push({
    path,
    expected: 'a power of two from 16 to 8192',
    found: `\`${resolution}\``,
    remedy: `Take ${nearest}, the nearest.`,
  });
}

function checkBand(
  { patch, band }: CascadeDocument,
  resolution: number,
  path: DocumentPath,
  findings: Finding[],
): void {
  const longest = band?.longest ?? patch;
  const shortest = band?.shortest;
  if (longest > patch) {
    findings.push({
      path: [...path, 'longest'],
      expected: `a wave of at most ${metres(patch)}, the length of the patch`,
      found: metres(longest),
      remedy: 'Shorten the wave or lengthen the patch: a tile cannot hold a wave longer than itself.',
    });
  }
  if (shortest === undefined) {
    const limit = nyquistWavelengthM(patch, resolution) / CASCADES_DEFAULTS.headRoom;
    if (band?.longest === undefined || longest > limit) return;
    findings.push({
      path: [...path, 'longest'],
      expected: `a wave longer than ${metres(limit)}, where the band of this patch and resolution ends`,
      found: metres(longest),
      remedy: 'Lengthen it, raise the resolution, or state the shortest wave too.',
    });
    return;
  }
  if (shortest >= longest) {
    findings.push({
      path: [...path, 'shortest'],
      expected: `a wave shorter than the longest of the band, ${metres(longest)}`,
      found: metres(shortest),
      remedy: 'Exchange the two or widen the band.',
    });
  }
  const nyquist = nyquistWavelengthM(patch, resolution);
  if (shortest < nyquist) {
    findings.push({
      path: [...path, 'shortest'],
      expected: `a wave of at least ${metres(nyquist)}, two texels`,
      found: metres(shortest),
      remedy: `Raise the resolution or take ${metres(2 * nyquist)}, four texels.`,
    });
  }
}
