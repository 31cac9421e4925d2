import { spawnSync } from 'node:child_process';
import { readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { inTemporaryFolder } from '../support/bakes.ts';
import { PROGRAM, runProgram, seaFile, startCommand } from '../support/built.ts';

const DIST = join(PROGRAM, '../..');

describe('the package', () => {
  it('runs nothing when it is installed', () => {
    const { scripts } = JSON.parse(readFileSync(join(DIST, '../package.json'), 'utf8'));
    const atInstall = [
      'preinstall',
      'install',
      'postinstall',
      'prepublish',
      'preprepare',
      'prepare',
      'postprepare',
    ];
    expect(Object.keys(scripts).filter((name) => atInstall.includes(name))).toEqual([]);
  });

  it('has no part that could reach a network', () => {
    const modules = /['"](?:node:)?(?:net|http|https|http2|tls|dgram|dns|dns\/promises|inspector)['"]/;
    const calls = /\b(?:globalThis\.)?(?:fetch|WebSocket|EventSource|XMLHttpRequest)\s*\(\s*['"`]/;
    const files = (readdirSync(DIST, { recursive: true }) as string[]).filter((path) => path.endsWith('.js'));
    expect(files.length).toBeGreaterThan(150);
    for (const path of files) {
      const text = readFileSync(join(DIST, path), 'utf8');
      expect(modules.test(text) || calls.test(text), path).toBe(false);
    }
  });

  // A process of which the system has taken the network away.
  const unshare = spawnSync('unshare', ['--net', 'true']).status === 0;
  it.skipIf(!unshare && process.env.CI !== 'true')('bakes where there is no network', async () => {
    await inTemporaryFolder(async (folder) => {
      const args = ['--net', process.execPath, PROGRAM, 'bake', seaFile(folder), '-o', join(folder, 'bake')];
      const { status, stderr } = await startCommand('unshare', args).ended;
      expect(status, stderr).toBe(0);
    });
  });
});

describe('--sync', () => {
  /** How often a bake waits for the disk, in all its threads. */
  async function waits(policy: string): Promise<number> {
    return inTemporaryFolder(async (folder) => {
      const [script, counter] = [join(folder, 'count.cjs'), join(folder, 'count')];
      writeFileSync(counter, '');
      writeFileSync(
        script,
        `const fs = require('node:fs');
const sync = fs.fsyncSync;
fs.fsyncSync = (file) => { fs.appendFileSync(${JSON.stringify(counter)}, '.'); sync(file); };
require('node:module').syncBuiltinESMExports();
`,
      );
      const { status, stderr } = await runProgram(
        ['bake', seaFile(folder), '-o', join(folder, 'bake'), '--sync', policy, '--no-verify'],
        { env: { ...process.env, NODE_OPTIONS: `--require ${script}` } },
      );
      expect(status, stderr).toBe(0);
      return readFileSync(counter, 'utf8').length;
    });
  }

  it('manifest waits for the manifest, its folder and the journal', async () => {
    expect(await waits('manifest')).toBe(3);
  });

  it('every-file waits for every file and its folder as well', async () => {
    // 36 frames of two maps and the codes of J, and 36 of foam.
    expect(await waits('every-file')).toBe(3 + 2 * (36 * 3 + 36));
  });
});
