import { closeSync, fsyncSync, ftruncateSync, openSync, readFileSync, writeSync } from 'node:fs';
import { dirname } from 'node:path';
import { InternalError } from '../errors.ts';
import { sha256 } from '../hash.ts';
import { makeFolder } from './atomic-file.ts';
import { fileStatus, filesIn } from './bake-folder.ts';
import { fileError, systemCode } from './file-errors.ts';
import { insidePath } from './safe-path.ts';

/*
 * Journals: what a process has finished, one JSON object a line, only ever added to. A line counts once its line end is
 * there, so a process can be killed at any moment, and only if its own check sum agrees, so a damaged line is known for
 * one. Every line stands for itself: the others stay good. Numbers come back to the bit, because JavaScript prints
 * float64 with as many digits as it takes; only -0 comes back as 0.
 */

/** What the names of journals end with. */
export const JOURNAL_EXTENSION = '.jsonl';
/** `...,"check":"<16 hex digits>"}`: the last key of every line, over what the line is without it. */
const CHECKED_LINE = /^(\{.*),"check":"([0-9a-f]{16})"\}$/s;
/** A journal of a hundred thousand frames is smaller; a larger file is not read at all. */
const LARGEST_BYTES = 2 ** 28;

/** A journal that this process alone writes. */
export interface Journal<Entry extends object> {
  /**
   * Adds one line and hands it to the system. The first one makes the file.
   * @throws InternalError for a number that JSON cannot say (NaN, infinity); CannotCreateError, ReadWriteError
   */
  readonly append: (entry: Entry) => void;
  /** Waits until the disk has every line, and closes the file; nothing can be appended afterwards. */
  readonly close: () => void;
}

/**
 * A journal to add to. Nothing is written before there is something to say.
 * @param name unique to the process, e.g. `<host>-<pid>-<random>`; letters, digits, dots and dashes
 */
export function newJournal<Entry extends object>(folder: string, name: string): Journal<Entry> {
  const path = insidePath(folder, name + JOURNAL_EXTENSION);
  let file: number | null = null;
  let closed = false;
  // Length of the file's whole lines.
  let end = 0;
  return {
    append(entry) {
      const line = new TextEncoder().encode(`${checkedLine(entry)}\n`);
      if (closed) throw new InternalError(`The journal ${path} is closed.`);
      file ??= created(path);
      try {
        let written = 0;
        while (written < line.length) written += writeSync(file, line, written);
        end += line.length;
      } catch (cause) {
        cutOff(file, end);
        throw fileError('write', path, cause);
      }
    },
    close() {
      closed = true;
      if (file === null) return;
      const open = file;
      file = null;
      try {
        fsyncSync(open);
      } catch (cause) {
        throw fileError('write', path, cause);
      } finally {
        closeSync(open);
      }
    },
  };
}

function created(path: string): number {
  try {
    makeFolder(dirname(path));
    return openSync(path, 'ax');
  } catch (cause) {
    throw fileError('create', path, cause);
  }
}

/** Whatever comes after half a line would be glued to it. */
function cutOff(file: number, length: number): void {
  try {
    ftruncateSync(file, length);
  } catch {
    // The half line then spoils the next one too: both fail their check, and what they tell of is made again.
  }
}

function checkedLine(entry: object): string {
  const text = JSON.stringify(entry, refuseNonFinite);
  return `${text.slice(0, -1)},"check":"${checkSum(text)}"}`;
}

function checkSum(text: string): string {
  return sha256(text).slice('sha256:'.length, 'sha256:'.length + 16);
}

function refuseNonFinite(key: string, value: unknown): unknown {
  if (typeof value === 'number' && !Number.isFinite(value)) {
    throw new InternalError(`A journal cannot hold ${key} = ${value}.`);
  }
  return value;
}

/** What one journal tells. */
export interface JournalContents<Entry> {
  /** Its path in the folder. */
  readonly path: string;
  /** When it was last added to, by the clock of the file's server, ms since 1970. */
  readonly changedMs: number;
  /** Its good lines, in the order they were added. */
  readonly entries: readonly Entry[];
  /** Number of finished lines that are not as they were written, or not entries. */
  readonly damagedLines: number;
}

/**
 * What the journals in a folder tell, in the order of their names. Processes may be adding to them meanwhile, or
 * clearing them away.
 * @param isEntry whether a parsed line has the shape of an entry
 * @throws ReadWriteError
 */
export function readJournals<Entry extends object>(
  folder: string,
  isEntry: (value: unknown) => value is Entry,
): JournalContents<Entry>[] {
  const paths = filesIn(folder).filter((path) => path.endsWith(JOURNAL_EXTENSION) && !path.includes('/'));
  return paths.flatMap((path) => {
    const status = fileStatus(folder, path);
    if (status?.isFile() !== true) return [];
    const journal = { path, changedMs: status.mtimeMs };
    if (status.size > LARGEST_BYTES) return [{ ...journal, entries: [], damagedLines: 1 }];
    const text = journalText(insidePath(folder, path));
    if (text === null) return [];
    // What follows the last line end is a torn line, or nothing.
    const lines = text.split('\n').slice(0, -1);
    const entries = lines.map(checkedEntry).filter(isEntry);
    return [{ ...journal, entries, damagedLines: lines.length - entries.length }];
  });
}

/** Null where the journal was cleared away since it was listed. */
function journalText(path: string): string | null {
  try {
    return readFileSync(path, 'utf8');
  } catch (cause) {
    if (systemCode(cause) === 'ENOENT') return null;
    throw fileError('read', path, cause);
  }
}

/** What a line says; undefined where it is damaged. */
function checkedEntry(line: string): unknown {
  const match = CHECKED_LINE.exec(line);
  if (match === null) return undefined;
  const text = `${match[1]}}`;
  if (checkSum(text) !== match[2]) return undefined;
  try {
    return JSON.parse(text);
  } catch {
    return undefined;
  }
}
