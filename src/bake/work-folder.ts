import { CannotCreateError, InputError } from '../errors.ts';
import type { Manifest } from '../manifest/manifest.ts';
import { parseManifest } from '../manifest/manifest-text.ts';
import type { Plan } from '../plan/plan.ts';
import { parsePlan, planText } from '../plan/plan-text.ts';
import { makeFolders, writeFileAtomic, writeFileOnce } from '../store/atomic-file.ts';
import { filesIn, fileText, hasFile, removeFiles } from '../store/bake-folder.ts';
import { JOURNAL_EXTENSION, type JournalContents, readJournals } from '../store/journal.ts';
import { removeStaleTemporaries } from '../store/temporaries.ts';
import { isJournalLine, type JournalLine } from './journal-entry.ts';
import { isCodesPath, MANIFEST_PATH, PLAN_PATH, RUN_PATH, WORK_FOLDER } from './paths.ts';

/** Larger files are not ours. A manifest takes 150 bytes a file. */
const LARGEST_MANIFEST_BYTES = 2 ** 28;
const LARGEST_PLAN_BYTES = 2 ** 26;

/** Whose bake is in a folder. */
export interface Owner {
  readonly planHash: string;
  readonly title: string | null;
  /** Of a finished bake. */
  readonly manifest: Manifest | null;
}

/**
 * Whose bake is in a folder: by its manifest, else by the plan of an unfinished one; null for nobody's.
 *
 * @throws CannotCreateError (73) where files of these names are not ours
 */
export function ownerOf(folder: string): Owner | null {
  try {
    const manifest = manifestIn(folder);
    if (manifest !== null) return { planHash: manifest.planHash, title: manifest.title, manifest };
    if (!hasFile(folder, PLAN_PATH)) return null;
    // Read without a check: a plan of another version has an owner as well.
    const found = JSON.parse(fileText(folder, PLAN_PATH, LARGEST_PLAN_BYTES));
    return { planHash: String(found?.hash), title: titleOf(found), manifest: null };
  } catch (error) {
    if (!(error instanceof InputError || error instanceof SyntaxError)) throw error;
    throw new CannotCreateError(
      `${folder} holds a ${MANIFEST_PATH} or ${PLAN_PATH} that is damaged or not ours. Choose another folder with -o, or move it away. (${error.message})`,
      { cause: error },
    );
  }
}

function titleOf(plan: Readonly<Record<string, unknown>> | null): string | null {
  return typeof plan?.title === 'string' ? plan.title.slice(0, 200) : null;
}

/**
 * The manifest in a folder, checked whole; null where there is none.
 *
 * @throws InputError where it is none of ours
 */
export function manifestIn(folder: string): Manifest | null {
  if (!hasFile(folder, MANIFEST_PATH)) return null;
  return parseManifest(fileText(folder, MANIFEST_PATH, LARGEST_MANIFEST_BYTES), `${folder}/${MANIFEST_PATH}`);
}

/**
 * The plan of the unfinished bake in a folder, checked whole; null where there is none.
 *
 * @throws InputError where it is none of ours, was altered, or belongs to a version that writes other bytes
 */
export function planIn(folder: string): Plan | null {
  if (!hasFile(folder, PLAN_PATH)) return null;
  return parsePlan(fileText(folder, PLAN_PATH, LARGEST_PLAN_BYTES), `${folder}/${PLAN_PATH}`);
}

/** Whether a folder's bake is another plan's. */
export function isForeign(owner: Owner | null, plan: Plan): owner is Owner {
  return owner !== null && owner.planHash !== plan.hash;
}

/** @throws CannotCreateError (73), which says how to go on */
export function refuseForeign(folder: string, { title }: Owner): never {
  throw new CannotCreateError(
    `${folder} holds a bake of another plan${title === null ? '' : ` (${JSON.stringify(title)})`}. ` +
      'Choose another folder with -o, or --force to replace the files its manifest or journals name.',
  );
}

/**
 * Makes a folder this plan's: its plan is in it, its folders are there, and nothing that killed processes left half
 * written. Of several processes with different plans one succeeds.
 *
 * @param idleHere whether this process writes nothing there yet
 * @throws CannotCreateError (73) where another plan has been faster
 */
export function claimFolder(folder: string, plan: Plan, idleHere: boolean): void {
  const text = planText(plan);
  if (!writeFileOnce(folder, PLAN_PATH, text)) {
    const owner = ownerOf(folder);
    if (isForeign(owner, plan)) refuseForeign(folder, owner);
    // Of this hash but not of this text: it was damaged.
    if (fileText(folder, PLAN_PATH, LARGEST_PLAN_BYTES) !== text) writeFileAtomic(folder, PLAN_PATH, text);
  }
  makeFolders(folder, [WORK_FOLDER, ...plan.cascades.map(({ id }) => id)]);
  removeStaleTemporaries(folder, idleHere);
}

/** What the journals of a folder tell of its bake. */
export function journalsIn(folder: string): readonly JournalContents<JournalLine>[] {
  return readJournals(`${folder}/${WORK_FOLDER}`, isJournalLine);
}

/** Removes another plan's bake: what its manifest or its journals name, and nothing else. */
export function removeBake(folder: string, { manifest }: Owner, idleHere: boolean): void {
  const journalled = journalsIn(folder)
    .flatMap(({ entries }) => entries)
    .flatMap((line) => ('files' in line ? line.files : []));
  const named = [...(manifest?.files ?? []), ...journalled].map(({ path }) => path);
  // The manifest goes last: as long as it is there, it can be done again.
  removeFiles(folder, named);
  removeFiles(folder, [MANIFEST_PATH, RUN_PATH]);
  clearWorkFolder(folder, idleHere);
}

/**
 * Removes everything that only an unfinished bake needs, and what killed processes left half written; a file that is
 * not ours stays. The plan goes last: as long as it is there, the folder has its owner.
 */
export function clearWorkFolder(folder: string, idleHere: boolean): void {
  removeStaleTemporaries(folder, idleHere);
  const paths = filesIn(`${folder}/${WORK_FOLDER}`).map((path) => `${WORK_FOLDER}/${path}`);
  removeFiles(
    folder,
    paths.filter((path) => path.endsWith(JOURNAL_EXTENSION) || isCodesPath(path)),
  );
  removeFiles(folder, [PLAN_PATH]);
}
