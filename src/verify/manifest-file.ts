import { InputError, type InputProblem } from '../errors.ts';
import { isFramePattern } from '../manifest/frame-path.ts';
import type { Manifest, ManifestCascade, ManifestMap } from '../manifest/manifest.ts';
import { parseManifest } from '../manifest/manifest-text.ts';
import { MAP_CONTENTS } from '../plan/encodings.ts';
import type { MapName } from '../sea/sea.ts';
import { fileBytes, fileStatus } from '../store/bake-folder.ts';
import { insidePath } from '../store/safe-path.ts';

export const MANIFEST_PATH = 'manifest.json';

/** 200 000 files take some 40 MB. */
const LARGEST_MANIFEST_BYTES = 256 * 2 ** 20;
const SMALLEST_RESOLUTION = 2;

/**
 * The manifest of a finished bake, with all that checks rely on beyond its shape: a bake may come from a shared disk or
 * another person.
 *
 * @param folder bake folder
 * @throws InputError where it is no manifest or contradicts itself; ReadWriteError where there is none to read
 */
export function soundManifest(folder: string): Manifest {
  const source = `${folder}/${MANIFEST_PATH}`;
  const bytes = fileStatus(folder, MANIFEST_PATH)?.size ?? 0;
  if (bytes > LARGEST_MANIFEST_BYTES) {
    throw new InputError(source, [problem('', `at most ${LARGEST_MANIFEST_BYTES} bytes`, `${bytes} bytes`)]);
  }
  const manifest = parseManifest(new TextDecoder().decode(fileBytes(folder, MANIFEST_PATH)), source);
  const problems = contradictions(manifest);
  if (problems.length > 0) throw new InputError(source, problems.slice(0, 20));
  for (const { path } of manifest.files) insidePath(folder, path);
  return manifest;
}

function problem(path: string, expected: string, found: string): InputProblem {
  return { path, line: 0, column: 0, expected, found, remedy: 'Bake again: no bake writes such a manifest.' };
}

function contradictions(manifest: Manifest): InputProblem[] {
  const problems: InputProblem[] = [];
  const { cascades, files } = manifest;
  const ids = new Set(cascades.map(({ id }) => id));
  if (ids.size < cascades.length) problems.push(problem('cascades', 'ids that differ', 'one twice'));
  if (new Set(files.map(({ path }) => path)).size < files.length) {
    problems.push(problem('files', 'paths that differ', 'one twice'));
  }
  const patterns = cascades.flatMap(({ maps }) => Object.values(maps).map(({ pattern }) => pattern));
  if (new Set(patterns).size < patterns.length) {
    problems.push(problem('cascades', 'patterns that differ', 'one twice'));
  }
  cascades.forEach((cascade, c) => {
    problems.push(...cascadeContradictions(manifest, cascade, `cascades.${c}`));
  });
  return problems;
}

function cascadeContradictions(manifest: Manifest, cascade: ManifestCascade, place: string): InputProblem[] {
  const problems: InputProblem[] = [];
  const { resolution: N, loop } = cascade;
  if (N < SMALLEST_RESOLUTION || !Number.isInteger(Math.log2(N))) {
    problems.push(problem(`${place}.resolution`, 'a power of two', `${N}`));
  }
  const [numerator, denominator] = loop.frameRate;
  const seconds = (loop.frameCount * denominator) / numerator;
  if (Math.abs(loop.seconds / seconds - 1) > 1e-12) {
    problems.push(problem(`${place}.loop.seconds`, `${seconds} by its frames and rate`, `${loop.seconds}`));
  }
  // A frame count that the list of files cannot hold would only waste time; bounded here, it bounds all work below.
  const most = manifest.files.length;
  if (loop.frameCount > most) {
    const expected = `at most ${most}, the number of files`;
    problems.push(problem(`${place}.loop.frameCount`, expected, `${loop.frameCount}`));
  }
  for (const [name, map] of Object.entries(cascade.maps)) {
    problems.push(...mapContradictions(manifest, name as MapName, map, `${place}.maps.${name}`));
  }
  return problems;
}

function mapContradictions(
  manifest: Manifest,
  name: MapName,
  map: ManifestMap,
  place: string,
): InputProblem[] {
  const problems: InputProblem[] = [];
  if (!isFramePattern(map.pattern)) {
    problems.push(
      problem(`${place}.pattern`, 'a path with one %04d or the like', JSON.stringify(map.pattern)),
    );
  }
  const { quantities, dimension } = MAP_CONTENTS[name];
  const found = map.channels.map(({ quantity }) => quantity);
  if (found.length !== quantities.length || quantities.some((quantity) => !found.includes(quantity))) {
    problems.push(problem(`${place}.channels`, quantities.join(', '), found.join(', ')));
  }
  const { lengthUnit } = manifest.conventions;
  const unit = { length: lengthUnit, speed: `${lengthUnit}/s`, number: '1' }[dimension];
  for (const channel of map.channels) {
    if (channel.unit !== unit) problems.push(problem(`${place}.channels`, `unit ${unit}`, channel.unit));
    if (channel.decode.scale === 0) problems.push(problem(`${place}.channels`, 'a scale other than 0', '0'));
  }
  const integer = map.sample === 'uint8' || map.sample === 'uint16';
  if (integer !== (map.format === 'png')) {
    problems.push(problem(`${place}.sample`, `a sample type of ${map.format}`, map.sample));
  }
  return problems;
}
