// Compiles the kernels: `node src/kernel/build.mjs`, after tsc. Each kernel is a folder <name>/assembly of
// AssemblyScript with an index.ts, compiled to dist/kernel/<name>.wasm. Modules that a program writes (stages of the
// transform, shared offsets) are handed to the compiler without becoming files.
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { basename } from 'node:path';
import { fileURLToPath } from 'node:url';
import asc from 'assemblyscript/asc';

const SRC = fileURLToPath(new URL('.', import.meta.url));
const DIST = fileURLToPath(new URL('../../dist/kernel/', import.meta.url));

/** What each kernel's generated modules are called, and their text. */
const KERNELS = {
  wave: async () => {
    const { writtenModules } = await import('../../dist/kernel/wave/written-modules.js');
    return writtenModules();
  },
  code: async () => ({}),
};

// No relaxed SIMD: its results differ between processors.
const OPTIONS = ['-O3', '--noAssert', '--runtime', 'stub', '--importMemory', '--enable', 'simd'];

mkdirSync(DIST, { recursive: true });
for (const [name, writtenModules] of Object.entries(KERNELS)) {
  const entry = `${SRC}${name}/assembly/index.ts`;
  if (!existsSync(entry)) continue;
  await compile(name, entry, await writtenModules());
}

async function compile(name, entry, written) {
  const readFile = (file) => {
    const text = written[basename(file, '.ts')];
    if (text !== undefined) return text;
    return existsSync(file) ? readFileSync(file, 'utf8') : null;
  };
  const files = new Map();
  const { error, stderr } = await asc.main([entry, '--outFile', `${name}.wasm`, ...OPTIONS], {
    readFile,
    writeFile: (file, contents) => void files.set(file, contents),
    listFiles: () => [],
  });
  if (error) {
    console.error(stderr.toString());
    process.exit(1);
  }
  writeFileSync(`${DIST}${name}.wasm`, files.get(`${name}.wasm`));
}
