import { InputError, type InputProblem } from '../../../src/errors.ts';
import { parseSea, seaFromObject } from '../../../src/sea/parse.ts';
import type { Sea } from '../../../src/sea/sea.ts';

/** The shortest sound sea file; tests add sections below it. It has 3 + `systems` lines. */
export const HEAD = 'seaFile: 1\ntitle: Test\n';
export const WIND_SEA = 'systems: [{ kind: wind-sea, from: 250, windSpeed: 8, fetch: 20 km }]\n';
export const SWELL = 'systems: [{ kind: swell, from: 250, significantHeight: 1, peakPeriod: 10 }]\n';
export const SOUND: string = HEAD + WIND_SEA;

/** What is wrong with a text, as `line:column path`, found in the order of the report. */
export function problemsOf(text: string): readonly InputProblem[] {
  return caught(() => parseSea(text, { source: 'test.yaml' }));
}

export function problemsOfObject(document: unknown): readonly InputProblem[] {
  return caught(() => seaFromObject(document));
}

export function placesOf(text: string): string[] {
  return problemsOf(text).map(({ line, column, path }) => `${line}:${column} ${path}`);
}

function caught(parse: () => Sea): readonly InputProblem[] {
  try {
    parse();
  } catch (error) {
    if (error instanceof InputError) return error.problems;
    throw error;
  }
  return [];
}
