import { mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { isJournalLine } from '../../src/bake/journal-entry.ts';
import { expectedFiles } from '../../src/bake/paths.ts';
import { requireComplete } from '../../src/bake/repair.ts';
import { toldOf } from '../../src/bake/told.ts';
import { journalsIn } from '../../src/bake/work-folder.ts';
import { InputError } from '../../src/errors.ts';
import { sha256 } from '../../src/hash.ts';
import { parseManifest } from '../../src/manifest/manifest-text.ts';
import { canonicalJson } from '../../src/plan/canonical-json.ts';
import type { Plan } from '../../src/plan/plan.ts';
import { planBake, planHash, plannedBakeOf } from '../../src/plan/plan-bake.ts';
import { parsePlan, planText } from '../../src/plan/plan-text.ts';
import { insidePath } from '../../src/store/safe-path.ts';
import { fileHashes, inlineBake, inTemporaryFolder } from '../support/bakes.ts';
import { changedDocument, changedText } from '../support/mutations.ts';
import { tinyTwoCascadeSea } from '../support/tiny-seas.ts';

// Plans, manifests and journals are read from shared disks: whatever is in them, the answer is an error of ours with
// status 65 that says where, or a value within the bounds of one. fast-check prints the seed of a failing case.

const planned = planBake(tinyTwoCascadeSea());
const { plan } = planned;
/** Cases of one law; all the laws together try five times as many. */
const RUNS = process.env.CI === 'true' ? 5000 : 400;

/** The error that `body` raises, which must be ours; null where there is none. */
function ownError(body: () => void): InputError | null {
  try {
    body();
    return null;
  } catch (error) {
    if (error instanceof InputError) {
      expect(error.message.length).toBeLessThan(5000);
      expect(error.problems[0].remedy).not.toBe('');
      return error;
    }
    throw error;
  }
}

/** The text of a plan document with the hashes that fit it: what somebody would write who means harm. */
function rehashed(document: unknown): string {
  if (typeof document !== 'object' || document === null) return JSON.stringify(document);
  const { reportHash: _, ...changed } = document as Plan & { reportHash?: unknown };
  try {
    const hash = planHash(changed as Plan);
    const report = changed.report === undefined ? '' : canonicalJson(changed.report);
    return JSON.stringify({ ...changed, hash, reportHash: sha256(report) });
  } catch {
    return JSON.stringify(document);
  }
}

/** Memory and names of whatever passes for a plan are those of a sea. */
function expectBounded({ cascades, loop }: Plan): void {
  for (const [c, { id, resolution, maps }] of cascades.entries()) {
    expect(id).toBe(`c${c}`);
    expect(resolution).toBeLessThanOrEqual(8192);
    for (const { pattern } of maps) expect(pattern).toMatch(/^c\d+\/[a-z]+\.%0\d\d?d\.(exr|png)$/);
  }
  expect(loop.frameCount).toBeLessThanOrEqual(100_000);
}

describe('a saved plan', () => {
  it('of which the text was changed is refused', () => {
    const text = planText(plan);
    fc.assert(
      fc.property(changedText(text), (wrong) => {
        const error = ownError(() => parsePlan(wrong, 'plan.json'));
        // White space at the end may come or go.
        if (error === null) expect(parsePlan(wrong, 'plan.json')).toEqual(plan);
      }),
      { numRuns: RUNS },
    );
  });

  it('of which values were changed is refused, or still one within bounds', () => {
    fc.assert(
      fc.property(changedDocument(JSON.parse(planText(plan))), (document) => {
        const text = rehashed(document);
        if (ownError(() => parsePlan(text, 'plan.json')) === null)
          expectBounded(parsePlan(text, 'plan.json'));
      }),
      { numRuns: 2 * RUNS },
    );
  });

  it('whose numbers draw other waves is refused', () => {
    const numbers = {
      systems: plan.systems,
      water: plan.water,
      current: plan.current,
      shaping: plan.shaping,
    };
    let passed = 0;
    fc.assert(
      fc.property(changedDocument(JSON.parse(canonicalJson(numbers))), (document) => {
        const text = rehashed({ ...JSON.parse(planText(plan)), ...(document as object) });
        const error = ownError(() => plannedBakeOf(parsePlan(text, 'plan.json'), 'plan.json'));
        if (error === null) passed++;
      }),
      { numRuns: 300 },
    );
    // Words and reported figures draw no waves.
    expect(passed).toBeLessThan(200);
  });
});

describe('a manifest', () => {
  const baked = inTemporaryFolder(async (folder) => {
    await inlineBake(planned, folder);
    return readFileSync(join(folder, 'manifest.json'), 'utf8');
  });

  it('of which text or values were changed is refused, or names its own files inside the folder', async () => {
    const text = await baked;
    const document = JSON.parse(text);
    const wrong = fc.oneof(
      changedText(text),
      changedDocument(document).map((value) => JSON.stringify(value)),
      changedDocument({ cascades: document.cascades, files: document.files }).map((value) =>
        JSON.stringify({ ...document, ...(value as object) }),
      ),
    );
    fc.assert(
      fc.property(wrong, (changed) => {
        ownError(() => {
          const manifest = parseManifest(changed, 'manifest.json');
          requireComplete(manifest, 'manifest.json');
          for (const { path } of manifest.files) {
            expect(insidePath('/bake', path).startsWith('/bake/')).toBe(true);
          }
        });
      }),
      { numRuns: RUNS },
    );
  });

  it('that names files outside the folder has none of them touched, not even by force', async () => {
    const text = await baked;
    for (const path of ['../outside.txt', 'c0/../../outside.txt', '/tmp/outside.txt']) {
      await inTemporaryFolder(async (outer) => {
        const folder = join(outer, 'bake');
        mkdirSync(folder);
        writeFileSync(join(outer, 'outside.txt'), 'mine');
        writeFileSync(
          join(folder, 'manifest.json'),
          text.replace('"c0/normal.0002.png"', JSON.stringify(path)),
        );
        const other = planBake(tinyTwoCascadeSea({ seed: 9 }));
        const error: unknown = await inlineBake(other, folder, { force: true }).catch((reason) => reason);
        expect(error).toBeInstanceOf(InputError);
        expect(readFileSync(join(outer, 'outside.txt'), 'utf8')).toBe('mine');
        expect(readdirSync(folder)).toEqual(['manifest.json']);
      });
    }
  });
});

describe('a journal', () => {
  /** The lines of a whole bake's journal, as documents. */
  const lines = inTemporaryFolder(async (folder) => {
    await inlineBake(planned, folder, { keepScratch: true });
    const [name] = readdirSync(join(folder, '.loopswell')).filter((path) => path.endsWith('.jsonl'));
    const text = readFileSync(join(folder, '.loopswell', name), 'utf8');
    return text
      .trimEnd()
      .split('\n')
      .map((line) => {
        const { check: _, ...entry } = JSON.parse(line);
        return entry as Record<string, unknown>;
      });
  });

  /** A line with the check sum that fits it. */
  function checked(entry: unknown): string {
    const text = JSON.stringify(entry);
    return `${text.slice(0, -1)},"check":"${sha256(text).slice(7, 23)}"}\n`;
  }

  it('in which values were changed, check sums and all, tells of the plan’s own files or of nothing', async () => {
    const entries = await lines;
    await inTemporaryFolder(async (folder) => {
      mkdirSync(join(folder, '.loopswell'));
      fc.assert(
        fc.property(
          fc.nat(entries.length - 1).chain((i) => changedDocument(entries[i])),
          (document) => {
            writeFileSync(join(folder, '.loopswell', 'j.jsonl'), checked(document));
            const { frames, levels } = toldOf(plan, journalsIn(folder));
            for (const { kind, cascade, frame, files, statistics } of frames) {
              expect(files.map(({ path }) => path)).toEqual(expectedFiles(plan, kind, { cascade, frame }));
              for (const list of Object.values(statistics)) {
                for (const { sum, sumOfSquares, min, max, clipped } of list) {
                  expect([sum, sumOfSquares, min, max, clipped].every(Number.isFinite)).toBe(true);
                }
              }
            }
            for (const { cascade, breakingCode } of levels) {
              expect(plan.cascades[cascade].foam).not.toBeNull();
              expect(breakingCode).toBeLessThanOrEqual(65535);
            }
          },
        ),
        { numRuns: RUNS },
      );
    });
  });

  it('with any text in it stops no bake and changes no byte of it', async () => {
    const entries = await lines;
    const text = entries.map(checked).join('');
    await inTemporaryFolder(async (outer) => {
      const whole = join(outer, 'whole');
      await inlineBake(planned, whole);
      const expected = fileHashes(whole);
      let runs = 0;
      await fc.assert(
        fc.asyncProperty(changedText(text), async (wrong) => {
          const folder = join(outer, `${++runs}`);
          await inlineBake(planned, folder, { frames: { first: 1, last: 2 } });
          writeFileSync(join(folder, '.loopswell', 'wrong.jsonl'), wrong);
          await inlineBake(planned, folder);
          expect(fileHashes(folder)).toEqual(expected);
        }),
        { numRuns: 25 },
      );
    });
  });

  it('is no line of ours whatever it holds', () => {
    fc.assert(
      fc.property(fc.jsonValue(), (value) => {
        expect(isJournalLine(value)).toBe(false);
      }),
    );
  });
});
