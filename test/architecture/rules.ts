import { posix } from 'node:path';
import { type Import, importsOf } from './imports.ts';
import { lineOf, type SourceText, sourceText } from './source-text.ts';

/** Source files by their path below `src`, e.g. `math/root.ts`. */
export type SourceTree = ReadonlyMap<string, string>;

/**
 * Who may import whom. A folder imports itself and what its row names; a file at the top has a row of its own. The sea
 * arm (spectrum, waves, sea, plan, field, maps) knows no file format, the image arm (image, codec, store) no sea; they
 * meet in `bake`. `verify` checks files by another route than the one that made them.
 */
const ROWS: Readonly<Record<string, readonly string[]>> = {
  'errors.ts': [],
  'version.ts': [],
  'hash.ts': [],
  math: [],
  // Hot loops and what writes them; of its own compiler's language only the result is imported.
  kernel: [],
  physics: ['math'],
  spectrum: ['physics', 'math'],
  waves: ['spectrum', 'physics', 'math'],
  image: ['math'],
  sea: ['spectrum', 'physics', 'math', 'errors.ts'],
  plan: ['sea', 'waves', 'spectrum', 'physics', 'math', 'image', 'errors.ts', 'hash.ts', 'version.ts'],
  field: ['waves', 'physics', 'math', 'kernel'],
  maps: ['field', 'plan', 'sea', 'image', 'math', 'kernel', 'errors.ts'],
  codec: ['image', 'math', 'kernel', 'errors.ts'],
  store: ['errors.ts', 'hash.ts'],
  manifest: ['sea', 'plan', 'spectrum', 'image', 'errors.ts'],
  // Text for schedulers: it starts nothing and writes nothing.
  farm: ['plan', 'errors.ts', 'version.ts'],
  bake: [
    'farm',
    'manifest',
    'store',
    'codec',
    'maps',
    'kernel',
    'field',
    'plan',
    'sea',
    'waves',
    'image',
    'physics',
    'math',
    'errors.ts',
    'hash.ts',
    'version.ts',
  ],
  verify: [
    'manifest',
    'sea',
    'plan',
    'waves',
    'spectrum',
    'physics',
    'image',
    'codec',
    'store',
    'math',
    'errors.ts',
    'hash.ts',
    'version.ts',
  ],
  report: ['verify', 'manifest', 'image', 'codec', 'store', 'math', 'errors.ts', 'version.ts'],
  'index.ts': [
    'farm',
    'report',
    'verify',
    'bake',
    'manifest',
    'store',
    'plan',
    'sea',
    'waves',
    'spectrum',
    'physics',
    'image',
    'errors.ts',
    'version.ts',
  ],
  // The errors and the version are leaves, so that help need not load the library; the names it takes from them must
  // be public (see `privateNames`).
  cli: ['index.ts', 'errors.ts', 'version.ts'],
};

/** The only files that may import a package or a module of Node: folders end in a slash. */
const DOORS: Readonly<Record<string, readonly string[]>> = {
  'fft.js': ['field/float64-engine.ts', 'verify/'],
  'fast-png': ['codec/'],
  sharp: ['report/'],
  'p-limit': ['bake/'],
  commander: ['cli/'],
  picocolors: ['cli/'],
  'cli-progress': ['cli/'],
  yaml: ['sea/'],
  zod: ['sea/', 'manifest/'],
  'node:fs': ['store/', 'sea/load.ts', 'kernel/kernel-binary.ts'],
  'node:path': ['store/', 'sea/load.ts', 'bake/', 'verify/', 'report/', 'cli/'],
  'node:worker_threads': ['bake/thread-executor.ts', 'bake/worker.ts'],
  'node:zlib': ['codec/'],
  'node:crypto': ['hash.ts'],
  'node:child_process': ['cli/'],
  'node:os': ['store/', 'bake/machine.ts'],
};

