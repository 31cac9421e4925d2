import {
  appendFileSync,
  existsSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  rmSync,
  writeFileSync,
} from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { gather } from '../../../src/bake/gather.ts';
import { CannotCreateError, InputError, StoppedError, UsageError } from '../../../src/errors.ts';
import { parseManifest } from '../../../src/manifest/manifest-text.ts';
import { planBake } from '../../../src/plan/plan-bake.ts';
import { fileHashes, inlineBake, inTemporaryFolder, stopAfter } from '../../support/bakes.ts';
import { tinySea, tinyTwoCascadeSea } from '../../support/tiny-seas.ts';

const planned = planBake(tinyTwoCascadeSea());

/** Hashes of the files of an undisturbed bake. */
const WHOLE = inTemporaryFolder(async (folder) => {
  await inlineBake(planned, folder);
  return fileHashes(folder);
});

/** What lies in a folder that a bake works on, beside maps. */
function workFiles(folder: string): string[] {
  return existsSync(join(folder, '.loopswell')) ? readdirSync(join(folder, '.loopswell')) : [];
}

describe('a bake', () => {
  it('makes every planned file, lists them all, and leaves nothing else', async () => {
    await inTemporaryFolder(async (folder) => {
      const { manifest, run } = await inlineBake(planned, folder);
      const paths = planned.plan.cascades.flatMap(({ maps, loop }) =>
        maps.flatMap(({ pattern }) =>
          Array.from({ length: loop.frameCount }, (_, n) =>
            pattern.replace('%04d', String(n + 1).padStart(4, '0')),
          ),
        ),
      );
      const written = fileHashes(folder);
      expect(Object.keys(written)).toEqual([...paths, 'manifest.json'].sort());
      expect(manifest?.files).toEqual(
        paths.sort().map((path) => ({
          path,
          bytes: readFileSync(join(folder, path)).length,
          sha256: `sha256:${written[path]}`,
        })),
      );
      expect(parseManifest(readFileSync(join(folder, 'manifest.json'), 'utf8'), 'm')).toEqual(manifest);
      expect(run).toMatchObject({ framesMade: 16, framesReused: 0, planHash: planned.plan.hash });
    });
  });

  it('of which all is there is checked and not made again', async () => {
    await inTemporaryFolder(async (folder) => {
      const first = await inlineBake(planned, folder);
      const runReport = readFileSync(join(folder, 'run.json'), 'utf8');
      const { manifest, run } = await inlineBake(planned, folder);
      expect(manifest).toEqual(first.manifest);
      expect(run).toMatchObject({ framesMade: 0, framesReused: 16, bytesWritten: 0 });
      expect(readFileSync(join(folder, 'run.json'), 'utf8')).toBe(runReport);
    });
  });

  it('with some frames first reuses them, and is the same', async () => {
    await inTemporaryFolder(async (folder) => {
      const part = await inlineBake(planned, folder, { frames: { first: 3, last: 5 } });
      expect(part.manifest).toBeNull();
      expect(part.run.framesMade).toBe(6);
      expect(existsSync(join(folder, 'manifest.json'))).toBe(false);
      expect(Object.keys(fileHashes(folder)).filter((path) => path.includes('foam'))).toEqual([]);
      const { run } = await inlineBake(planned, folder);
      expect(run).toMatchObject({ framesMade: 10, framesReused: 6 });
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });

  it('keeps its working files where it is asked to, and clears them when it is not', async () => {
    await inTemporaryFolder(async (folder) => {
      await inlineBake(planned, folder, { keepScratch: true });
      expect(workFiles(folder).filter((path) => path.endsWith('.codes')).length).toBe(16);
      expect(workFiles(folder)).toContain('plan.json');
      await inlineBake(planned, folder);
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });

  it('refuses numbers that make no sense', async () => {
    const refused = [
      { frames: { first: 0, last: 3 } },
      { frames: { first: 5, last: 4 } },
      { frames: { first: 8, last: 9 } },
      { frames: { first: 1.5, last: 2 } },
      { threads: -1 },
      { threads: Number.NaN },
      { threads: 1.5 },
      { shard: { index: 0, count: 2 } },
      { shard: { index: 3, count: 2 } },
      { shard: { index: 1, count: Infinity } },
    ];
    await inTemporaryFolder(async (folder) => {
      for (const options of refused) {
        await expect(inlineBake(planned, folder, options), JSON.stringify(options)).rejects.toThrow(
          UsageError,
        );
      }
      expect(readdirSync(folder)).toEqual([]);
    });
  });
});

describe('a stopped bake', () => {
  it.each([
    ['check', 0],
    ['frames', 1],
    ['frames', 7],
    ['frames', 16],
    ['foam-level', 3],
    ['foam', 1],
    ['foam', 9],
  ] as const)('in stage %s after %i leaves no temporary, resumes and is the same', async (stage, frames) => {
    await inTemporaryFolder(async (folder) => {
      await inlineBake(planned, folder, { frames: { first: 1, last: 1 } });
      const stop = stopAfter(stage, frames);
      await expect(inlineBake(planned, folder, stop)).rejects.toThrow(StoppedError);
      const made = Object.keys(fileHashes(folder));
      expect(made.filter((path) => path.includes('~'))).toEqual([]);
      expect(made).not.toContain('manifest.json');
      const { run } = await inlineBake(planned, folder);
      if (stage === 'frames') {
        // One that was in flight may have been finished.
        const left = 16 - Math.max(frames, 2);
        expect(run.framesMade).toBeLessThanOrEqual(left);
        expect(run.framesMade).toBeGreaterThanOrEqual(Math.max(0, left - 1));
      }
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });

  it('that was told so before it began makes nothing', async () => {
    await inTemporaryFolder(async (folder) => {
      await expect(inlineBake(planned, folder, { signal: AbortSignal.abort() })).rejects.toThrow(
        StoppedError,
      );
      expect(readdirSync(folder)).toEqual([]);
    });
  });
});

describe('a finished file', () => {
  it('is made again in an unfinished bake if it was changed, cut short or removed', async () => {
    await inTemporaryFolder(async (folder) => {
      await inlineBake(planned, folder, { shard: { index: 1, count: 1 } });
      appendFileSync(join(folder, 'c0/normal.0002.png'), 'x');
      writeFileSync(join(folder, 'c1/displacement.0003.exr'), '');
      rmSync(join(folder, '.loopswell/c0.00004.codes'));
      const { run } = await inlineBake(planned, folder);
      expect(run).toMatchObject({ framesMade: 3, framesReused: 13 });
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });

  it('is made again in a finished bake, and no other frame of maps is', async () => {
    await inTemporaryFolder(async (folder) => {
      await inlineBake(planned, folder);
      appendFileSync(join(folder, 'c0/normal.0002.png'), 'x');
      rmSync(join(folder, 'c1/displacement.0003.exr'));
      const { run, manifest } = await inlineBake(planned, folder);
      expect(run.framesMade).toBe(2);
      expect(manifest?.planHash).toBe(planned.plan.hash);
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });

  it('of foam is made again from the frames of its cascade', async () => {
    await inTemporaryFolder(async (folder) => {
      await inlineBake(planned, folder);
      rmSync(join(folder, 'c1/foam.0003.png'));
      // Stopped on the way, too.
      await expect(inlineBake(planned, folder, stopAfter('frames', 4))).rejects.toThrow(StoppedError);
      const { run } = await inlineBake(planned, folder);
      expect(run).toMatchObject({ framesMade: 4, framesReused: 4 });
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });

  it('whose hash in the manifest is not what the plan makes is told of', async () => {
    await inTemporaryFolder(async (folder) => {
      await inlineBake(planned, folder);
      const path = join(folder, 'manifest.json');
      const text = readFileSync(path, 'utf8');
      const hash = (await WHOLE)['c0/normal.0002.png'];
      writeFileSync(path, text.replace(hash, hash.split('').reverse().join('')));
      await expect(inlineBake(planned, folder)).rejects.toThrow(InputError);
      await expect(inlineBake(planned, folder)).rejects.toThrow(
        /c0\/normal\.0002\.png: expected what the manifest/,
      );
    });
  });
});

describe('a damaged manifest', () => {
  it('that names other files than its maps is told of, and nothing is made or removed', async () => {
    await inTemporaryFolder(async (folder) => {
      const { manifest } = await inlineBake(planned, folder);
      const path = join(folder, 'manifest.json');
      const files = manifest?.files ?? [];
      for (const wrong of [
        { files: files.slice(1) },
        { files: [...files.slice(1), files[1]] },
        { files: [...files, { ...files[0], path: 'c0/normal.0009.png' }] },
        { files: files.map((file, i) => (i === 3 ? { ...file, path: 'notes.txt' } : file)) },
      ]) {
        writeFileSync(path, JSON.stringify({ ...manifest, ...wrong }));
        const before = fileHashes(folder);
        for (const run of [inlineBake(planned, folder), gather(folder, { threads: 0 })]) {
          await expect(run).rejects.toThrow(/files: expected the 48 files of its maps/);
        }
        expect(fileHashes(folder)).toEqual(before);
      }
    });
  });

  it('is none where a bake was killed before it could tidy up: the next run does', async () => {
    await inTemporaryFolder(async (folder) => {
      await inlineBake(planned, folder, { keepScratch: true });
      expect((await gather(folder, { threads: 0 })).run.bytesWritten).toBe(0);
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });
});

describe("another plan's bake in the folder", () => {
  const other = planBake(tinySea({ seed: 4 }));

  it.each(['finished', 'unfinished'])('that is %s is refused, and replaced by force', async (state) => {
    await inTemporaryFolder(async (folder) => {
      await inlineBake(other, folder, state === 'finished' ? {} : { frames: { first: 1, last: 4 } });
      mkdirSync(join(folder, 'c0/mine'));
      writeFileSync(join(folder, 'c0/mine/notes.txt'), 'mine');
      writeFileSync(join(folder, 'c0/foam.9999.png'), 'mine');
      const before = fileHashes(folder);
      await expect(inlineBake(planned, folder)).rejects.toThrow(CannotCreateError);
      await expect(inlineBake(planned, folder)).rejects.toThrow(/another plan \("Tiny wind sea"\).+--force/);
      expect(fileHashes(folder)).toEqual(before);

      await inlineBake(planned, folder, { force: true });
      const mine = Object.fromEntries(
        Object.entries(before).filter(([path]) => path.includes('mine') || path.includes('9999')),
      );
      expect(fileHashes(folder)).toEqual({ ...(await WHOLE), ...mine });
    });
  });

  it('is not half replaced where the new bake is refused for lack of room', async () => {
    await inTemporaryFolder(async (folder) => {
      await inlineBake(other, folder);
      const before = fileHashes(folder);
      const { plan, waves } = planned;
      const cost = { ...plan.report.cost, outputBytes: 1e18 };
      const huge = { plan: { ...plan, report: { ...plan.report, cost } }, waves };
      await expect(inlineBake(huge, folder, { force: true })).rejects.toThrow(/GB of disk/);
      expect(fileHashes(folder)).toEqual(before);
    });
  });

  it('is left alone where what is there is not ours', async () => {
    for (const [path, text] of [
      ['manifest.json', '{"name": "A web app", "icons": []}'],
      ['manifest.json', '{'],
      ['.loopswell/plan.json', 'null'],
      ['.loopswell/plan.json', '{"hash": '],
    ]) {
      await inTemporaryFolder(async (folder) => {
        mkdirSync(join(folder, '.loopswell'));
        writeFileSync(join(folder, path), text);
        const error: unknown = await inlineBake(planned, folder, { force: path === 'manifest.json' }).then(
          () => null,
          (reason) => reason,
        );
        expect(error, text).toBeInstanceOf(CannotCreateError);
        expect(readFileSync(join(folder, path), 'utf8')).toBe(text);
      });
    }
  });
});
