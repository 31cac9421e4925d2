import { lineOf, type SourceText } from './source-text.ts';

/** One import or re-export, of any form. */
export interface Import {
  /** As written; null where it is computed and cannot be judged. */
  readonly specifier: string | null;
  readonly line: number;
  /** Names taken from the module, as it calls them; empty for side effects, whole modules and dynamic imports. */
  readonly names: readonly string[];
}

/** `... from '`, with what stands between the keyword and it. */
const FROM = /\b(?:import|export)\b([^'"`;]*?)\bfrom\s*['"]/g;
/** `import '`. */
const SIDE_EFFECT = /\bimport\s*['"]/g;
/** `import(` and `require(`, of a string or of anything else. */
const DYNAMIC = /\b(?:import|require)\s*\(\s*(['"])?/g;

/** Every import statement, dynamic import, type import and re-export of a source file, in its order. */
export function importsOf({ whole, code }: SourceText): Import[] {
  const found: { index: number; specifier: string | null; names: readonly string[] }[] = [];
  const specifierAt = (start: number): string =>
    whole.slice(start, start + whole.slice(start).search(/['"]/));
  for (const match of code.matchAll(FROM)) {
    const names = namesIn(match[1]);
    found.push({ index: match.index, specifier: specifierAt(match.index + match[0].length), names });
  }
  for (const match of code.matchAll(SIDE_EFFECT)) {
    found.push({ index: match.index, specifier: specifierAt(match.index + match[0].length), names: [] });
  }
  for (const match of code.matchAll(DYNAMIC)) {
    const specifier = match[1] === undefined ? null : specifierAt(match.index + match[0].length);
    found.push({ index: match.index, specifier, names: [] });
  }
  return found
    .sort((a, b) => a.index - b.index)
    .map(({ index, specifier, names }) => ({ specifier, names, line: lineOf(code, index) }));
}

/** The names between braces, without `type` and without what they are renamed to. */
function namesIn(clause: string): string[] {
  const braces = /\{([^}]*)\}/.exec(clause);
  if (braces === null) return [];
  return braces[1]
    .split(',')
    .map(
      (name) =>
        name
          .trim()
          .replace(/^type\s+/, '')
          .split(/\s+as\s+/)[0],
    )
    .filter((name) => name !== '');
}
