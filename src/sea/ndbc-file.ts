import { type DataFile, dataError, numberedLines, plainNumber } from './data-file.ts';
import { shortened } from './findings.ts';
import { utcMinutes, utcText } from './utc-time.ts';

/** The five spectral files of a station. */
export const NDBC_FILES = ['density', 'direction1', 'direction2', 'r1', 'r2'] as const;
export type NdbcFileName = (typeof NDBC_FILES)[number];

/** Words for messages, the variable named in the first line of real-time files, the values' range and missing mark. */
const CONTENTS: Readonly<
  Record<NdbcFileName, { readonly words: string; readonly variable: string; readonly most: number }>
> = {
  density: { words: 'spectral density C11', variable: 'spec', most: 1e4 },
  direction1: { words: 'mean direction alpha1', variable: 'alpha1', most: 360 },
  direction2: { words: 'principal direction alpha2', variable: 'alpha2', most: 360 },
  r1: { words: 'r1', variable: 'r1', most: 1 },
  r2: { words: 'r2', variable: 'r2', most: 1 },
};

/** A value of 999 stands for one that was not measured, in every file. */
const MISSING = 999;

/** One of a station's files, its times read and its values not yet. */
export interface NdbcFile {
  readonly file: DataFile;
  readonly name: NdbcFileName;
  /** Real-time files pair every value with its frequency, history files name the frequencies once. */
  readonly layout: 'real-time' | 'history';
  /** Frequencies of the first line of a history file, Hz; empty in real time. */
  readonly headFrequencies: readonly number[];
  /** Lines by their time, minutes since 2000. */
  readonly records: ReadonlyMap<number, NdbcLine>;
}

interface NdbcLine {
  readonly line: number;
  /** What follows the time. */
  readonly words: readonly string[];
}

/** Values of one time; null where missing. Directions in degrees, r1 and r2 as fractions. */
export interface NdbcValues {
  readonly line: number;
  readonly frequencyHz: readonly number[];
  readonly values: readonly (number | null)[];
}

/**
 * Reads the times of a spectral file of the National Data Buoy Center, real-time or yearly history.
 *
 * Real time: `#YY MM DD hh mm [Sep_Freq] value (frequency) ...`, newest first, r1 and r2 as fractions. History: the
 * frequencies in the first line, oldest first, r1 and r2 in hundredths; old years have two digits and no minutes.
 * Source: NDBC, measurement descriptions (from memory) and the files themselves.
 *
 * @throws InputError at the first line that is of neither layout
 */
