import { readFileSync } from 'node:fs';
import { parseSea } from '../../src/sea/parse.ts';
import type { MeasuredRequest, Sea } from '../../src/sea/sea.ts';

// Spectral files of NDBC station 41010 on 7 and 8 June 2020, and seas made from them. Origin and licence beside the data.

const FOLDER = new URL('../published/data/ndbc-41010-2020-06/', import.meta.url);

export const BUOY_FILES = {
  density: '41010.data_spec',
  direction1: '41010.swdir',
  direction2: '41010.swdir2',
  r1: '41010.swr1',
  r2: '41010.swr2',
} as const;

export function buoyText(name: string): string {
  return readFileSync(new URL(name, FOLDER), 'utf8');
}

/** What the station printed of one hour. */
export interface PrintedHour {
  /** `2020-06-08T03:50Z`, the stamp of the spectral files; the summary has :40. */
  readonly time: string;
  readonly heightM: string;
  readonly meanDirectionDeg: number;
}

/** The summary's rows, newest first, without its last, whose spectrum is not among the files. */
export function printedHours(): PrintedHour[] {
  const rows = buoyText('41010.spec').trim().split('\n').slice(2, 26);
  return rows.map((row) => {
    const [year, month, day, hour, , heightM, ...rest] = row.trim().split(/\s+/);
    return { time: `${year}-${month}-${day}T${hour}:50Z`, heightM, meanDirectionDeg: Number(rest.at(-1)) };
  });
}

/** A sea of the buoy at a moment; `changes` are further keys of the sea file. */
export function buoySea(time: string, changes: Readonly<Record<string, unknown>> = {}): Sea {
  const system = { kind: 'measured', ndbc: BUOY_FILES, time };
  const document = { seaFile: 1, title: 'Station 41010', systems: [system], ...changes };
  return parseSea(JSON.stringify(document), {
    readFile: (path) => ({ source: path, text: buoyText(path) }),
  });
}

export function measuredSystem({ systems: [system] }: Sea): MeasuredRequest {
  if (system.kind !== 'measured') throw new Error(`found a ${system.kind}`);
  return system;
}
