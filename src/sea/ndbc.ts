import { type DataFile, dataError } from './data-file.ts';
import { ndbcBands } from './ndbc-bands.ts';
import {
  NDBC_FILES,
  type NdbcFile,
  type NdbcFileName,
  type NdbcValues,
  ndbcFile,
  ndbcValues,
} from './ndbc-file.ts';
import { blendedRecord, directionMoments, recordVariance, type SpectralRecord } from './spectral-record.ts';
import { withoutEnergy } from './spectrum-csv.ts';
import { utcText } from './utc-time.ts';

/** The files of a station: the density alone, or all five. */
export type NdbcFiles = { readonly density: DataFile } & { readonly [N in NdbcFileName]?: DataFile };

/** A record, and the words for when it was taken. */
export interface TimedRecord {
  readonly record: SpectralRecord;
  readonly words: string;
}

/** Records further apart than this are not blended, minutes. */
const WIDEST_GAP = 180;

/** The first of a station's times, its last and how many there are. */
export interface NdbcTimes {
  readonly first: number;
  readonly last: number;
  readonly count: number;
}

/** A station's files with their times read. */
export interface NdbcStation {
  readonly files: readonly NdbcFile[];
  readonly times: NdbcTimes;
}

/**
 * Reads the times of a station's files.
 *
 * @throws InputError where one is no such file
 */
export function ndbcStation(files: NdbcFiles): NdbcStation {
  const own = NDBC_FILES.flatMap((name) => {
    const file = files[name];
    return file === undefined ? [] : [ndbcFile(file, name)];
  });
  const times = [...own[0].records.keys()];
  const range = times.reduce(
    ({ first, last }, time) => ({ first: Math.min(first, time), last: Math.max(last, time) }),
    { first: Infinity, last: -Infinity },
  );
  return { files: own, times: { ...range, count: times.length } };
}

/**
 * The spectrum of a moment: that of a record, or between the records before and after.
 *
 * @param minutes since 2000, within the station's times
 * @throws InputError where a record is missing in one of the files, cut, or without energy
 */
export function ndbcRecord({ files, times }: NdbcStation, minutes: number): TimedRecord {
  const [density] = files;
  if (density.records.has(minutes)) {
    return { record: stationRecord(files, minutes), words: `record of ${utcText(minutes)}` };
  }
  let [before, after] = [times.first, times.last];
  for (const time of density.records.keys()) {
    if (time < minutes) before = Math.max(before, time);
    else after = Math.min(after, time);
  }
  if (after - before > WIDEST_GAP) {
    throw dataError(density.file, {
      line: density.records.get(before)?.line ?? 1,
      expected: `records at most ${WIDEST_GAP / 60} h apart around ${utcText(minutes)}`,
      found: `the next ones at ${utcText(before)} and ${utcText(after)}`,
      remedy: 'Choose a time at which the station reported.',
    });
  }
  const [earlier, later] = [stationRecord(files, before), stationRecord(files, after)];
  if (String(earlier.frequencyHz) !== String(later.frequencyHz)) {
    throw dataError(density.file, {
      line: density.records.get(after)?.line ?? 1,
      expected: `the frequencies of the record of ${utcText(before)}`,
      found: 'others',
      remedy: 'Choose the time of a record: these two cannot be blended.',
    });
  }
  const share = (minutes - before) / (after - before);
  return {
    record: blendedRecord(earlier, later, share),
    words: `${utcText(minutes)}, between the records of ${utcText(before)} and ${utcText(after)}`,
  };
}

/** The record of one time, put together from all files. */
function stationRecord(files: readonly NdbcFile[], minutes: number): SpectralRecord {
  const [density, ...others] = files.map((file) => valuesAt(file, files[0], minutes));
  const { file } = files[0];
  const densityM2PerHz = density.values.map((S, i) => {
    if (S !== null) return S;
    throw missingValue(file, density, i, 'spectral density');
  });
  others.forEach((own, o) => {
    if (String(own.frequencyHz) === String(density.frequencyHz)) return;
    throw dataError(files[o + 1].file, {
      line: own.line,
      expected: `the ${density.frequencyHz.length} frequencies of ${file.source}`,
      found: `${own.frequencyHz.length}${own.frequencyHz.length === density.frequencyHz.length ? ' others' : ''}`,
      remedy: 'Give files of one station and one day.',
    });
  });
  const [direction1, direction2, r1, r2] = others;
  const directions = densityM2PerHz.map((S, i) => {
    if (others.length === 0) return null;
    const own = [direction1, direction2, r1, r2].map(({ values }) => values[i]);
    if (own.every((value) => value !== null)) {
      const [alpha1, alpha2, one, two] = own;
      return directionMoments((alpha1 * Math.PI) / 180, one, (alpha2 * Math.PI) / 180, two);
    }
    // Where nothing moves there is no direction, and none is needed.
    if (S === 0) return null;
    const missing = own.indexOf(null);
    throw missingValue(files[missing + 1].file, others[missing], i, files[missing + 1].name);
  });
  const record = { ...ndbcBands(density.frequencyHz), densityM2PerHz, directions };
  if (recordVariance(record) === 0) throw withoutEnergy(file, density.line);
  return record;
}

function valuesAt(own: NdbcFile, density: NdbcFile, minutes: number): NdbcValues {
  const line = own.records.get(minutes);
  if (line !== undefined) {
    const values = ndbcValues(own, line);
    const isAscending = values.frequencyHz.every(
      (f, i) => f > 0 && (i === 0 || f > values.frequencyHz[i - 1]),
    );
    if (isAscending && values.frequencyHz.length >= 3) return values;
    throw dataError(own.file, {
      line: line.line,
      expected: 'at least three frequencies in ascending order',
      found: isAscending ? `${values.frequencyHz.length}` : 'another order',
      remedy: 'Download the file again: it is cut or altered.',
    });
  }
  throw dataError(own.file, {
    line: 1,
    expected: `a record of ${utcText(minutes)}, as in ${density.file.source}`,
    found: 'none',
    remedy: 'Give files of one station and one day, downloaded together.',
  });
}

function missingValue(file: DataFile, { line, frequencyHz }: NdbcValues, i: number, what: string): Error {
  return dataError(file, {
    line,
    expected: `a ${what} at ${frequencyHz[i]} Hz, where there is energy`,
    found: 'a missing value',
    remedy: 'Choose another record: missing values are not filled in.',
  });
}
