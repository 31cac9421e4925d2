import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { fileHashes, inTemporaryFolder } from '../support/bakes.ts';
import { runProgram, seaFile } from '../support/built.ts';
import { type Cluster, eventually, missingForSlurm, startCluster } from '../support/slurm.ts';

// A real Slurm, started by the test itself: three nodes on this machine. Its scripts are those that ship.

vi.setConfig({ testTimeout: 240_000, hookTimeout: 120_000 });

const missing = missingForSlurm();
const skipped = missing.length > 0 && process.env.CI !== 'true';

describe.skipIf(skipped)(`a bake on Slurm${skipped ? ` (missing here: ${missing.join(', ')})` : ''}`, () => {
  let cluster: Cluster;
  let whole: Readonly<Record<string, string>>;

  beforeAll(async () => {
    cluster = await startCluster();
    whole = await inTemporaryFolder(async (folder) => {
      const { status, stderr } = await runProgram(['bake', seaFile(folder), '-o', join(folder, 'bake')]);
      expect(status, stderr).toBe(0);
      return fileHashes(join(folder, 'bake'));
    });
  });
  afterAll(() => cluster?.stop());

  it('is the same to the byte as a local one', async () => {
    await onFarm(async ({ submit, finished, logs }) => {
      const { frames, gather } = await submit(['--tasks', '4']);
      expect(frames).toMatch(/^\d+$/);
      expect(gather).toMatch(/^\d+$/);
      await finished();
      expect(logs().filter((name) => name.startsWith('frames-')).length).toBe(4);
    });
  });

  it.each([false, true])(
    'survives pre-emption by a higher partition; RequeueExit is set: %s',
    async (set) => {
      await cluster.setRequeueExit(set);
      await onFarm(async ({ submit, made, finished, log }) => {
        const { frames } = await submit(['--tasks', '3'], SLOWLY);
        await eventually('frames', () => made() >= 4);
        const urgent = cluster.run(
          'sbatch',
          '--parsable',
          '--partition=urgent',
          '--nodes=3',
          '--output=/dev/null',
          '--wrap=sleep 3',
        );
        await eventually('the urgent job', () => stateOf(urgent) !== 'PENDING');
        await finished();
        // All three nodes were taken from it.
        const stopped = log('frames-').match(/SIGTERM: stopping after the frames in flight/g) ?? [];
        expect(stopped.length).toBeGreaterThanOrEqual(1);
        expect(restartsOf(frames)).toBeGreaterThanOrEqual(1);
      });
    },
  );

  it.each([false, true])(
    'goes back into the queue when its task is told to end; RequeueExit is set: %s',
    async (set) => {
      await cluster.setRequeueExit(set);
      await onFarm(async ({ submit, made, finished, log }) => {
        const { frames } = await submit(['--tasks', '3', '--max-running', '2'], SLOWLY);
        await eventually('frames', () => made() >= 4);
        cluster.run('scancel', '--batch', '--signal=TERM', `${frames}_1`);
        await finished();
        expect(log('frames-')).toMatch(/Stopped early; back into the queue \(0 times before\)/);
        expect(restartsOf(frames)).toBe(1);
      });
    },
  );

  it('is taken back into the queue so often and no oftener', async () => {
    await cluster.setRequeueExit(false);
    await onFarm(async ({ submit, made, log, folder }) => {
      const { frames, gather } = await submit(['--tasks', '3', '--max-requeues', '0'], SLOWLY);
      await eventually('frames', () => made() >= 1);
      cluster.run('scancel', '--batch', '--signal=TERM', `${frames}_1`);
      await eventually('the gather to be cancelled', () => stateOf(gather) === 'CANCELLED');
      expect(log('frames-')).not.toMatch(/back into the queue/);
      expect(existsSync(join(folder, 'manifest.json'))).toBe(false);
    });
  });

  it('that the user cancels stays cancelled', async () => {
    await cluster.setRequeueExit(false);
    await onFarm(async ({ submit, made, folder, log }) => {
      const { frames, gather } = await submit(['--tasks', '3'], SLOWLY);
      await eventually('frames', () => made() >= 4);
      cluster.run('scancel', frames, gather);
      await eventually('an empty queue', () => cluster.run('squeue', '--noheader') === '');
      expect(log('frames-')).not.toMatch(/back into the queue/);
      expect(existsSync(join(folder, 'manifest.json'))).toBe(false);
      const temporaries = (readdirSync(folder, { recursive: true }) as string[]).filter((path) =>
        path.endsWith('.tmp'),
      );
      expect(temporaries).toEqual([]);
    });
  });

  it('with a shard that fails leaves the gather cancelled, and a rerun completes', async () => {
    await onFarm(async ({ submit, resubmit, finished, folder, log }) => {
      mkdirSync(join(folder, 'c0/normal.0005.png/x'), { recursive: true });
      const { gather } = await submit(['--tasks', '4']);
      await eventually('the gather to be cancelled', () => stateOf(gather) === 'CANCELLED');
      expect(log('frames-')).toMatch(/c0 frame 5: Cannot write/);
      expect(existsSync(join(folder, 'manifest.json'))).toBe(false);
      const status = await runProgram(['farm', 'status', folder]);
      expect(status.stdout).toMatch(/c0 +frames +23\/24 +5$/m);
      rmSync(join(folder, 'c0/normal.0005.png'), { recursive: true });
      resubmit();
      await finished();
    });
  });

  interface Submitted {
    readonly frames: string;
    readonly gather: string;
  }

  interface Farm {
    readonly folder: string;
    /** Writes the scripts and submits them, with some code preloaded into the program. */
    readonly submit: (options: readonly string[], preload?: string) => Promise<Submitted>;
    /** Runs the submit script again. */
    readonly resubmit: () => void;
    /** Frames that are there. */
    readonly made: () => number;
    /** Waits for the end and compares the bake with a local one. */
    readonly finished: () => Promise<void>;
    readonly logs: () => string[];
    /** All that the logs of a kind say. */
    readonly log: (prefix: string) => string;
  }

  function onFarm(use: (farm: Farm) => Promise<void>): Promise<void> {
    return inTemporaryFolder(async (outer) => {
      const folder = join(outer, 'bake');
      const scripts = `${folder}-farm`;
      const logs = (): string[] =>
        existsSync(join(scripts, 'logs')) ? readdirSync(join(scripts, 'logs')) : [];
      const log = (prefix: string): string =>
        logs()
          .filter((name) => name.startsWith(prefix))
          .map((name) => readFileSync(join(scripts, 'logs', name), 'utf8'))
          .join('\n');
      try {
        await use({
          folder,
          async submit(options, preload) {
            const args = [
              'farm',
              'slurm',
              seaFile(outer),
              '-o',
              folder,
              '--cpus',
              '1',
              '--submit',
              ...options,
            ];
            const env = { ...cluster.env };
            if (preload !== undefined) {
              writeFileSync(join(outer, 'preload.cjs'), preload);
              env.NODE_OPTIONS = `--require ${join(outer, 'preload.cjs')}`;
            }
            const { status, stdout, stderr } = await runProgram(args, { env });
            expect(status, stderr).toBe(0);
            const [, frames, gather] = /^frames (\d+)\ngather (\d+)\n$/.exec(stdout) ?? [];
            return { frames, gather };
          },
          resubmit: () => cluster.run(join(scripts, 'submit.sh')),
          made: () => {
            const files = existsSync(folder) ? (readdirSync(folder, { recursive: true }) as string[]) : [];
            return files.filter((path) => /^c\d\/displacement\./.test(path)).length;
          },
          async finished() {
            await eventually('an empty queue', () => cluster.run('squeue', '--noheader') === '', 180);
            expect(existsSync(join(folder, 'manifest.json')), log('')).toBe(true);
            expect(fileHashes(folder)).toEqual(whole);
          },
          logs,
          log,
        });
      } finally {
        cluster.run('scancel', '--user=root');
        await eventually('an empty queue', () => cluster.run('squeue', '--noheader') === '');
      }
    });
  }

  function jobs(id: string): string[] {
    return cluster.run('scontrol', '--oneliner', 'show', 'job', id).split('\n');
  }

  function stateOf(id: string): string {
    return /JobState=(\w+)/.exec(jobs(id)[0])?.[1] ?? '';
  }

  /** Restarts of all tasks of an array together. */
  function restartsOf(id: string): number {
    return jobs(id).reduce((sum, job) => sum + Number(/Restarts=(\d+)/.exec(job)?.[1] ?? 0), 0);
  }
});

/** Has the program take its time over every frame: 36 of them then keep a farm of three busy for some seconds. */
const SLOWLY = `const fs = require('node:fs');
const { isMainThread } = require('node:worker_threads');
const rename = fs.renameSync;
fs.renameSync = (from, to) => {
  if (!isMainThread && to.includes('displacement')) Atomics.wait(new Int32Array(new SharedArrayBuffer(4)), 0, 0, 400);
  rename(from, to);
};
require('node:module').syncBuiltinESMExports();
`;
