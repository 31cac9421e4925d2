import { appendFileSync, existsSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { gather } from '../../../src/bake/gather.ts';
import { InputError, StoppedError } from '../../../src/errors.ts';
import { planBake } from '../../../src/plan/plan-bake.ts';
import { fileHashes, inlineBake, inTemporaryFolder, stopAfter } from '../../support/bakes.ts';
import { tinyTwoCascadeSea } from '../../support/tiny-seas.ts';

const planned = planBake(tinyTwoCascadeSea());

const WHOLE = inTemporaryFolder(async (folder) => {
  await inlineBake(planned, folder);
  return fileHashes(folder);
});

async function bakeShards(folder: string, count: number, order?: readonly number[]): Promise<void> {
  for (const index of order ?? Array.from({ length: count }, (_, i) => i + 1)) {
    const { manifest } = await inlineBake(planned, folder, { shard: { index, count } });
    expect(manifest).toBeNull();
  }
}

describe('shards and gather', () => {
  it.each([1, 2, 3, 7, 40])('of %i make the same bytes as one bake', async (count) => {
    await inTemporaryFolder(async (folder) => {
      await bakeShards(folder, count);
      expect(existsSync(join(folder, 'manifest.json'))).toBe(false);
      const { manifest } = await gather(folder, { threads: 0 });
      expect(manifest?.planHash).toBe(planned.plan.hash);
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });

  it('may run in any order, twice, again with another number of shards, and at once', async () => {
    await inTemporaryFolder(async (folder) => {
      await bakeShards(folder, 3, [3, 1, 3]);
      await bakeShards(folder, 5, [2, 5]);
      await Promise.all(
        [1, 2, 1].map((index) => inlineBake(planned, folder, { shard: { index, count: 2 } })),
      );
      await gather(folder, { threads: 0 });
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });

  it('may be run on a finished bake: a shard and a gather then only check', async () => {
    await inTemporaryFolder(async (folder) => {
      await inlineBake(planned, folder);
      expect((await gather(folder, { threads: 0 })).run.bytesWritten).toBe(0);
      expect((await inlineBake(planned, folder, { shard: { index: 1, count: 2 } })).run.framesMade).toBe(0);
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });

  it('splits the foam', async () => {
    await inTemporaryFolder(async (folder) => {
      await bakeShards(folder, 2);
      const parts = [3, 1, 2];
      const made: number[] = [];
      for (const index of parts) {
        const { manifest } = await gather(folder, { threads: 0, part: { index, count: 3 } });
        expect(manifest).toBeNull();
        made.push(Object.keys(fileHashes(folder)).filter((path) => path.includes('foam')).length);
      }
      // Runs of 2, 3 and 3 of 8 frames in each of two cascades.
      expect(made).toEqual([6, 10, 16]);
      const { run } = await gather(folder, { threads: 0 });
      expect(run.bytesWritten).toBe(0);
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });

  it('resumes a gather that was stopped', async () => {
    await inTemporaryFolder(async (folder) => {
      await bakeShards(folder, 2);
      for (const stop of [stopAfter('check', 3), stopAfter('foam-level', 2), stopAfter('foam', 5)]) {
        await expect(gather(folder, { threads: 0, ...stop })).rejects.toThrow(StoppedError);
      }
      await gather(folder, { threads: 0 });
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });
});

describe('what is missing', () => {
  /** The message of a gather that is refused. */
  async function refusal(folder: string): Promise<string> {
    const error: unknown = await gather(folder, { threads: 0 }).then(
      () => null,
      (reason) => reason,
    );
    expect(error).toBeInstanceOf(InputError);
    expect(existsSync(join(folder, 'manifest.json'))).toBe(false);
    return (error as Error).message;
  }

  it('is named with a command that makes it and nothing else', async () => {
    await inTemporaryFolder(async (folder) => {
      await inlineBake(planned, folder, { frames: { first: 1, last: 3 } });
      await inlineBake(planned, folder, { frames: { first: 6, last: 8 } });
      const message = await refusal(folder);
      expect(message).toContain('c0: expected whole frames 1-8, found 2 missing or damaged: 4-5.');
      expect(message).toContain(`loopswell bake ${folder}/.loopswell/plan.json -o ${folder} --frames 4-5`);
    });
  });

  it('is named frame by frame where it is scattered, damaged files too', async () => {
    await inTemporaryFolder(async (folder) => {
      await bakeShards(folder, 1);
      rmSync(join(folder, 'c1/normal.0002.png'));
      appendFileSync(join(folder, 'c1/displacement.0007.exr'), 'x');
      writeFileSync(join(folder, '.loopswell/c0.00003.codes'), 'x');
      const message = await refusal(folder);
      expect(message).toContain('c0: expected whole frames 1-8, found 1 missing or damaged: 4.');
      expect(message).toContain('c1: expected whole frames 1-8, found 2 missing or damaged: 2, 7.');
      expect(message).toContain('--shard 1/1');
      const { run } = await inlineBake(planned, folder, { shard: { index: 1, count: 1 } });
      expect(run.framesMade).toBe(3);
      await gather(folder, { threads: 0 });
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });

  it('in a finished bake is named too', async () => {
    await inTemporaryFolder(async (folder) => {
      await inlineBake(planned, folder);
      rmSync(join(folder, 'c1/foam.0002.png'));
      await expect(gather(folder, { threads: 0 })).rejects.toThrow(
        /1 missing or damaged: c1\/foam\.0002\.png/,
      );
    });
  });

  it('is the bake itself where there is none', async () => {
    await inTemporaryFolder(async (folder) => {
      await expect(gather(folder)).rejects.toThrow(InputError);
      await expect(gather(join(folder, 'none'))).rejects.toThrow(/expected the folder of a bake/);
      expect(readdirSync(folder)).toEqual([]);
    });
  });
});

describe('a journal', () => {
  /** Changes the text of every journal in a bake folder. */
  function changeJournals(folder: string, change: (text: string) => string): void {
    const work = join(folder, '.loopswell');
    for (const name of readdirSync(work).filter((path) => path.endsWith('.jsonl'))) {
      writeFileSync(join(work, name), change(readFileSync(join(work, name), 'utf8')));
    }
  }

  it('that is damaged costs the frames it told of, and is told of', async () => {
    await inTemporaryFolder(async (folder) => {
      await bakeShards(folder, 1);
      changeJournals(folder, (text) => text.replace('"cascade":1,"frame":4', '"cascade":1,"frame":5'));
      const notices: string[] = [];
      const { run } = await inlineBake(planned, folder, { onNotice: (notice) => notices.push(notice) });
      expect(run.framesMade).toBe(1);
      expect(notices).toHaveLength(1);
      expect(notices[0]).toMatch(
        /^1 line of the journal .+\.jsonl cannot be used; what they told of is made again/,
      );
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });

  it('that is torn in its last line costs that frame alone, and is no news', async () => {
    await inTemporaryFolder(async (folder) => {
      await bakeShards(folder, 1);
      changeJournals(folder, (text) => {
        const lines = text.trimEnd().split('\n').slice(0, -1);
        return lines.join('\n').slice(0, -30);
      });
      const notices: string[] = [];
      const { run } = await inlineBake(planned, folder, { onNotice: (notice) => notices.push(notice) });
      expect(run.framesMade).toBe(1);
      expect(notices).toEqual([]);
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });

  it('of another plan counts for nothing, though its files are whole', async () => {
    const other = planBake(tinyTwoCascadeSea({ seed: 4 }));
    await inTemporaryFolder(async (folder) => {
      await inlineBake(other, folder, { shard: { index: 1, count: 1 } });
      rmSync(join(folder, '.loopswell/plan.json'));
      const notices: string[] = [];
      const { run } = await inlineBake(planned, folder, { onNotice: (notice) => notices.push(notice) });
      expect(run.framesMade).toBe(16);
      expect(notices[0]).toMatch(/^16 lines of the journal/);
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });
});
