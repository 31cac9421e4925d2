import { InputError } from '../errors.ts';
import type { DataFile, FileReader } from './data-file.ts';
import { SPREADING_DEFAULTS } from './defaults.ts';
import { directionRad } from './direction.ts';
import type { MeasuredDocument } from './document.ts';
import type { DocumentPath, Finding } from './findings.ts';
import { type NdbcFiles, ndbcRecord, ndbcStation } from './ndbc.ts';
import { NDBC_FILES } from './ndbc-file.ts';
import type { MeasuredRequest } from './sea.ts';
import { measuredSpectrum, type SpectralRecord, spreadMoments } from './spectral-record.ts';
import { spectrumTable } from './spectrum-csv.ts';
import { utcMinutesFromText, utcText } from './utc-time.ts';
import { resolvedWind } from './wind.ts';

/** How a sea reaches the files it refers to, and what was found wrong inside them. */
export interface DataFiles {
  /** null where a sea is made from a text alone. */
  readonly read: FileReader | null;
  /** Problems inside data files, which have a file and a line of their own; added to. */
  readonly errors: InputError[];
}

/** A record and what it does not say of directions. */
interface ReadRecord {
  readonly record: SpectralRecord;
  readonly hasDirection: boolean;
  readonly hasSpread: boolean;
  readonly source: string;
}

/** A measured system, its numbers read from its files; null, with findings or file errors, where it cannot be. */
export function resolvedMeasured(
  document: MeasuredDocument,
  name: string,
  path: DocumentPath,
  files: DataFiles,
  findings: Finding[],
): MeasuredRequest | null {
  const before = findings.length + files.errors.length;
  const wind = resolvedWind(document, path, findings);
  checkSource(document, path, findings);
  if (findings.length + files.errors.length > before) return null;
  const read = readRecord(document, path, files, findings);
  if (read === null) return null;
  checkDirections(document, read, path, findings);
  if (findings.length + files.errors.length > before) return null;
  const { fromRad, ...spectrum } = measuredSpectrum(withDirections(read, document));
  return {
    kind: 'measured',
    name,
    fromRad,
    scaleToM: document.scaleTo ?? null,
    source: read.source,
    spectrum,
    windSpeedMps: wind?.windSpeedMps ?? null,
    wind: wind?.words ?? null,
  };
}

function checkSource({ file, ndbc, time }: MeasuredDocument, path: DocumentPath, findings: Finding[]): void {
  if ((file === undefined) === (ndbc === undefined)) {
    findings.push({
      path: file === undefined ? [...path, 'file'] : [...path, 'ndbc'],
      expected: 'either file or ndbc',
      found: file === undefined ? 'neither' : 'both',
      remedy: file === undefined ? 'Add for example `file: buoy.csv`.' : 'Remove one of the two.',
    });
  }
  if (ndbc !== undefined) {
    const missing = NDBC_FILES.filter((key) => ndbc[key] === undefined);
    if (missing.length > 0 && missing.length < NDBC_FILES.length - 1) {
      findings.push({
        path: [...path, 'ndbc', missing[0]],
        expected: 'all of direction1, direction2, r1 and r2, or none',
        found: `no ${missing.join(', ')}`,
        remedy: 'Add it, or remove the others and give `from`.',
      });
    }
  }
  if (time === undefined) return;
  if (ndbc === undefined && file !== undefined) {
    findings.push({
      path: [...path, 'time'],
      expected: 'no time for a table, which holds one spectrum',
      found: 'one',
      remedy: 'Remove it.',
    });
  } else if (utcMinutesFromText(time) === null) {
    findings.push({
      path: [...path, 'time'],
      expected: 'a moment of the calendar',
      found: `\`${time}\``,
      remedy: 'Check month, day, hour and minute.',
    });
  }
}

