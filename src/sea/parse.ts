import type { z } from 'zod';
import { InputError, type InputProblem } from '../errors.ts';
import type { FileReader } from './data-file.ts';
import type { SeaDocument, SystemDocument } from './document.ts';
import { type Finding, type Place, problemOf, valueText } from './findings.ts';
import type { DataFiles } from './measured.ts';
import { type CheckedSections, resolvedSea } from './resolve.ts';
import { SEA_SCHEMA, SECTION_SCHEMAS } from './schema.ts';
import { schemaFindings } from './schema-findings.ts';
import type { Sea } from './sea.ts';
import { SYSTEM_SCHEMA } from './system-schema.ts';
import { yamlDocument } from './yaml-document.ts';

export interface ParseSeaOptions {
  /** The file's name, for messages. */
  readonly source?: string;
  /** Finds the files of measured systems by their paths; without it such a system is a problem. */
  readonly readFile?: FileReader;
}

const NO_PLACE: Place = Object.freeze({ line: 0, column: 0 });

const MOST_PROBLEMS = 50;

/**
 * The sea that a YAML 1.2 or JSON text describes: validated, in SI and radians, every default filled in, deeply frozen.
 *
 * @throws InputError with all problems of the text, each with its line, column and remedy; of a text without any, the
 *   first problem inside a file it refers to
 */
export function parseSea(text: string, options: ParseSeaOptions = {}): Sea {
  const source = options.source ?? '<text>';
  const document = yamlDocument(text);
  if (document.problems.length > 0) throw inputError(source, document.problems);
  return checkedSea(document.value, source, options, ({ path, atKey = false }) =>
    document.place(path, atKey),
  );
}

/**
 * The sea that an object describes, with the keys and values of a sea file: for seas built in memory.
 *
 * @param document as JSON or YAML would give it; checked as strictly
 * @throws InputError with all problems, each with its path
 */
export function seaFromObject(document: unknown, options: ParseSeaOptions = {}): Sea {
  return checkedSea(document, options.source ?? '<sea>', options, () => NO_PLACE);
}

function checkedSea(
  document: unknown,
  source: string,
  { readFile }: ParseSeaOptions,
  place: (finding: Finding) => Place,
): Sea {
  const findings: Finding[] = [];
  const files: DataFiles = { read: readFile ?? null, errors: [] };
  const sea = seaOrFindings(document, files, findings);
  // Data files are in order once the sea file is: their problems have places of their own.
  if (findings.length === 0 && files.errors.length > 0) throw files.errors[0];
  if (sea === null || findings.length > 0) {
    throw inputError(
      source,
      findings.map((finding) => problemOf(finding, place(finding))),
    );
  }
  return deeplyFrozen(sea);
}

function seaOrFindings(document: unknown, files: DataFiles, findings: Finding[]): Sea | null {
  if (typeof document !== 'object' || document === null || Array.isArray(document)) {
    findings.push({
      path: [],
      expected: 'a sea file (a group of keys: seaFile, title, systems...)',
      found: valueText(document),
      remedy: 'Start from a preset.',
    });
    return null;
  }
  const parsed = SEA_SCHEMA.safeParse(document);
  if (parsed.success) return resolvedSea(parsed.data, files, findings);
  findings.push(...schemaFindings(parsed.error.issues, document));
  resolvedSea(soundSections(document as Record<string, unknown>), files, findings);
  return null;
}

/** The sections, and within `systems` the entries, that pass the schema on their own. */
function soundSections(document: Record<string, unknown>): CheckedSections {
  const sound = <T>(schema: z.ZodType<T>, value: unknown): T | null => {
    const parsed = schema.safeParse(value);
    return parsed.success ? parsed.data : null;
  };
  const keys = Object.keys(SECTION_SCHEMAS) as (keyof SeaDocument)[];
  const sections = Object.fromEntries(
    keys.map((key) => [key, sound(SECTION_SCHEMAS[key] as z.ZodType, document[key])]),
  );
  const systems: (SystemDocument | null)[] | null = Array.isArray(document.systems)
    ? document.systems.slice(0, 16).map((system: unknown) => sound(SYSTEM_SCHEMA, system))
    : null;
  return { ...sections, systems } as unknown as CheckedSections;
}

/** In the order of the file, and no more than a person would read. */
function inputError(source: string, problems: readonly InputProblem[]): InputError {
  const ordered = [...problems].sort((a, b) => a.line - b.line || a.column - b.column);
  if (ordered.length <= MOST_PROBLEMS) return new InputError(source, ordered);
  const rest: InputProblem = {
    path: '',
    line: 0,
    column: 0,
    expected: `at most ${MOST_PROBLEMS} problems`,
    found: `${ordered.length}`,
    remedy: 'Only the first are listed: correct those, then read the file again.',
  };
  return new InputError(source, [...ordered.slice(0, MOST_PROBLEMS), rest]);
}

function deeplyFrozen<T>(value: T): T {
  if (typeof value === 'object' && value !== null && !Object.isFrozen(value)) {
    Object.freeze(value);
    for (const inner of Object.values(value)) deeplyFrozen(inner);
  }
  return value;
}
