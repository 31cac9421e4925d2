import { InputError } from '../errors.ts';
import { shortened } from './findings.ts';

/** A file that a sea file refers to. */
export interface DataFile {
  /** Its name, for messages. */
  readonly source: string;
  readonly text: string;
}

/**
 * Finds the files a sea file refers to, by the paths written there. Reading is left to the caller, so that a sea can
 * be made from texts alone; `loadSea` reads from the sea file's folder.
 *
 * @returns the file, or what keeps it from being read, as the end of `found ...`
 */
export type FileReader = (path: string) => DataFile | { readonly problem: string };

/** Something wrong inside a data file. */
export interface DataProblem {
  /** Counted from 1. */
  readonly line: number;
  readonly column?: number;
  readonly expected: string;
  readonly found: string;
  readonly remedy: string;
}

/** The error of one problem in a data file: it has a source and a line of its own. */
export function dataError(
  file: DataFile,
  { line, column = 1, expected, found, remedy }: DataProblem,
): InputError {
  return new InputError(shortened(file.source), [{ path: '', line, column, expected, found, remedy }]);
}

/** Lines of a text with the number each has in its file, without those that are empty. */
export function numberedLines(text: string): { readonly line: number; readonly text: string }[] {
  return text
    .replace(/^\ufeff/, '')
    .split(/\r\n|\n|\r/)
    .map((own, i) => ({ line: i + 1, text: own }))
    .filter(({ text: own }) => own.trim() !== '');
}

const NUMBER = /^[-+]?(?:\d+\.?\d*|\.\d+)(?:[eE][-+]?\d+)?$/;

/** The number a word of a data file stands for; null where it is none. */
export function plainNumber(word: string): number | null {
  return NUMBER.test(word) ? Number(word) : null;
}