/** What code may not say, but where. Declarations of other people's packages (`.d.ts`) are exempt. */
const WORDS: readonly {
  readonly word: RegExp;
  readonly name: string;
  readonly allowed: readonly string[];
}[] = [
  { word: /\bMath\s*\.\s*random\b/g, name: 'Math.random', allowed: [] },
  { word: /\bconsole\b/g, name: 'console', allowed: ['cli/'] },
  { word: /\bDate\b/g, name: 'Date', allowed: ['cli/', 'bake/clock.ts'] },
  { word: /\bperformance\b/g, name: 'performance', allowed: ['cli/', 'bake/clock.ts'] },
  // Beside the command line: who wrote a temporary or a journal, and what runtime this is.
  { word: /\bprocess\b/g, name: 'process', allowed: ['cli/', 'store/', 'bake/machine.ts', 'bake/bake.ts'] },
  { word: /(?<!\.\s*)\bcrypto\b/g, name: 'crypto', allowed: ['store/', 'bake/bake.ts'] },
  { word: /\bexport\s+default\b/g, name: 'export default', allowed: [] },
  { word: /\bexport\s*\*/g, name: 'export *', allowed: [] },
  { word: /\benum\s+\w+\s*\{/g, name: 'enum', allowed: [] },
  { word: /\beval\s*\(|\bnew\s+Function\b/g, name: 'eval', allowed: [] },
];

const FORBIDDEN_NAME = /(?:^|[/-])(?:utils?|helpers?|common|misc|shared)(?:[./-]|$)/;
const KEBAB_CASE = /^(?:[a-z0-9]+(?:-[a-z0-9]+)*\/)*[a-z0-9]+(?:-[a-z0-9]+)*(?:\.d)?\.ts$/;
const MOST_LINES = 300;

/** All breaches of the rules in a tree, as `src/<file>:<line> <what>`. */
export function breaches(tree: SourceTree): string[] {
  return [...tree].flatMap(([path, whole]) => {
    const source = sourceText(whole);
    return [
      ...nameBreaches(path, whole),
      ...importsOf(source).flatMap((statement) => importBreach(path, statement, tree) ?? []),
      ...(path.endsWith('.d.ts') ? [] : wordBreaches(path, source)),
      ...(path.startsWith('cli/') ? privateNames(path, source, tree) : []),
    ];
  });
}

function nameBreaches(path: string, whole: string): string[] {
  const lines = lineOf(whole.trimEnd(), Number.POSITIVE_INFINITY);
  return [
    ...(FORBIDDEN_NAME.test(path) ? [`src/${path}:1 has a name that says nothing`] : []),
    ...(KEBAB_CASE.test(path) ? [] : [`src/${path}:1 is not in kebab-case`]),
    ...(lines > MOST_LINES ? [`src/${path}:${lines} is longer than ${MOST_LINES} lines`] : []),
    ...(rowOf(path) in ROWS ? [] : [`src/${path}:1 is in a folder without a row in the import table`]),
  ];
}

function importBreach(path: string, { specifier, line }: Import, tree: SourceTree): string | null {
  const place = `src/${path}:${line}`;
  if (specifier === null) return `${place} imports a computed name`;
  if (!specifier.startsWith('.')) {
    const door = DOORS[specifier];
    if (door === undefined) return `${place} imports ${specifier}, which has no door`;
    return isWithin(path, door) ? null : `${place} imports ${specifier}, whose door is ${door.join(', ')}`;
  }
  const target = posix.join(posix.dirname(path), specifier);
  if (!tree.has(target)) return `${place} imports ${specifier}, which is no source file`;
  const [from, to] = [rowOf(path), rowOf(target)];
  if (from === to || (ROWS[from] ?? []).includes(to)) return null;
  return `${place} imports ${target}: ${from} may not import ${to}`;
}

/** The row of the import table that a file belongs to: its folder, or itself at the top. */
function rowOf(path: string): string {
  return path.split('/')[0];
}

function isWithin(path: string, places: readonly string[]): boolean {
  return places.some((place) => (place.endsWith('/') ? path.startsWith(place) : path === place));
}

function wordBreaches(path: string, { code }: SourceText): string[] {
  return WORDS.flatMap(({ word, name, allowed }) => {
    if (isWithin(path, allowed)) return [];
    return [...code.matchAll(word)].map(({ index }) => `src/${path}:${lineOf(code, index)} says ${name}`);
  });
}

/** Names that the command line takes from another module than `index.ts` though they are not public. */
function privateNames(path: string, source: SourceText, tree: SourceTree): string[] {
  const exported = importsOf(sourceText(tree.get('index.ts') ?? ''));
  return importsOf(source).flatMap(({ specifier, line, names }) => {
    if (specifier === null || !specifier.startsWith('.')) return [];
    const target = posix.join(posix.dirname(path), specifier);
    if (target.startsWith('cli/') || target === 'index.ts') return [];
    const isPublic = new Set(exported.flatMap((own) => (own.specifier === `./${target}` ? own.names : [])));
    return names
      .filter((name) => !isPublic.has(name))
      .map((name) => `src/${path}:${line} takes ${name} from ${target}, which index.ts does not export`);
  });
}

/** Packages that have a door, for comparison with those that are installed. */
export const DOOR_PACKAGES: readonly string[] = Object.keys(DOORS).filter(
  (name) => !name.startsWith('node:'),
);
