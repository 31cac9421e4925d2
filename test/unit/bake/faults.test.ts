import { chmodSync, cpSync, existsSync, mkdirSync, readdirSync, renameSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { jobError, jobFailure } from '../../../src/bake/job-failure.ts';
import { LoopswellError } from '../../../src/errors.ts';
import { planBake } from '../../../src/plan/plan-bake.ts';
import { fileHashes, inlineBake, inTemporaryFolder } from '../../support/bakes.ts';
import { tinyTwoCascadeSea } from '../../support/tiny-seas.ts';

const planned = planBake(tinyTwoCascadeSea());

const WHOLE = inTemporaryFolder(async (folder) => {
  await inlineBake(planned, folder);
  return fileHashes(folder);
});

/** The error a bake ends with. */
async function failure(bake: Promise<unknown>): Promise<LoopswellError> {
  const error: unknown = await bake.then(
    () => null,
    (reason) => reason,
  );
  expect(error).toBeInstanceOf(LoopswellError);
  return error as LoopswellError;
}

/** Calls `act` once when so many frames are done. */
function atFrame(frames: number, act: () => void) {
  let acted = false;
  return {
    onProgress: ({ stage, done }: { readonly stage: string; readonly done: number }) => {
      if (acted || stage !== 'frames' || done < frames) return;
      acted = true;
      act();
    },
  };
}

describe('a frame that cannot be written', () => {
  it('is named; the others are made, and the next run makes that one', async () => {
    await inTemporaryFolder(async (folder) => {
      mkdirSync(join(folder, 'c1/normal.0003.png/inside'), { recursive: true });
      const error = await failure(inlineBake(planned, folder));
      expect(error.exitStatus).toBe(73);
      expect(error.message).toMatch(
        /^c1 frame 3: Cannot write .+c1\/normal\.0003\.png: .+move that folder away\.$/,
      );
      expect(Object.keys(fileHashes(folder)).filter((path) => path.includes('~'))).toEqual([]);
      expect(existsSync(join(folder, 'manifest.json'))).toBe(false);
      rmSync(join(folder, 'c1/normal.0003.png'), { recursive: true });
      expect((await inlineBake(planned, folder)).run).toMatchObject({ framesMade: 1, framesReused: 15 });
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });

  it('with several others ends the bake, and all are named', async () => {
    await inTemporaryFolder(async (folder) => {
      for (const n of [1, 2, 4, 5, 6])
        mkdirSync(join(folder, `c0/normal.000${n}.png/x`), { recursive: true });
      const error = await failure(inlineBake(planned, folder));
      expect(error.exitStatus).toBe(73);
      expect(error.message).toMatch(/^c0 frame 1: Cannot write/);
      expect(error.message).toMatch(
        /\n4 failed: c0 frame 1, c0 frame 2, c0 frame 4, c0 frame 5\. The rest was not tried\.$/,
      );
    });
  });

  it('of foam is named with its run', async () => {
    await inTemporaryFolder(async (folder) => {
      mkdirSync(join(folder, 'c0/foam.0005.png/x'), { recursive: true });
      const error = await failure(inlineBake(planned, folder));
      expect(error.message).toMatch(/^c0 foam of frames 1 to 8: Cannot write .+foam\.0005\.png/);
      rmSync(join(folder, 'c0/foam.0005.png'), { recursive: true });
      await inlineBake(planned, folder);
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });
});

describe('a folder that goes away while the bake runs', () => {
  it('is not made anew: what it held is lost, and the bake says so', async () => {
    await inTemporaryFolder(async (outer) => {
      const folder = join(outer, 'bake');
      const error = await failure(
        inlineBake(
          planned,
          folder,
          atFrame(5, () => rmSync(folder, { recursive: true })),
        ),
      );
      expect(error.exitStatus).toBe(73);
      expect(error.message).toMatch(/there is no such file or folder \(ENOENT\)/);
      expect(readdirSync(outer)).toEqual([]);
      await inlineBake(planned, folder);
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });

  it('is not made anew where it is one cascade alone', async () => {
    await inTemporaryFolder(async (folder) => {
      const away = () => renameSync(join(folder, 'c1'), join(folder, 'elsewhere'));
      const error = await failure(inlineBake(planned, folder, atFrame(5, away)));
      expect(error.message).toMatch(/^c1 frame/);
      expect(existsSync(join(folder, 'c1'))).toBe(false);
      renameSync(join(folder, 'elsewhere'), join(folder, 'c1'));
      await inlineBake(planned, folder);
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });
});

it('a finished file that goes away while the bake runs is missed before the manifest names it', async () => {
  await inTemporaryFolder(async (folder) => {
    const away = () => rmSync(join(folder, 'c0/normal.0001.png'));
    const error = await failure(inlineBake(planned, folder, atFrame(9, away)));
    expect(error.exitStatus).toBe(74);
    expect(error.message).toMatch(/^c0\/normal\.0001\.png in .+ went missing or changed while the bake ran/);
    expect(existsSync(join(folder, 'manifest.json'))).toBe(false);
    expect((await inlineBake(planned, folder)).run.framesMade).toBe(1);
    expect(fileHashes(folder)).toEqual(await WHOLE);
  });
});

describe('another process that finishes the same bake meanwhile', () => {
  it('is no failure where it clears the working files away under our feet', async () => {
    await inTemporaryFolder(async (outer) => {
      const [folder, other] = [join(outer, 'bake'), join(outer, 'other')];
      const { manifest } = await inlineBake(planned, other);
      let finished = false;
      const result = await inlineBake(planned, folder, {
        onProgress: ({ stage, done }) => {
          if (finished || stage !== 'foam' || done < 2) return;
          finished = true;
          cpSync(other, folder, { recursive: true });
          rmSync(join(folder, '.loopswell'), { recursive: true });
        },
      });
      expect(finished).toBe(true);
      expect(result.manifest).toEqual(manifest);
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });

  it('and this one, both at work at once, make one bake', async () => {
    await inTemporaryFolder(async (folder) => {
      let other: Promise<unknown> = Promise.resolve();
      const slow = inlineBake(planned, folder, {
        onProgress: ({ stage, done }) => {
          if (stage === 'frames' && done === 3) other = inlineBake(planned, folder);
        },
      });
      const { manifest } = await slow;
      await other;
      expect(manifest?.planHash).toBe(planned.plan.hash);
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });
});

// Root may write anywhere, so this needs another user.
it.skipIf(process.getuid?.() === 0)(
  'a folder without permission is refused with 73 before a frame is made',
  async () => {
    await inTemporaryFolder(async (folder) => {
      chmodSync(folder, 0o500);
      const error = await failure(inlineBake(planned, folder));
      expect(error.exitStatus).toBe(73);
      chmodSync(folder, 0o700);
      expect(readdirSync(folder)).toEqual([]);
    });
  },
);

describe('a failure as it crosses threads', () => {
  const job = { kind: 'frame', cascade: 1, frame: 4 } as const;

  it('keeps its status and message and gains the name of its frame', () => {
    const failed = jobError(job, planned.plan, jobFailure(new LoopswellError('no room', 74)));
    expect(failed).toMatchObject({ message: 'c1 frame 5: no room', exitStatus: 74 });
    expect(jobError(job, planned.plan, jobFailure(new TypeError('x is null'))).exitStatus).toBe(70);
    expect(jobError(job, planned.plan, jobFailure('thrown text')).message).toBe('c1 frame 5: thrown text');
  });

  it('for want of memory is the machine’s limit', () => {
    const full = Object.assign(new Error('Worker terminated due to reaching memory limit'), {
      code: 'ERR_WORKER_OUT_OF_MEMORY',
    });
    for (const error of [new RangeError('Array buffer allocation failed'), full]) {
      const { exitStatus, message } = jobError(job, planned.plan, jobFailure(error));
      expect(exitStatus).toBe(69);
      expect(message).toBe('c1 frame 5: There is not enough memory. Use fewer threads, or free some memory.');
    }
    expect(jobFailure(new RangeError('Invalid array length')).exitStatus).toBeNull();
  });
});
