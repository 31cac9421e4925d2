import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { fileHashes, inTemporaryFolder } from '../support/bakes.ts';
import { BUILT_SEA_YAML, builtLibrary, runProgram, seaFile } from '../support/built.ts';

const { bake, expectedMemoryBytes, gather, parseSea, planBake } = await builtLibrary();
const planned = planBake(parseSea(BUILT_SEA_YAML));

const WHOLE = inTemporaryFolder(async (folder) => {
  await bake(planned, folder, { threads: 0 });
  return fileHashes(folder);
});

describe('real threads', () => {
  it.each([1, 2, 5])('make the same bytes as none: %i of them', async (threads) => {
    await inTemporaryFolder(async (folder) => {
      const { run } = await bake(planned, folder, { threads });
      expect(run.threads).toBe(threads);
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });

  it('make the same bytes in several processes at once, in any order of completion', async () => {
    await inTemporaryFolder(async (outer) => {
      const sea = seaFile(outer);
      const folder = join(outer, 'bake');
      // Two processes make the same shard, and none of them has the same number of threads.
      const shards = ['3/4', '1/4', '4/4', '2/4', '1/4'].map((shard, i) =>
        runProgram(['bake', sea, '-o', folder, '--shard', shard, '--threads', `${1 + i}`]),
      );
      for (const { status, stderr } of await Promise.all(shards)) expect(status, stderr).toBe(0);
      const gathers = await Promise.all([1, 2].map(() => runProgram(['gather', folder])));
      for (const { status, stderr } of gathers) expect(status, stderr).toBe(0);
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });

  it('make the same bytes in two whole bakes at once', async () => {
    await inTemporaryFolder(async (outer) => {
      const sea = seaFile(outer);
      const folder = join(outer, 'bake');
      const bakes = await Promise.all([1, 2].map(() => runProgram(['bake', sea, '-o', folder])));
      for (const { status, stderr } of bakes) expect(status, stderr).toBe(0);
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });

  it('make the parts of a gather', async () => {
    await inTemporaryFolder(async (folder) => {
      await bake(planned, folder, { shard: { index: 1, count: 1 }, threads: 2 });
      await Promise.all([1, 2, 3].map((index) => gather(folder, { part: { index, count: 3 }, threads: 1 })));
      expect((await gather(folder, { threads: 2 })).run.bytesWritten).toBe(0);
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });
});

describe('memory', () => {
  const sea = (frames: number, resolution: number): string =>
    BUILT_SEA_YAML.replace('frames: 24', `frames: ${frames}`).replace(
      'resolution: 128',
      `resolution: ${resolution}`,
    );

  async function peakBytes(yaml: string, threads: number): Promise<number> {
    return inTemporaryFolder(async (folder) => {
      const ended = await runProgram([
        'bake',
        seaFile(folder, yaml),
        '-o',
        join(folder, 'bake'),
        '--threads',
        `${threads}`,
        '--json',
      ]);
      expect(ended.status, ended.stderr).toBe(0);
      return JSON.parse(ended.stdout).run.peakMemoryBytes;
    });
  }

  it('does not grow with the number of frames', async () => {
    const few = await peakBytes(sea(24, 128), 2);
    const many = await peakBytes(sea(24 * 8, 128), 2);
    // All that is kept of a frame is its line in the journal, a few kilobytes: here under 1 MB. The rest is how much
    // garbage the runtime leaves lying about, and the blocks of the foam, at most 16 MiB a thread.
    expect(many - few).toBeLessThan(60e6);
  });

  it.each([
    [128, 2],
    [512, 1],
    [512, 3],
  ])('is what the plan says within 10 % or 40 MB: %i x %1$i, threads %i', async (resolution, threads) => {
    const yaml = sea(24, resolution).replace('frames: 12', 'frames: 6').replace('frames: 24', 'frames: 12');
    const expected = expectedMemoryBytes(planBake(parseSea(yaml)).plan, threads);
    const peak = await peakBytes(yaml, threads);
    expect(Math.abs(peak - expected)).toBeLessThan(Math.max(0.1 * expected, 40e6));
  });
});
