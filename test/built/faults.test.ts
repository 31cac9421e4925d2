import { execFileSync, spawnSync } from 'node:child_process';
import { chmodSync, existsSync, mkdirSync, readdirSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { fileHashes, inTemporaryFolder } from '../support/bakes.ts';
import { type Ended, type Running, runProgram, seaFile, startProgram, until } from '../support/built.ts';

/** Code that has a worker thread do something before it gives a file its name, if its path holds a text. */
const onWrite = (path: string, act: string): string => `const fs = require('node:fs');
const { isMainThread } = require('node:worker_threads');
const rename = fs.renameSync;
fs.renameSync = (from, to) => {
  if (!isMainThread && to.includes(${JSON.stringify(path)})) { ${act} }
  rename(from, to);
};
require('node:module').syncBuiltinESMExports();
`;

const WAIT = 'Atomics.wait(new Int32Array(new SharedArrayBuffer(4)), 0, 0, 80);';
/** Frames take so long that a signal finds some of them still to be made. */
const SLOWLY = onWrite('displacement', WAIT);
const SLOW_FOAM = onWrite('/foam.', WAIT);
/** A minute of work a frame. */
const HARDLY = onWrite(
  'displacement',
  'const end = performance.now() + 60000; while (performance.now() < end);',
);

const WHOLE = inTemporaryFolder(async (folder) => {
  const { status, stderr } = await runProgram(['bake', seaFile(folder), '-o', join(folder, 'bake')]);
  expect(status, stderr).toBe(0);
  return fileHashes(join(folder, 'bake'));
});

/** Calls back with a sea file and a folder to bake it into. */
function onBench(use: (sea: string, folder: string) => Promise<void>): Promise<void> {
  return inTemporaryFolder((outer) => use(seaFile(outer), join(outer, 'bake')));
}

/** Files below a folder; none where it is not there. */
function filesIn(folder: string): string[] {
  return existsSync(folder) ? (readdirSync(folder, { recursive: true }) as string[]) : [];
}

/** Number of finished files of frames. */
function framesIn(folder: string): number {
  return filesIn(folder).filter((path) => /^c\d\/displacement\./.test(path)).length;
}

function temporariesIn(folder: string): string[] {
  return filesIn(folder).filter((path) => path.endsWith('.tmp'));
}

async function resume(sea: string, folder: string): Promise<Ended> {
  const ended = await runProgram(['bake', sea, '-o', folder, '--json']);
  expect(ended.status, ended.stderr).toBe(0);
  expect(fileHashes(folder)).toEqual(await WHOLE);
  return ended;
}

describe('signals', () => {
  it.each(['SIGTERM', 'SIGINT'] as const)(
    '%s ends the bake with 75 within 5 s, without a temporary',
    async (signal) => {
      await onBench(async (sea, folder) => {
        const running = startWith(SLOWLY, ['bake', sea, '-o', folder]);
        await until(() => framesIn(folder) >= 4, running);
        const told = performance.now();
        running.child.kill(signal);
        const { status, stderr } = await running.ended;
        expect(status).toBe(75);
        expect((performance.now() - told) / 1000).toBeLessThan(5);
        expect(stderr).toContain('Run the same command again to resume.');
        expect(temporariesIn(folder)).toEqual([]);
        const made = framesIn(folder);
        const { run } = JSON.parse((await resume(sea, folder)).stdout);
        expect(run.framesReused).toBe(made);
      });
    },
  );

  it('within 5 s also where a frame takes longer, which is dropped', async () => {
    await onBench(async (sea, folder) => {
      const running = startWith(HARDLY, ['bake', sea, '-o', folder]);
      await until(() => temporariesIn(folder).length > 0, running);
      const told = performance.now();
      running.child.kill('SIGTERM');
      expect((await running.ended).status).toBe(75);
      expect((performance.now() - told) / 1000).toBeLessThan(5);
      expect(temporariesIn(folder)).toEqual([]);
      await resume(sea, folder);
    });
  });

  it('a second one ends it at once', async () => {
    await onBench(async (sea, folder) => {
      const running = startWith(HARDLY, ['bake', sea, '-o', folder]);
      await until(() => temporariesIn(folder).length > 0, running);
      running.child.kill('SIGTERM');
      await new Promise((resolve) => setTimeout(resolve, 1000));
      const told = performance.now();
      running.child.kill('SIGTERM');
      expect((await running.ended).status).toBe(75);
      // The first alone would have given the frames three seconds.
      expect((performance.now() - told) / 1000).toBeLessThan(1.5);
      await resume(sea, folder);
    });
  });
});

describe('kill -9', () => {
  // In the frames and in the foam; test/farm/kill-loop does it a hundred times at random.
  it('at any moment leaves nothing that a resumed bake does not put right', async () => {
    await onBench(async (sea, folder) => {
      for (const frames of [1, 17, 35]) {
        const running = startWith(SLOWLY, ['bake', sea, '-o', folder]);
        await until(() => framesIn(folder) >= frames, running);
        running.child.kill('SIGKILL');
        expect((await running.ended).signal).toBe('SIGKILL');
      }
      const foaming = startWith(SLOW_FOAM, ['bake', sea, '-o', folder]);
      await until(() => filesIn(folder).some((path) => path.includes('/foam.')), foaming);
      foaming.child.kill('SIGKILL');
      expect((await foaming.ended).signal).toBe('SIGKILL');
      const { run } = JSON.parse((await resume(sea, folder)).stdout);
      expect(run).toMatchObject({ framesMade: 0, framesReused: 36 });
    });
  });

  it('of a shard while another makes the same shard does no damage', async () => {
    await onBench(async (sea, folder) => {
      const shard = ['bake', sea, '-o', folder, '--shard', '1/2'];
      const [killed, other] = [startWith(SLOWLY, shard), startWith(SLOWLY, shard)];
      await until(() => framesIn(folder) >= 5, killed);
      killed.child.kill('SIGKILL');
      const { status, stderr } = await other.ended;
      expect(status, stderr).toBe(0);
      await killed.ended;
      await resume(sea, folder);
    });
  });
});

describe('a thread that dies', () => {
  it.each([
    ['ends', 'process.exit(7);', 70, /its thread ended with code 7/],
    [
      'runs out of memory',
      'const hoard = []; for (;;) hoard.push(new Array(1e5).fill(hoard.length));',
      69,
      /There is not enough memory\. Use fewer threads/,
    ],
  ])(
    'because it %s: the frame is named, the others are made, the next run makes that one',
    async (_, code, status, reason) => {
      await onBench(async (sea, folder) => {
        const env = withPreload(join(folder, '..'), onWrite('c0/normal.0005', code));
        const ended = await runProgram(['bake', sea, '-o', folder, '--threads', '2'], {
          env: { ...env, NODE_OPTIONS: `${env.NODE_OPTIONS} --max-old-space-size=200` },
        });
        expect(ended.status, ended.stderr).toBe(status);
        expect(ended.stderr).toMatch(/c0 frame 5: /);
        expect(ended.stderr).toMatch(reason);
        expect(framesIn(folder)).toBe(36);
        expect(temporariesIn(folder)).toEqual([]);
        const { run } = JSON.parse((await resume(sea, folder)).stdout);
        expect(run).toMatchObject({ framesMade: 1, framesReused: 35 });
      });
    },
  );
});

describe('a disk', () => {
  // A small file system of our own; only root may make one.
  const mountable = process.getuid?.() === 0 && spawnSync('sh', ['-c', 'command -v mount']).status === 0;

  it.skipIf(!mountable && process.env.CI !== 'true')(
    'that is full ends the bake with 74, and with room again it resumes',
    async () => {
      await inTemporaryFolder(async (outer) => {
        const disk = join(outer, 'disk');
        mkdirSync(disk);
        execFileSync('mount', ['-t', 'tmpfs', '-o', 'size=40m', 'tmpfs', disk]);
        try {
          const folder = join(disk, 'bake');
          const sea = seaFile(outer);
          const running = startWith(SLOWLY, ['bake', sea, '-o', folder]);
          await until(() => framesIn(folder) >= 3, running);
          running.child.kill('SIGSTOP');
          expect(spawnSync('dd', ['if=/dev/zero', `of=${disk}/filler`, 'bs=64k']).status).not.toBe(0);
          running.child.kill('SIGCONT');
          const { status, stderr } = await running.ended;
          expect(status, stderr).toBe(74);
          expect(stderr).toMatch(/the disk is full \(ENOSPC\)\. Free space, .+ it resumes/);
          expect(temporariesIn(folder)).toEqual([]);
          rmSync(join(disk, 'filler'));
          await resume(sea, folder);
        } finally {
          execFileSync('umount', [disk]);
        }
      });
    },
  );

  it.skipIf(!mountable && process.env.CI !== 'true')('that is read-only is refused with 73', async () => {
    await inTemporaryFolder(async (outer) => {
      const disk = join(outer, 'disk');
      mkdirSync(disk);
      execFileSync('mount', ['-t', 'tmpfs', '-o', 'size=40m,ro', 'tmpfs', disk]);
      try {
        const { status, stderr } = await runProgram(['bake', seaFile(outer), '-o', join(disk, 'bake')]);
        expect(status).toBe(73);
        expect(stderr).toMatch(/the file system is read-only \(EROFS\)/);
      } finally {
        execFileSync('umount', [disk]);
      }
    });
  });

  it('that has too little room for the bake is refused with 69 before a frame is made', async () => {
    await inTemporaryFolder(async (outer) => {
      const sea = seaFile(outer);
      const huge = join(outer, 'huge.yaml');
      const text = `seaFile: 1
title: Huge
systems: [{ kind: wind-sea, from: 250, significantHeight: 0.5, peakPeriod: 3, windSpeed: 8 }]
loop: { frames: 100000, frameRate: 100 }
cascades: [{ patch: 60, resolution: 1024 }]
maps: { displacement: { format: exr, sample: float } }
`;
      writeFileSync(huge, text);
      const folder = join(outer, 'bake');
      const { status, stderr } = await runProgram(['bake', huge, '-o', folder, '--threads', '1']);
      expect(status, stderr).toBe(69);
      expect(stderr).toMatch(/needs about .+ GB of disk/);
      expect(existsSync(folder)).toBe(false);
      expect(statSync(sea).size).toBeGreaterThan(0);
    });
  });
});

// Root may write anywhere: run as nobody then.
it('a folder without permission is refused with 73', async () => {
  await inTemporaryFolder(async (outer) => {
    chmodSync(outer, 0o755);
    const sea = seaFile(outer);
    const folder = join(outer, 'closed');
    mkdirSync(folder, { mode: 0o555 });
    const nobody = process.getuid?.() === 0 ? { uid: 65534, gid: 65534 } : {};
    const { status, stderr } = await runProgram(['bake', sea, '-o', folder], nobody);
    expect(status, stderr).toBe(73);
    expect(stderr).toMatch(/permission denied \(EACCES\)/);
    expect(readdirSync(folder)).toEqual([]);
  });
});

/**
 * The environment in which every thread runs some code before ours: faults are put in from outside, the program under
 * test is the one that ships.
 */
function withPreload(folder: string, code: string): NodeJS.ProcessEnv {
  const script = join(folder, 'preload.cjs');
  writeFileSync(script, code);
  return { ...process.env, NODE_OPTIONS: `--require ${script}` };
}

/** Starts the program with some code preloaded; the sea file's folder holds the code. */
function startWith(code: string, args: readonly string[]): Running {
  return startProgram(args, { env: withPreload(dirname(args[1]), code) });
}
