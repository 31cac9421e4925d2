import { CannotCreateError, InputError } from '../errors.ts';
import type { Manifest } from '../manifest/manifest.ts';
import { parseManifest } from '../manifest/manifest-text.ts';
import type { Plan } from '../plan/plan.ts';
import { planText } from '../plan/plan-text.ts';
import { writeFileAtomic } from '../store/atomic-file.ts';
import { fileBytes, filesIn, hasFile, removeFiles } from '../store/bake-folder.ts';
import { readJournals } from '../store/journal.ts';
import { removeStaleTemporaries } from '../store/temporaries.ts';
import { isJournalEntry, type JournalEntry } from './journal-entry.ts';

/*
 * A bake folder holds the files of one plan. While a bake is unfinished, `.loopswell/` in it holds the plan, the
 * journals of the processes that work on it, and the scratch files of the foam; a finished bake has a manifest instead.
 */

export const MANIFEST_PATH = 'manifest.json';
export const RUN_PATH = 'run.json';
export const WORK_FOLDER = '.loopswell';
const PLAN_PATH = `${WORK_FOLDER}/plan.json`;

/** Scratch file of one frame's J codes. */
export function codesPath(cascadeId: string, frame: number): string {
  return `${WORK_FOLDER}/${cascadeId}.${String(frame).padStart(5, '0')}.codes`;
}

/** What a bake finds of itself in its folder. */
export interface FoundBake {
  /** The manifest of a finished bake of the same plan. */
  readonly manifest: Manifest | null;
  /** What earlier runs of the same plan wrote down. */
  readonly entries: readonly JournalEntry[];
}

/**
 * Makes a folder ready for a plan: takes up what earlier runs left, refuses another plan's bake or, with `force`,
 * removes what that bake's manifest or journals name and nothing else.
 *
 * @throws CannotCreateError (73) where another plan's bake is there
 */
export function takeUpFolder(folder: string, plan: Plan, force: boolean): FoundBake {
  const owner = ownerOf(folder);
  if (owner !== null && owner.planHash !== plan.hash) {
    if (!force) {
      throw new CannotCreateError(
        `${folder} holds a bake of another plan${owner.title === null ? '' : ` ("${owner.title}")`}. ` +
          'Choose another folder with -o, or --force to replace the files its manifest or journals name.',
      );
    }
    removeBake(folder, owner.manifest);
  } else {
    removeStaleTemporaries(folder);
    if (owner?.manifest != null) return { manifest: owner.manifest, entries: journalEntries(folder) };
  }
  if (!hasFile(folder, PLAN_PATH)) writeFileAtomic(folder, PLAN_PATH, planText(plan));
  return { manifest: null, entries: journalEntries(folder) };
}

/** Removes everything that only an unfinished bake needs. */
export function clearWorkFolder(folder: string): void {
  removeFiles(
    folder,
    filesIn(folder).filter((path) => path.startsWith(`${WORK_FOLDER}/`)),
  );
}

function journalEntries(folder: string): readonly JournalEntry[] {
  return readJournals(`${folder}/${WORK_FOLDER}`, isJournalEntry);
}

interface Owner {
  readonly planHash: string;
  readonly title: string | null;
  readonly manifest: Manifest | null;
}

/** Whose bake is in a folder: by its manifest, else by the plan of an unfinished one; null for nobody's. */
function ownerOf(folder: string): Owner | null {
  if (hasFile(folder, MANIFEST_PATH)) {
    const manifest = parseManifest(text(folder, MANIFEST_PATH), `${folder}/${MANIFEST_PATH}`);
    return { planHash: manifest.planHash, title: manifest.title, manifest };
  }
  if (!hasFile(folder, PLAN_PATH)) return null;
  const found = JSON.parse(text(folder, PLAN_PATH)) as Partial<Plan>;
  return { planHash: String(found.hash), title: found.title ?? null, manifest: null };
}

function removeBake(folder: string, manifest: Manifest | null): void {
  const named = manifest?.files.map(({ path }) => path) ?? [];
  let journalled: string[] = [];
  try {
    journalled = journalEntries(folder).flatMap(({ files }) => files.map(({ path }) => path));
  } catch (error) {
    // A journal that cannot be read names nothing; the rest of the folder is still ours to clear.
    if (!(error instanceof InputError)) throw error;
  }
  removeFiles(folder, [...named, ...journalled, MANIFEST_PATH, RUN_PATH]);
  clearWorkFolder(folder);
}

function text(folder: string, path: string): string {
  return new TextDecoder().decode(fileBytes(folder, path));
}
