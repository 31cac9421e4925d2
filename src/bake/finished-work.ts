import { fileDigest } from '../store/bake-folder.ts';
import type { JournalEntry } from './journal-entry.ts';

/** Which frames of a bake are done, and what was written in them. */
export interface FinishedWork {
  has(kind: JournalEntry['kind'], cascade: number, frame: number): boolean;
  add(entry: JournalEntry): void;
  /** All entries, by cascade, kind and frame: an order that does not depend on who finished first. */
  entries(): readonly JournalEntry[];
}

/**
 * The finished work that journals tell of, as far as it can be trusted: an entry counts only while each of its files
 * hashes to what the journal says.
 *
 * @param folder the bake folder
 * @param journalled entries of all journals, in any order
 */
export function finishedWork(folder: string, journalled: readonly JournalEntry[]): FinishedWork {
  const done = new Map<string, JournalEntry>();
  const key = (kind: string, cascade: number, frame: number): string => `${kind} ${cascade} ${frame}`;
  for (const entry of journalled) {
    if (entry.files.every((file) => isIntact(folder, file)))
      done.set(key(entry.kind, entry.cascade, entry.frame), entry);
  }
  return {
    has: (kind, cascade, frame) => done.has(key(kind, cascade, frame)),
    add: (entry) => done.set(key(entry.kind, entry.cascade, entry.frame), entry),
    entries: () =>
      [...done.values()].sort(
        (a, b) => a.cascade - b.cascade || a.kind.localeCompare(b.kind) || a.frame - b.frame,
      ),
  };
}

/** Whether a file is there with the size and hash it was written with. */
export function isIntact(
  folder: string,
  file: { readonly path: string; readonly bytes: number; readonly sha256: string },
): boolean {
  const found = fileDigest(folder, file.path);
  return found !== null && found.bytes === file.bytes && found.sha256 === file.sha256;
}
