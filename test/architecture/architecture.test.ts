import { readdirSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { breaches, DOOR_PACKAGES, type SourceTree } from './rules.ts';

const SRC = fileURLToPath(new URL('../../src/', import.meta.url));

const TREE: SourceTree = new Map(
  readdirSync(SRC, { recursive: true, encoding: 'utf8' })
    .map((path) => path.replaceAll('\\', '/'))
    // AssemblyScript ends in .ts too, but is another language with rules of its own.
    .filter((path) => path.endsWith('.ts') && !path.includes('/assembly/'))
    .map((path) => [path, readFileSync(SRC + path, 'utf8')]),
);

describe('src', () => {
  it('keeps the import table, one door a package, and the words and names of the house', () => {
    expect(TREE.size).toBeGreaterThan(100);
    expect(breaches(TREE)).toEqual([]);
  });

  it('has a door for every package it depends on, and depends on no other', () => {
    const manifest = readFileSync(new URL('../../package.json', import.meta.url), 'utf8');
    const { dependencies } = JSON.parse(manifest) as { dependencies: Record<string, string> };
    expect([...DOOR_PACKAGES].sort()).toEqual(Object.keys(dependencies).sort());
  });
});

describe('the rules', () => {
  const CLEAN: readonly (readonly [string, string])[] = [
    ['errors.ts', 'export class LoopswellError extends Error {}\n'],
    ['math/root.ts', 'export const root = 1;\n'],
    ['waves/lattice.ts', "import { root } from '../math/root.ts';\nexport const lattice = root;\n"],
    ['store/file.ts', "import { readFileSync } from 'node:fs';\nexport const read = readFileSync;\n"],
    [
      'index.ts',
      "export { lattice } from './waves/lattice.ts';\nexport { LoopswellError } from './errors.ts';\n",
    ],
    [
      'cli/main.ts',
      "import { lattice } from '../index.ts';\nimport { LoopswellError } from '../errors.ts';\n",
    ],
  ];

  /** The breaches of the clean tree with one file added or replaced. */
  const spoiledBy = (path: string, text: string): string[] => breaches(new Map([...CLEAN, [path, text]]));

  it('find nothing in a clean tree', () => {
    expect(breaches(new Map(CLEAN))).toEqual([]);
  });

  it.each([
    [
      'an import against the table',
      'math/a.ts',
      "\nimport { lattice } from '../waves/lattice.ts';\n",
      'src/math/a.ts:2 imports waves/lattice.ts: math may not import waves',
    ],
    [
      'a type import',
      'math/a.ts',
      "import type { L } from '../waves/lattice.ts';\n",
      'src/math/a.ts:1 imports waves/lattice.ts: math may not import waves',
    ],
    [
      'a type import in a type',
      'math/a.ts',
      "export type L = import('../waves/lattice.ts').L;\n",
      'src/math/a.ts:1 imports waves/lattice.ts: math may not import waves',
    ],
    [
      'an import over several lines',
      'math/a.ts',
      "import {\n  a,\n  type B,\n} from '../waves/lattice.ts';\n",
      'src/math/a.ts:1 imports waves/lattice.ts: math may not import waves',
    ],
    [
      'a re-export',
      'math/a.ts',
      "export { lattice } from '../waves/lattice.ts';\n",
      'src/math/a.ts:1 imports waves/lattice.ts: math may not import waves',
    ],
    [
      'a side effect',
      'math/a.ts',
      "import '../waves/lattice.ts';\n",
      'src/math/a.ts:1 imports waves/lattice.ts: math may not import waves',
    ],
    [
      'a dynamic import',
      'math/a.ts',
      "const a = 1;\nawait import('../waves/lattice.ts');\n",
      'src/math/a.ts:2 imports waves/lattice.ts: math may not import waves',
    ],
    ['a computed import', 'math/a.ts', 'await import(name);\n', 'src/math/a.ts:1 imports a computed name'],
    [
      'an import inside a template',
      'math/a.ts',
      "const a = `\x24{await import('../waves/lattice.ts')}`;\n",
      'src/math/a.ts:1 imports waves/lattice.ts: math may not import waves',
    ],
    [
      'a private module in the command line',
      'cli/a.ts',
      "import { lattice } from '../waves/lattice.ts';\n",
      'src/cli/a.ts:1 imports waves/lattice.ts: cli may not import waves',
    ],
    [
      'a private name in the command line',
      'cli/a.ts',
      "import { secret as s } from '../errors.ts';\n",
      'src/cli/a.ts:1 takes secret from errors.ts, which index.ts does not export',
    ],
    [
      'a file that is not there',
      'math/a.ts',
      "import { b } from './b.ts';\n",
      'src/math/a.ts:1 imports ./b.ts, which is no source file',
    ],
    [
      'an import without its extension',
      'waves/a.ts',
      "import { root } from '../math/root';\n",
      'src/waves/a.ts:1 imports ../math/root, which is no source file',
    ],
    [
      'a package outside its door',
      'math/a.ts',
      "import FFT from 'fft.js';\n",
      'src/math/a.ts:1 imports fft.js, whose door is field/float64-engine.ts, verify/',
    ],
    [
      'a module of Node outside its door',
      'math/a.ts',
      "import { readFileSync } from 'node:fs';\n",
      'src/math/a.ts:1 imports node:fs, whose door is store/, sea/load.ts, kernel/kernel-binary.ts',
    ],
    [
      'a package without a door',
      'math/a.ts',
      "import leftPad from 'left-pad';\n",
      'src/math/a.ts:1 imports left-pad, which has no door',
    ],
    [
      'a module of Node by its old name',
      'store/a.ts',
      "import fs from 'fs';\n",
      'src/store/a.ts:1 imports fs, which has no door',
    ],
    ['randomness', 'math/a.ts', 'export const a = Math.random();\n', 'src/math/a.ts:1 says Math.random'],
    ['a clock', 'math/a.ts', 'export const a = Date.now();\n', 'src/math/a.ts:1 says Date'],
    ['a stopwatch', 'bake/a.ts', 'export const a = performance.now();\n', 'src/bake/a.ts:1 says performance'],
    ['the environment', 'math/a.ts', 'export const a = process.env.HOME;\n', 'src/math/a.ts:1 says process'],
    ['the console', 'math/a.ts', "// Why.\nconsole.log('a');\n", 'src/math/a.ts:2 says console'],
    ['a default export', 'math/a.ts', 'export default 1;\n', 'src/math/a.ts:1 says export default'],
    ['a star export', 'math/a.ts', "export * from './root.ts';\n", 'src/math/a.ts:1 says export *'],
    ['an enum', 'math/a.ts', 'export const enum A {\n  B,\n}\n', 'src/math/a.ts:1 says enum'],
    [
      'a name that says nothing',
      'math/root-utils.ts',
      '',
      'src/math/root-utils.ts:1 has a name that says nothing',
    ],
    [
      'a folder that says nothing',
      'math/common/a.ts',
      '',
      'src/math/common/a.ts:1 has a name that says nothing',
    ],
    ['a name in camelCase', 'math/fooBar.ts', '', 'src/math/fooBar.ts:1 is not in kebab-case'],
    [
      'a folder without a row',
      'extras/a.ts',
      '',
      'src/extras/a.ts:1 is in a folder without a row in the import table',
    ],
    ['a long file', 'math/a.ts', 'a;\n'.repeat(301), 'src/math/a.ts:301 is longer than 300 lines'],
  ])('find %s', (_what, path, text, breach) => {
    expect(spoiledBy(path, text)).toEqual([breach]);
  });

  it.each([
    ['comments', "// import { a } from '../waves/lattice.ts'; console, Date\n/* Math.random() */\n"],
    ['strings', "export const a = 'export default', b = \"import('x')\", c = 'it\\'s console';\n"],
    ['templates', 'export const a = `console \x24{`Date \x24{1} Date`} process`;\n'],
    ['regular expressions', "export const a = /['\"]console[/'\"]/.test('x') ? 4 / 2 : 1;\n"],
    ['words that hold others', 'export const processed = 1, consoles = 2, enumerate = 3, updateDates = 4;\n'],
    ['what is called from', "export const a = Array.from('abc'), b = { from: 'user' };\n"],
  ])('are not misled by %s', (_what, text) => {
    expect(spoiledBy('math/a.ts', text)).toEqual([]);
  });

  it('see code behind strings, templates and regular expressions', () => {
    const before = "const a = '\\\\', b = `\x24{'}'}`, c = /[/]'/, d = \"//\";";
    expect(spoiledBy('math/a.ts', `${before} console.log(a);\n`)).toEqual(['src/math/a.ts:1 says console']);
  });
});
