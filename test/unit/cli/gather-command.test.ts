import { existsSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { EXIT_STATUS } from '../../../src/errors.ts';
import { fileHashes } from '../../support/bakes.ts';
import { TINY_SEA_YAML } from '../../support/tiny-seas.ts';
import { capturedIo, inNewFolder, outcomeOf } from './captured-io.ts';

const THREADS = ['--threads', '0'];

/** Calls back with a sea file and a folder to bake it into. */
function onBench(use: (sea: string, folder: string) => Promise<void>): Promise<void> {
  return inNewFolder(async (outer) => {
    const sea = join(outer, 'tiny.yaml');
    writeFileSync(sea, TINY_SEA_YAML);
    await use(sea, join(outer, 'baked'));
  });
}

describe('shards and gather', () => {
  it('make what bake makes', async () => {
    await onBench(async (sea, folder) => {
      await outcomeOf(['bake', sea, '-o', `${folder}-whole`, ...THREADS]);
      const shard = await outcomeOf(['bake', sea, '-o', folder, '--shard', '2/2', ...THREADS]);
      expect(shard.status, shard.stderr).toBe(EXIT_STATUS.done);
      expect(shard.stdout).toContain('(some frames only: no foam, no manifest yet)');
      const env = { JOB_COMPLETION_INDEX: '0' };
      await outcomeOf(['bake', sea, '-o', folder, '--shard', 'auto/2', ...THREADS], capturedIo({ env }));
      const part = await outcomeOf(['gather', folder, '--part', '1/2', ...THREADS]);
      expect(part.stdout).toContain('a part of the foam');
      const gathered = await outcomeOf(['gather', folder, '--sync', 'every-file', ...THREADS]);
      expect(gathered.status).toBe(EXIT_STATUS.done);
      expect(gathered.stdout).toContain('Tiny wind sea');
      expect(fileHashes(folder)).toEqual(fileHashes(`${folder}-whole`));
      const again = await outcomeOf(['gather', folder, '--json', ...THREADS]);
      expect(JSON.parse(again.stdout)).toMatchObject({ folder, run: { bytesWritten: 0 } });
    });
  });

  it('name what is missing with 65, and the command that is named makes it', async () => {
    await onBench(async (sea, folder) => {
      await outcomeOf(['bake', sea, '-o', folder, '--shard', '1/1', ...THREADS]);
      rmSync(join(folder, 'c0/normal.0003.png'));
      const { status, stderr, stdout } = await outcomeOf(['gather', folder, ...THREADS]);
      expect(status).toBe(EXIT_STATUS.badInput);
      expect(stdout).toBe('');
      const command = /Make them: loopswell (.+)$/m.exec(stderr)?.[1].split(' ') ?? [];
      expect(command.slice(0, 2)).toEqual(['bake', `${folder}/.loopswell/plan.json`]);
      expect((await outcomeOf([...command, ...THREADS])).stdout).toContain('1 frame made');
      expect((await outcomeOf(['gather', folder, '-q', ...THREADS])).stdout).toBe('');
      expect(existsSync(join(folder, 'manifest.json'))).toBe(true);
    });
  });

  it('refuse with 64 what is no shard or part', async () => {
    await onBench(async (sea, folder) => {
      for (const args of [
        ['bake', sea, '-o', folder, '--shard', '3/2'],
        ['bake', sea, '-o', folder, '--shard', 'auto'],
        ['gather', folder, '--part', '0/2'],
        ['gather', folder, '--sync', 'never'],
        ['gather'],
      ]) {
        expect((await outcomeOf(args)).status, args.join(' ')).toBe(EXIT_STATUS.usage);
      }
      expect((await outcomeOf(['gather', folder])).status).toBe(EXIT_STATUS.badInput);
      expect(existsSync(folder)).toBe(false);
    });
  });
});