/** Reads the files; what is wrong inside them goes to `files.errors`. */
function readRecord(
  document: MeasuredDocument,
  path: DocumentPath,
  files: DataFiles,
  findings: Finding[],
): ReadRecord | null {
  const { file, ndbc } = document;
  try {
    if (file !== undefined) {
      const table = dataFile(file, [...path, 'file'], files, findings);
      if (table === null) return null;
      const { from, spread } = document;
      const given = { fromRad: from ?? null, spreadRad: spread ?? SPREADING_DEFAULTS.measuredRad };
      return { ...spectrumTable(table, given), source: file };
    }
    if (ndbc === undefined) return null;
    const entries = NDBC_FILES.flatMap((key) => {
      const own = ndbc[key];
      return own === undefined
        ? []
        : [[key, dataFile(own, [...path, 'ndbc', key], files, findings)] as const];
    });
    if (entries.some(([, own]) => own === null)) return null;
    const stationFiles = Object.fromEntries(entries) as unknown as NdbcFiles;
    return readStation(document, ndbc.density, stationFiles, path, findings);
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    files.errors.push(error);
    return null;
  }
}

function readStation(
  { time }: MeasuredDocument,
  density: string,
  files: NdbcFiles,
  path: DocumentPath,
  findings: Finding[],
): ReadRecord | null {
  const station = ndbcStation(files);
  const { first, last, count } = station.times;
  const minutes = time === undefined ? first : (utcMinutesFromText(time) as number);
  const isWithin = time === undefined ? count === 1 : minutes >= first && minutes <= last;
  if (!isWithin) {
    findings.push({
      path: [...path, 'time'],
      expected: `a time from ${utcText(first)} to ${utcText(last)}, that of the ${count} records of \`${density}\``,
      found: time === undefined ? 'nothing' : utcText(minutes),
      remedy: `Write for example \`time: ${isoText(last)}\`.`,
    });
    return null;
  }
  const { record, words } = ndbcRecord(station, minutes);
  const hasDirection = files.r1 !== undefined;
  return { record, hasDirection, hasSpread: hasDirection, source: `${density}, ${words}` };
}

function isoText(minutes: number): string {
  return utcText(minutes).replace(' UTC', 'Z').replace(' ', 'T');
}

function dataFile(
  written: string,
  path: DocumentPath,
  files: DataFiles,
  findings: Finding[],
): DataFile | null {
  const answer =
    files.read === null
      ? { problem: 'a sea read without its folder: parseSea has no `readFile`' }
      : files.read(written);
  if (!('problem' in answer)) return answer;
  findings.push({
    path,
    expected: 'a file that can be read, by its path from the folder of the sea file',
    found: answer.problem,
    remedy: 'Check the path.',
  });
  return null;
}

function checkDirections(
  { from, spread }: MeasuredDocument,
  read: ReadRecord,
  path: DocumentPath,
  findings: Finding[],
): void {
  const beside = (key: 'from' | 'spread'): void => {
    findings.push({
      path: [...path, key],
      expected: `no ${key} beside that of the file`,
      found: 'one',
      remedy: `Remove it, or the ${key === 'from' ? 'directions' : 'spreads'} from the file.`,
    });
  };
  if (read.hasDirection && from !== undefined) beside('from');
  if (read.hasSpread && spread !== undefined) beside('spread');
  if (!read.hasDirection && from === undefined) {
    findings.push({
      path: [...path, 'from'],
      expected: 'the direction the waves come from, which the file does not say',
      found: 'nothing',
      remedy: 'Add for example `from: 250 deg`.',
    });
  }
}

/** The record with the document's direction where the file has none. */
function withDirections(
  { record, hasDirection }: ReadRecord,
  { from, spread }: MeasuredDocument,
): SpectralRecord {
  if (hasDirection) return record;
  const moments = spreadMoments(directionRad(from as number), spread ?? SPREADING_DEFAULTS.measuredRad);
  return { ...record, directions: record.directions.map(() => moments) };
}
