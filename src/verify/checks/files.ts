import { chunks } from '../../codec/png-chunks.ts';
import { framePath, framePathExpression } from '../../manifest/frame-path.ts';
import type { ManifestCascade } from '../../manifest/manifest.ts';
import { fileStatus, filesIn } from '../../store/bake-folder.ts';
import type { BakeFacts } from '../bake-facts.ts';
import type { Check } from '../check.ts';
import type { SeenFile } from '../frame-reader.ts';
import { firstOf, verdict } from '../verdict.ts';

/** Chunks by which a PNG reader would convert the samples as colours. Source: PNG (Third Edition), W3C, section 11.3.2. */
const COLOUR_CHUNKS = ['gAMA', 'cHRM', 'sRGB', 'iCCP', 'cICP', 'mDCV', 'cLLI'];

/**
 * Every file that the manifest's maps call for is there and is what the list of files says, decodes to what its map
 * says, carries no colour transform, and there is no further frame that the list does not know. What else is in the
 * folder (`run.json`, journals, files of other names) is not looked at.
 */
export const FILES: Check = {
  name: 'files',
  question: 'Is every file there, as the manifest describes it, and none too many?',
  quick: true,
  begin(bake) {
    const faults: string[] = [];
    let read = 0;
    return {
      cascade({ cascade }) {
        const seen = new Set<number>();
        return {
          frame({ index, files }) {
            seen.add(index);
            for (const file of files) {
              read++;
              faults.push(...fileFaults(file).map((fault) => `${file.path}: ${fault}`));
            }
          },
          verdicts() {
            if (!bake.everyFrame) faults.push(...unreadFaults(bake, cascade, seen));
            return [];
          },
        };
      },
      whole() {
        faults.push(...strangers(bake));
        const reason = 'a bake is whole or it is not';
        const details = firstOf(faults, 12);
        return [
          verdict(faults.length, { limit: 0, unit: 'faults', reason }, [
            `${read} of ${bake.manifest.files.length} files read`,
            ...details,
          ]),
        ];
      },
    };
  },
};

function fileFaults({ listed, found, fault, planned }: SeenFile): readonly string[] {
  const faults: string[] = [];
  if (listed === null) faults.push('it is not in the list of files');
  if (listed !== null && found !== null) {
    if (found.bytes.length !== listed.bytes) {
      faults.push(`it has ${found.bytes.length} bytes, listed are ${listed.bytes}`);
    } else if (found.sha256 !== null && found.sha256 !== listed.sha256) {
      faults.push('its content is not what was hashed');
    }
  }
  if (fault !== null) faults.push(fault);
  else if (found !== null && planned.format === 'png') {
    const colour = chunks(found.bytes, '').find(({ type }) => COLOUR_CHUNKS.includes(type));
    if (colour !== undefined) faults.push(`its ${colour.type} chunk makes readers convert it as colour`);
  }
  return faults;
}

/** Presence and size of the frames that the quick checks do not read. */
function unreadFaults(
  bake: BakeFacts,
  cascade: ManifestCascade,
  seen: ReadonlySet<number>,
): readonly string[] {
  const listed = new Map(bake.manifest.files.map((file) => [file.path, file]));
  const faults: string[] = [];
  for (const { pattern } of Object.values(cascade.maps)) {
    for (let index = 0; index < cascade.loop.frameCount; index++) {
      if (seen.has(index)) continue;
      const path = framePath(pattern, cascade.loop.firstFrame + index);
      const entry = listed.get(path);
      const bytes = fileStatus(bake.folder, path)?.size;
      if (entry === undefined) faults.push(`${path}: it is not in the list of files`);
      else if (bytes === undefined) faults.push(`${path}: it is missing`);
      else if (bytes !== entry.bytes)
        faults.push(`${path}: it has ${bytes} bytes, listed are ${entry.bytes}`);
    }
  }
  return faults;
}

/** Frames in the folder that the list does not know, and listed files that are no frame of any map. */
function strangers({ folder, manifest }: BakeFacts): readonly string[] {
  const patterns = manifest.cascades.flatMap(({ maps, loop }) =>
    Object.values(maps).map(({ pattern }) => ({ loop, expression: framePathExpression(pattern) })),
  );
  const listed = new Set(manifest.files.map(({ path }) => path));
  const extra = filesIn(folder)
    .filter((path) => !listed.has(path) && patterns.some(({ expression }) => expression.test(path)))
    .map((path) => `${path}: it is a frame of this bake by its name, but not in the list of files`);
  const idle = manifest.files
    .filter(({ path }) => {
      return !patterns.some(({ loop: { firstFrame, frameCount }, expression }) => {
        const number = Number(expression.exec(path)?.[1] ?? Number.NaN) - firstFrame;
        return number >= 0 && number < frameCount;
      });
    })
    .map(({ path }) => `${path}: it is listed, but no map has such a frame`);
  return [...extra, ...idle];
}
