// Installs and builds, each only if needed: what `npm run demo` and `npm test` begin with on a fresh clone.
import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { dirname, join, relative } from 'node:path';
import { fileURLToPath } from 'node:url';

const root = fileURLToPath(new URL('..', import.meta.url));
const [major, minor] = process.versions.node.split('.').map(Number);
if (major < 20 || (major === 20 && minor < 19)) {
  console.error(`loopswell needs Node 20.19 or newer; this is ${process.version}.`);
  process.exit(69);
}

// Stamps hold the hash of what a step was made from, so that touching a file or switching branches is noticed.
step(
  'node_modules/.loopswell-installed',
  ['package.json', 'package-lock.json'],
  'npm ci --loglevel=error --no-audit --no-fund',
);
step('dist/.loopswell-built', ['src', 'tsconfig.json', 'package-lock.json'], 'npm run --silent build', () =>
  rmSync(join(root, 'dist'), { recursive: true, force: true }),
);

function step(stamp, inputs, command, prepare = () => {}) {
  const wanted = hashOf(inputs);
  const path = join(root, stamp);
  if (existsSync(path) && readFileSync(path, 'utf8') === wanted) return;
  console.error(`> ${command}`);
  prepare();
  const { status } = spawnSync(command, { cwd: root, shell: true, stdio: ['ignore', 2, 2] });
  if (status !== 0) process.exit(status ?? 70);
  mkdirSync(dirname(path), { recursive: true });
  writeFileSync(path, wanted);
}

function hashOf(inputs) {
  const hash = createHash('sha256');
  for (const file of inputs.flatMap(filesOf)) hash.update(file).update(readFileSync(join(root, file)));
  return hash.digest('hex');
}

function filesOf(path) {
  const absolute = join(root, path);
  if (!existsSync(absolute)) return [];
  if (statSync(absolute).isFile()) return [path];
  return readdirSync(absolute, { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile())
    .map((entry) => relative(root, join(entry.parentPath, entry.name)))
    .sort();
}
