import { ReadWriteError } from '../errors.ts';
import type { Manifest } from '../manifest/manifest.ts';
import { manifestText } from '../manifest/manifest-text.ts';
import { writeFileAtomic } from '../store/atomic-file.ts';
import { hasSize } from '../store/bake-folder.ts';
import { bakeManifest } from './bake-manifest.ts';
import type { Crew } from './crew.ts';
import { findLevels, makeFoam } from './foam-stage.ts';
import type { LevelEntry } from './journal-entry.ts';
import { MANIFEST_PATH } from './paths.ts';
import type { RunTally } from './run-report.ts';

/**
 * Makes a finished bake of one whose frames are all there: foam, and the manifest last.
 *
 * @param levels breaking levels that earlier runs found
 * @throws ReadWriteError (74) where a file has gone missing meanwhile
 */
export async function finishBake(
  crew: Crew,
  levels: readonly LevelEntry[],
  tally: RunTally,
): Promise<Manifest> {
  const found = await findLevels(crew, levels);
  await makeFoam(crew, found, null);
  tally.phase('foam');
  const manifest = bakeManifest(crew.plan, crew.finished.entries(), found);
  requireFiles(crew.folder, manifest);
  writeFileAtomic(crew.folder, MANIFEST_PATH, manifestText(manifest), { sync: true, makeFolders: false });
  tally.phase('gather');
  return manifest;
}

/** What was finished may have been removed or changed by others since: a manifest must not name it then. */
function requireFiles(folder: string, { files }: Manifest): void {
  const gone = files.filter((file) => !hasSize(folder, file)).map(({ path }) => path);
  if (gone.length === 0) return;
  const names = gone.slice(0, 3).join(', ') + (gone.length > 3 ? ` and ${gone.length - 3} more` : '');
  throw new ReadWriteError(
    `${names} in ${folder} went missing or changed while the bake ran. Run the same command again: what is missing is made.`,
  );
}
