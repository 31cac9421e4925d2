import { describe, expect, it } from 'vitest';
import { gather } from '../../../src/bake/gather.ts';
import { needsSurvey, surveyedBake } from '../../../src/bake/survey.ts';
import { StoppedError } from '../../../src/errors.ts';
import { planBake, plannedBakeOf } from '../../../src/plan/plan-bake.ts';
import { parsePlan, planText } from '../../../src/plan/plan-text.ts';
import { fileHashes, inlineBake, inTemporaryFolder, stopAfter } from '../../support/bakes.ts';
import { tinySea, tinyTwoCascadeSea } from '../../support/tiny-seas.ts';

const surveyedMaps = {
  displacement: { format: 'png', bits: 16, range: 'survey' },
  jacobian: { format: 'png', bits: 8, range: 'survey' },
  normal: 'png',
};
const open = planBake(
  tinyTwoCascadeSea({ maps: surveyedMaps, foam: undefined, output: { axes: 'y-up', lengthUnit: 'cm' } }),
);

const KNOWN = surveyedBake(open, { threads: 0 });

const WHOLE = inTemporaryFolder(async (folder) => {
  await inlineBake(await KNOWN, folder);
  return fileHashes(folder);
});

/** Counts how often a stage is reported. */
function countOf(stage: string): {
  onProgress: (progress: { readonly stage: string }) => void;
  count: () => number;
} {
  let count = 0;
  return {
    onProgress: (progress) => {
      if (progress.stage === stage) count++;
    },
    count: () => count,
  };
}

describe('a survey', () => {
  it('makes a plan whose ranges are known, with a hash of its own, and can be saved and read', async () => {
    expect(needsSurvey(open.plan)).toBe(true);
    const { plan, waves } = await KNOWN;
    expect(needsSurvey(plan)).toBe(false);
    expect(plan.hash).not.toBe(open.plan.hash);
    expect(waves).toBe(open.waves);
    const read = parsePlan(planText(plan), 'plan.json');
    expect(plannedBakeOf(read).plan).toEqual(plan);
    expect(await surveyedBake(read === null ? open : { plan, waves })).toEqual({ plan, waves });
  });

  it('finds ranges that clip nothing and waste less than a step', async () => {
    await inTemporaryFolder(async (folder) => {
      const { manifest } = await inlineBake(open, folder);
      for (const { maps } of manifest?.cascades ?? []) {
        for (const { channels, range, sample } of [maps.displacement, maps.jacobian].flatMap(
          (map) => map ?? [],
        )) {
          expect(range).toBe('survey');
          for (const { quantity, decode, written } of channels) {
            expect(written.clipped, quantity).toBe(0);
            const centre = quantity === 'jacobian' ? 1 : 0;
            const reached = Math.max(written.max - centre, centre - written.min);
            const codes = sample === 'uint8' ? 255 : 65535;
            const half = Math.abs(decode.scale) / 2;
            // Rounded up to five digits, and half a code to either side.
            expect(reached / half).toBeGreaterThan(1 - 2e-4 - 4 / codes);
          }
        }
      }
    });
  });

  it('is made by a bake that needs it, to the same bytes, and not again on resuming', async () => {
    await inTemporaryFolder(async (folder) => {
      const first = countOf('survey');
      await inlineBake(open, folder, { frames: { first: 1, last: 2 }, ...first });
      expect(first.count()).toBe(16);
      const second = countOf('survey');
      await inlineBake(open, folder, second);
      expect(second.count()).toBe(0);
      expect(fileHashes(folder)).toEqual(await WHOLE);
      // The ranges of a finished bake are in its manifest.
      const third = countOf('survey');
      expect((await inlineBake(open, folder, third)).run.framesMade).toBe(0);
      expect(third.count()).toBe(0);
    });
  });

  it('may be left to the shards', async () => {
    await inTemporaryFolder(async (folder) => {
      for (const index of [2, 1]) await inlineBake(open, folder, { shard: { index, count: 2 } });
      await gather(folder, { threads: 0 });
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });

  it('is not begun where the folder holds another bake', async () => {
    await inTemporaryFolder(async (folder) => {
      await inlineBake(planBake(tinySea()), folder);
      const survey = countOf('survey');
      await expect(inlineBake(open, folder, survey)).rejects.toThrow(/another plan/);
      expect(survey.count()).toBe(0);
      await inlineBake(open, folder, { force: true });
      expect(fileHashes(folder)).toEqual(await WHOLE);
    });
  });

  it('can be stopped', async () => {
    await expect(surveyedBake(open, { threads: 0, ...stopAfter('survey', 3) })).rejects.toThrow(StoppedError);
  });
});
