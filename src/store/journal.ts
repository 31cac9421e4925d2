import {
  closeSync,
  fstatSync,
  fsyncSync,
  ftruncateSync,
  mkdirSync,
  openSync,
  readFileSync,
  writeSync,
} from 'node:fs';
import { dirname } from 'node:path';
import { InputError, InternalError } from '../errors.ts';
import { filesIn } from './bake-folder.ts';
import { fileError } from './file-errors.ts';
import { insidePath } from './safe-path.ts';

/*
 * Journals: what a process has finished, one JSON object a line, only ever added to. A line counts once its line end is
 * there, so a process can be killed at any moment. Numbers come back to the bit, because JavaScript prints float64 with
 * as many digits as it takes; only -0 comes back as 0.
 */

const EXTENSION = '.jsonl';
const LINE_END = 0x0a;

/** A journal open for this process alone. */
export interface Journal<Entry extends object> {
  /** Path inside the folder it was opened in. */
  readonly path: string;
  /**
   * Adds one line and hands it to the system.
   * @throws InternalError for a number that JSON cannot say (NaN, infinity); ReadWriteError
   */
  readonly append: (entry: Entry) => void;
  /** Waits until the disk has every line, and closes the file; nothing can be appended afterwards. */
  readonly close: () => void;
}

/**
 * Opens a journal to add to, and makes it where it is missing. A last line without an end, which a killed process of the
 * same name left, is cut off.
 * @param name unique to the process, e.g. `<host>-<pid>-<random>`; letters, digits, dots and dashes
 * @throws CannotCreateError, ReadWriteError
 */
export function openJournal<Entry extends object>(folder: string, name: string): Journal<Entry> {
  const path = insidePath(folder, name + EXTENSION);
  let file: number;
  // Length of the file's whole lines.
  let end: number;
  try {
    mkdirSync(dirname(path), { recursive: true });
    file = openSync(path, 'a+');
    end = readFileSync(file).lastIndexOf(LINE_END) + 1;
    if (end < fstatSync(file).size) ftruncateSync(file, end);
  } catch (cause) {
    throw fileError('create', path, cause);
  }
  return {
    path: name + EXTENSION,
    append(entry) {
      const line = new TextEncoder().encode(`${JSON.stringify(entry, refuseNonFinite)}\n`);
      try {
        let written = 0;
        while (written < line.length) written += writeSync(file, line, written);
        end += line.length;
      } catch (cause) {
        // Whatever comes after half a line would be glued to it.
        ftruncateSync(file, end);
        throw fileError('write', path, cause);
      }
    },
    close() {
      try {
        fsyncSync(file);
        closeSync(file);
      } catch (cause) {
        throw fileError('write', path, cause);
      }
    },
  };
}

function refuseNonFinite(key: string, value: unknown): unknown {
  if (typeof value === 'number' && !Number.isFinite(value)) {
    throw new InternalError(`A journal cannot hold ${key} = ${value}.`);
  }
  return value;
}

/**
 * The entries of every journal in a folder: journals in the order of their names, entries as they were added. Processes
 * may be adding to them meanwhile.
 * @param isEntry whether a parsed line has the shape of an entry
 * @throws InputError where a finished line is not an entry; ReadWriteError
 */
export function readJournals<Entry extends object>(
  folder: string,
  isEntry: (value: unknown) => value is Entry,
): Entry[] {
  const names = filesIn(folder).filter((path) => path.endsWith(EXTENSION) && !path.includes('/'));
  return names.flatMap((name) => {
    const lines = journalText(insidePath(folder, name)).split('\n');
    // What follows the last line end is a torn line, or nothing.
    return lines.slice(0, -1).map((line, i) => {
      const value = parsedLine(line);
      if (!isEntry(value)) throw notAnEntry(name, i + 1, line);
      return value;
    });
  });
}

function journalText(path: string): string {
  try {
    return readFileSync(path, 'utf8');
  } catch (cause) {
    throw fileError('read', path, cause);
  }
}

function parsedLine(line: string): unknown {
  try {
    return JSON.parse(line);
  } catch {
    return undefined;
  }
}

function notAnEntry(source: string, line: number, text: string): InputError {
  const found = text.length > 60 ? `${text.slice(0, 60)}…` : text;
  const remedy =
    'The journal is damaged or of another version: remove it, and what it told of is made again.';
  return new InputError(source, [
    { path: '', line, column: 1, expected: 'an entry of a journal', found: JSON.stringify(found), remedy },
  ]);
}
