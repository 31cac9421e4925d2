import { readdirSync, readFileSync, statSync } from 'node:fs';
import { basename, dirname, extname, resolve } from 'node:path';
import { InputError, ReadWriteError } from '../errors.ts';
import type { FileReader } from './data-file.ts';
import { shortened } from './findings.ts';
import { nearestOrPrefix } from './nearest.ts';
import { parseSea } from './parse.ts';
import type { Sea } from './sea.ts';
import { LARGEST_SEA_FILE_BYTES } from './yaml-document.ts';

// The one file that reads seas from disk. Reading is synchronous: sea files are small and nothing else can start.

const PRESETS = new URL('../../presets/', import.meta.url);

const EXTENSION = '.yaml';

/** Largest data file read, bytes: a buoy's year of one spectral file takes some four million. */
const LARGEST_DATA_FILE_BYTES = 1 << 25;

/** The text of a sea file or preset with its names. */
export interface SeaText {
  /** The file's name without folder and extension, or the preset's name: names the bake's folder. */
  readonly name: string;
  /** For messages. */
  readonly source: string;
  readonly text: string;
  /** Reads the files it refers to, from its own folder: hand it on to `parseSea`. */
  readonly readFile: FileReader;
}

export interface PresetSummary {
  readonly name: string;
  /** What it is for, in one line. */
  readonly purpose: string;
}

/** Names of the shipped seas in alphabetical order. */
export function presetNames(): string[] {
  return readdirSync(PRESETS)
    .filter((file) => file.endsWith(EXTENSION))
    .map((file) => basename(file, EXTENSION))
    .sort();
}

/**
 * The text of a shipped sea, to start from.
 *
 * @throws InputError if there is none of this name
 */
export function presetText(name: string): string {
  if (!presetNames().includes(name)) throw unknownSea(name);
  return readFileSync(new URL(`${name}${EXTENSION}`, PRESETS), 'utf8');
}

/** All presets with the line that says what each is for: the first comment after the line for editors. */
export function presetSummaries(): PresetSummary[] {
  return presetNames().map((name) => {
    const comment = presetText(name)
      .split('\n')
      .find((line) => line.startsWith('# ') && !line.startsWith('# yaml-language-server'));
    return { name, purpose: comment?.slice(2).trim() ?? '' };
  });
}

/**
 * The text of a preset or of a file; a preset's bare name comes first, `./name` is always a file.
 *
 * @throws InputError if it is neither; ReadWriteError if the file cannot be read
 */
export function seaText(pathOrPreset: string): SeaText {
  if (presetNames().includes(pathOrPreset)) {
    const text = presetText(pathOrPreset);
    return {
      name: pathOrPreset,
      source: `preset ${pathOrPreset}`,
      text,
      readFile: dataFiles((path) => new URL(path, PRESETS)),
    };
  }
  const name = basename(pathOrPreset, extname(pathOrPreset));
  const readFile = dataFiles((path) => resolve(dirname(pathOrPreset), path));
  return { name, source: pathOrPreset, text: fileText(pathOrPreset), readFile };
}

/**
 * The sea of a preset or file.
 *
 * @throws InputError with all its problems; ReadWriteError if the file cannot be read
 */
export function loadSea(pathOrPreset: string): Sea {
  const { text, source, readFile } = seaText(pathOrPreset);
  return parseSea(text, { source, readFile });
}

function fileText(path: string): string {
  let bytes: Buffer;
  try {
    // Asked before reading: a device or a film given by mistake must not fill the memory.
    const status = statSync(path);
    if (status.isFile() && status.size > LARGEST_SEA_FILE_BYTES) throw tooLarge(path, status.size);
    if (!status.isFile() && !status.isFIFO())
      throw new ReadWriteError(`${path}: expected a sea file, found no regular file. Give the file itself.`);
    bytes = readFileSync(path);
  } catch (error) {
    if (error instanceof InputError || error instanceof ReadWriteError) throw error;
    const { code, message } = error as NodeJS.ErrnoException;
    if (
      code === 'ENOENT' ||
      code === 'ENOTDIR' ||
      code === 'ENAMETOOLONG' ||
      code === 'ERR_INVALID_ARG_VALUE'
    )
      throw unknownSea(path);
    throw new ReadWriteError(`${path}: the sea file cannot be read: ${message}`, { cause: error });
  }
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch (error) {
    throw new InputError(
      path,
      [
        {
          path: '',
          line: 1,
          column: 1,
          expected: 'a text in UTF-8',
          found: 'other bytes',
          remedy: 'Save it as UTF-8.',
        },
      ],
      { cause: error },
    );
  }
}

/** Reads data files by their written paths, which are places beside a sea file. */
function dataFiles(placeOf: (path: string) => string | URL): FileReader {
  return (path) => {
    try {
      const place = placeOf(path);
      const status = statSync(place);
      if (!status.isFile()) return { problem: 'no regular file' };
      if (status.size > LARGEST_DATA_FILE_BYTES) return { problem: `${status.size} bytes, more than 32 MiB` };
      const text = new TextDecoder('utf-8', { fatal: true }).decode(readFileSync(place));
      return { source: path, text };
    } catch (error) {
      const { code } = error as NodeJS.ErrnoException;
      if (code === 'ENOENT' || code === 'ENOTDIR') return { problem: 'none there' };
      if (code === 'ERR_ENCODING_INVALID_ENCODED_DATA') return { problem: 'bytes that are no text in UTF-8' };
      return { problem: `one that cannot be read (${code})` };
    }
  };
}

function tooLarge(path: string, bytes: number): InputError {
  const found = `${bytes} bytes`;
  const remedy = 'Check that this is a sea file.';
  return new InputError(path, [
    { path: '', line: 1, column: 1, expected: 'a file of at most 1 MiB', found, remedy },
  ]);
}

function unknownSea(pathOrPreset: string): InputError {
  const names = presetNames();
  const nearest = nearestOrPrefix(pathOrPreset, names);
  const problem = {
    path: '',
    line: 0,
    column: 0,
    expected: `a sea file or one of the presets ${names.join(', ')}`,
    found: 'neither',
    remedy: nearest === null ? 'Check the path.' : `Did you mean \`${nearest}\`?`,
  };
  return new InputError(shortened(pathOrPreset), [problem]);
}
