import {
  type Document,
  isAlias,
  isMap,
  isScalar,
  isSeq,
  LineCounter,
  type Node,
  type Pair,
  parseDocument,
  type YAMLMap,
} from 'yaml';
import type { InputProblem } from '../errors.ts';
import { type DocumentPath, type Place, pathText, shortened } from './findings.ts';

/** A YAML 1.2 or JSON text as plain values that remember where they were written. */
export interface YamlDocument {
  /** Plain objects, lists, texts, numbers, booleans and nulls; undefined where the text cannot be read at all. */
  readonly value: unknown;
  /** What is wrong with the text itself, whatever it means. */
  readonly problems: readonly InputProblem[];
  /** Where a value (or its key) stands; for one that is missing, the nearest group around it. */
  readonly place: (path: DocumentPath, atKey: boolean) => Place;
}

/** Largest sea file read, bytes. They are a few kilobytes; a larger one is a mistake or an attack. */
export const LARGEST_SEA_FILE_BYTES: number = 1 << 20;

const DEEPEST_NESTING = 16;
const MOST_ALIASES = 50;

/** Keys that reach into a JavaScript object's prototype; no sea file has a use for them. */
const PROTOTYPE_KEYS: ReadonlySet<string> = new Set(['__proto__', 'constructor', 'prototype']);

const START: Place = Object.freeze({ line: 1, column: 1 });

/** Reads a text without trusting it: no tags, no second document, no alias bombs, no prototype keys, bounded size. */
export function yamlDocument(text: string): YamlDocument {
  const bytes = Buffer.byteLength(text);
  if (bytes > LARGEST_SEA_FILE_BYTES) {
    return unreadable('a file of at most 1 MiB', `${bytes} bytes`, 'Check that this is a sea file.', START);
  }
  const lines = new LineCounter();
  let document: Document.Parsed;
  try {
    // Duplicate keys are looked for below: the package's own search takes a time that grows with their square.
    document = parseDocument(text, {
      version: '1.2',
      lineCounter: lines,
      prettyErrors: false,
      uniqueKeys: false,
      // No tag makes anything but text, numbers, lists and groups.
      resolveKnownTags: false,
    });
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    // The composer recurses; only absurd nesting exhausts its stack.
    return unreadable(
      `at most ${DEEPEST_NESTING} levels of nesting`,
      'many more',
      'Check that this is a sea file.',
      START,
    );
  }
  const placeAt = (offset: number): Place => {
    const { line, col } = lines.linePos(offset);
    return line > 0 ? { line, column: col } : START;
  };
  const syntax = [...document.errors, ...document.warnings].map(
    (error): InputProblem => ({
      path: '',
      ...placeAt(error.pos[0]),
      expected: 'YAML 1.2 or JSON',
      found: `a fault in the text (${shortened(error.message)})`,
      remedy: 'Correct the text here; texts with special characters need quotes.',
    }),
  );
  if (document.directives?.yaml.explicit && document.directives.yaml.version !== '1.2') {
    syntax.push(
      problem([], START, 'YAML 1.2', `YAML ${document.directives.yaml.version}`, 'Remove the %YAML line.'),
    );
  }
  if (syntax.length > 0) return { value: undefined, problems: syntax, place: () => START };

  const problems = structureProblems(document.contents, placeAt);
  if (problems.length > 0) return { value: undefined, problems, place: () => START };
  let value: unknown;
  try {
    value = document.toJS({ maxAliasCount: MOST_ALIASES });
  } catch (error) {
    // ReferenceError: too many aliases, or one without its anchor; TypeError: one inside its own anchor.
    if (!(error instanceof ReferenceError || error instanceof TypeError)) throw error;
    const found = `aliases that cannot be followed (${shortened(error.message)})`;
    return unreadable(
      `at most ${MOST_ALIASES} aliases, each of an anchor above it`,
      found,
      'Write the values out.',
      START,
    );
  }
  return { value, problems, place: (path, atKey) => placeOf(document, path, atKey, placeAt) };
}

function unreadable(expected: string, found: string, remedy: string, at: Place): YamlDocument {
  return { value: undefined, problems: [problem([], at, expected, found, remedy)], place: () => at };
}

function problem(
  path: DocumentPath,
  at: Place,
  expected: string,
  found: string,
  remedy: string,
): InputProblem {
  return { path: pathText(path), line: at.line, column: at.column, expected, found, remedy };
}

/** Duplicate, prototype and non-text keys, and nesting too deep to follow. */
function structureProblems(contents: Node | null, placeAt: (offset: number) => Place): InputProblem[] {
  const problems: InputProblem[] = [];
  const visit = (node: unknown, path: DocumentPath): void => {
    if (path.length > DEEPEST_NESTING) {
      const at = placeAt(startOf(node));
      problems.push(
        problem([], at, `at most ${DEEPEST_NESTING} levels of nesting`, 'more', 'Flatten the text.'),
      );
    } else if (isSeq(node)) {
      node.items.forEach((item, i) => {
        visit(item, [...path, i]);
      });
    } else if (isMap(node)) {
      const seen = new Set<string>();
      for (const { key, value } of node.items) {
        const at = placeAt(startOf(key));
        if (!isScalar(key) || typeof key.value !== 'string') {
          problems.push(problem(path, at, 'a text as key', 'another kind of key', 'Write `key: value`.'));
          continue;
        }
        const keyPath = [...path, shortened(key.value)];
        const shown = `\`${shortened(key.value)}\``;
        if (PROTOTYPE_KEYS.has(key.value)) {
          problems.push(problem(keyPath, at, 'a key of the sea file', `the key ${shown}`, 'Remove it.'));
        } else if (seen.has(key.value)) {
          problems.push(problem(keyPath, at, 'each key once', `${shown} again`, 'Remove one of the two.'));
        }
        seen.add(key.value);
        visit(value, keyPath);
      }
    }
  };
  visit(contents, []);
  return problems;
}

function startOf(node: unknown): number {
  return (node as Node | null)?.range?.[0] ?? 0;
}

function placeOf(
  document: Document.Parsed,
  path: DocumentPath,
  atKey: boolean,
  placeAt: (offset: number) => Place,
): Place {
  let node: unknown = document.contents;
  let place = node === null ? START : placeAt(startOf(node));
  for (const [depth, step] of path.entries()) {
    // An alias is shown where it is used; what it stands for is searched further.
    const target: unknown = isAlias(node) ? node.resolve(document) : node;
    if (isSeq(target) && typeof step === 'number') {
      node = target.items[step];
    } else if (isMap(target)) {
      const pair = pairOf(target, step);
      const last = depth === path.length - 1;
      // An empty value has no place of its own worth pointing at: its key is where to type.
      const isEmpty = isScalar(pair?.value) && pair.value.value === null;
      node = pair && ((atKey && last) || isEmpty || pair.value === null) ? pair.key : pair?.value;
    } else {
      node = undefined;
    }
    if (!node) return place;
    place = placeAt(startOf(node));
  }
  return place;
}

/** Pairs by key, so that a file of nothing but wrong keys is looked up in a time that grows with its size. */
const PAIRS = new WeakMap<YAMLMap, Map<unknown, Pair>>();

function pairOf(map: YAMLMap, step: string | number): Pair | undefined {
  let pairs = PAIRS.get(map);
  if (pairs === undefined) {
    pairs = new Map(map.items.map((pair) => [isScalar(pair.key) ? pair.key.value : undefined, pair]));
    PAIRS.set(map, pairs);
  }
  return pairs.get(step);
}
