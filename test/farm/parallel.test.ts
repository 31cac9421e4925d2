import { execFileSync, spawnSync } from 'node:child_process';
import { mkdirSync, readFileSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { expect, it, vi } from 'vitest';
import { fileHashes, inTemporaryFolder } from '../support/bakes.ts';
import { runProgram, seaFile } from '../support/built.ts';

vi.setConfig({ testTimeout: 120_000 });

const missing = spawnSync('sh', ['-c', 'command -v parallel']).status !== 0;

it.skipIf(missing && process.env.CI !== 'true')(
  'a bake by GNU parallel is the same to the byte, also after a shard failed',
  async () => {
    await inTemporaryFolder(async (outer) => {
      const sea = seaFile(outer);
      const whole = join(outer, 'whole');
      expect((await runProgram(['bake', sea, '-o', whole])).status).toBe(0);

      const folder = join(outer, 'a bake');
      const written = await runProgram([
        'farm',
        'template',
        'parallel',
        sea,
        '-o',
        folder,
        '--tasks',
        '5',
        '--cpus',
        '1',
        '--max-running',
        '2',
      ]);
      expect(written.stdout).toBe(`${folder}-farm/parallel.sh\n`);
      const script = written.stdout.trim();

      mkdirSync(join(folder, 'c0/normal.0005.png/x'), { recursive: true });
      const failed = spawnSync(script, { encoding: 'utf8' });
      expect(failed.status).not.toBe(0);
      expect(failed.stderr).toMatch(/c0 frame 5: Cannot write/);
      rmSync(join(folder, 'c0/normal.0005.png'), { recursive: true });

      execFileSync(script, { stdio: 'pipe' });
      expect(fileHashes(folder)).toEqual(fileHashes(whole));
      const log = readFileSync(`${folder}-farm/shards.log`, 'utf8').trimEnd().split('\n').slice(1);
      expect(log.some((line) => /\t73\t0\t/.test(line))).toBe(true);
    });
  },
);