export function ndbcFile(file: DataFile, name: NdbcFileName): NdbcFile {
  const [head, ...lines] = numberedLines(file.text);
  const words = head === undefined ? [] : wordsOf(head.text.replace(/^\s*#/, ' '));
  if (!/^(?:YY|YYYY|yr)$/i.test(words[0] ?? '') || words[1] !== 'MM') {
    throw dataError(file, {
      line: 1,
      expected: 'the first line of an NDBC spectral file, which begins with #YY MM DD hh',
      found: head === undefined ? 'an empty file' : `\`${shortened(head.text)}\``,
      remedy: `Give the file of the ${CONTENTS[name].words}, as downloaded.`,
    });
  }
  const stampWords = words[4] === 'mm' ? 5 : 4;
  const columns = words.slice(stampWords);
  const headFrequencies = columns.map(plainNumber);
  const isHistory = columns.length > 0 && headFrequencies.every((f) => f !== null);
  if (!isHistory) checkVariable(file, name, columns);
  const records = new Map<number, NdbcLine>();
  for (const { line, text } of lines) {
    // A second line of units, or of names where files were joined.
    if (text.trimStart().startsWith('#')) continue;
    const own = wordsOf(text);
    const minutes = stampMinutes(own.slice(0, stampWords));
    if (minutes === null) {
      throw dataError(file, {
        line,
        expected: `a time of ${stampWords} numbers (${words.slice(0, stampWords).join(' ')}) before the values`,
        found: `\`${shortened(text)}\``,
        remedy: 'Download the file again: it is cut or altered.',
      });
    }
    if (records.has(minutes)) {
      throw dataError(file, {
        line,
        expected: 'each time once',
        found: `${utcText(minutes)} again`,
        remedy: 'Remove one of the two lines.',
      });
    }
    records.set(minutes, { line, words: own.slice(stampWords) });
  }
  if (records.size === 0) {
    throw dataError(file, {
      line: 1,
      expected: 'records below the first line',
      found: 'none',
      remedy: 'Download the file again: it is cut.',
    });
  }
  const layout = isHistory ? 'history' : 'real-time';
  return { file, name, layout, headFrequencies: isHistory ? (headFrequencies as number[]) : [], records };
}

/** A real-time file says what it holds: one in another's place is noticed. */
function checkVariable(file: DataFile, name: NdbcFileName, columns: readonly string[]): void {
  const { variable, words } = CONTENTS[name];
  const named = columns.find((column) => /_1$/.test(column))?.replace(/_1$/, '');
  if (named === variable) return;
  throw dataError(file, {
    line: 1,
    expected: `columns ${variable}_1 (freq_1) ... or the frequencies themselves`,
    found: named === undefined ? `\`${shortened(columns.join(' '))}\`` : `columns of ${shortened(named)}`,
    remedy: `Give the file of the ${words}.`,
  });
}

function wordsOf(text: string): string[] {
  return text.trim().split(/\s+/);
}

function stampMinutes(words: readonly string[]): number | null {
  if (!words.every((word) => /^\d{1,4}$/.test(word)) || words.length < 4) return null;
  const [year, month, day, hour, minute = 0] = words.map(Number);
  // Files of the last century have two digits.
  return utcMinutes(year < 100 ? 1900 + year : year, month, day, hour, minute);
}

/**
 * The values of one time.
 *
 * @throws InputError where the line is cut or holds what it cannot
 */
export function ndbcValues(own: NdbcFile, record: NdbcLine): NdbcValues {
  const { file, name, layout, headFrequencies } = own;
  const { line } = record;
  const refuse = (expected: string, found: string): Error =>
    dataError(file, { line, expected, found, remedy: 'Download the file again: it is cut or altered.' });
  // Real-time densities begin with the frequency that separates swell from wind sea.
  const skipped = layout === 'real-time' && name === 'density' ? 1 : 0;
  const words = record.words.slice(skipped);
  const value = (word: string): number | null => {
    const number = plainNumber(word);
    if (number === MISSING) return null;
    const scale = layout === 'history' && (name === 'r1' || name === 'r2') ? 0.01 : 1;
    const { most, words: what } = CONTENTS[name];
    if (number !== null && number >= 0 && number * scale <= most) return number * scale;
    throw refuse(`a ${what} from 0 to ${most / scale}, or 999 where it is missing`, `\`${shortened(word)}\``);
  };
  if (layout === 'history') {
    if (words.length !== headFrequencies.length) {
      throw refuse(`${headFrequencies.length} values, one for each frequency`, `${words.length}`);
    }
    return { line, frequencyHz: headFrequencies, values: words.map(value) };
  }
  if (words.length === 0 || words.length % 2 === 1)
    throw refuse('values and (frequencies) in pairs', `${words.length} words`);
  const frequencyHz: number[] = [];
  const values: (number | null)[] = [];
  for (let i = 0; i < words.length; i += 2) {
    const frequency = plainNumber(/^\((.+)\)$/.exec(words[i + 1])?.[1] ?? '');
    if (frequency === null) throw refuse('a (frequency) after each value', `\`${shortened(words[i + 1])}\``);
    values.push(value(words[i]));
    frequencyHz.push(frequency);
  }
  return { line, frequencyHz, values };
}
