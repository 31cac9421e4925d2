import { describe, expect, it } from 'vitest';
import type { FrameEntry, JournalLine } from '../../../src/bake/journal-entry.ts';
import { isJournalLine, isOfPlan } from '../../../src/bake/journal-entry.ts';
import { toldOf } from '../../../src/bake/told.ts';
import { planBake } from '../../../src/plan/plan-bake.ts';
import { tinyTwoCascadeSea } from '../../support/tiny-seas.ts';

const { plan } = planBake(tinyTwoCascadeSea());
const HASH = `sha256:${'0'.repeat(64)}`;
const FIGURES = { sum: 1, sumOfSquares: 2, min: -1, max: 1, clipped: 0 };

const FOAM: FrameEntry = {
  kind: 'foam',
  cascade: 1,
  frame: 2,
  files: [{ path: 'c1/foam.0003.png', bytes: 9, sha256: HASH }],
  statistics: { foam: [FIGURES] },
  heights: null,
  foldedTexels: null,
};

const FRAME: FrameEntry = {
  kind: 'frame',
  cascade: 0,
  frame: 7,
  files: ['c0/displacement.0008.exr', 'c0/normal.0008.png', '.loopswell/c0.00007.codes'].map((path) => ({
    path,
    bytes: 9,
    sha256: HASH,
  })),
  statistics: { displacement: [FIGURES, FIGURES, FIGURES], normal: [FIGURES, FIGURES, FIGURES] },
  heights: null,
  foldedTexels: 0,
};

describe('a line about a frame', () => {
  it('is one of this plan with its files and figures', () => {
    for (const entry of [FOAM, FRAME]) {
      expect(isJournalLine({ plan: plan.hash, ...entry })).toBe(true);
      expect(isOfPlan(plan, entry)).toBe(true);
    }
  });

  it.each([
    ['another file', { files: [{ ...FOAM.files[0], path: 'c1/foam.0004.png' }] }],
    ['a file outside', { files: [{ ...FOAM.files[0], path: '../../etc/passwd' }] }],
    ['no file', { files: [] }],
    ['one file more', { files: [...FOAM.files, { ...FOAM.files[0], path: 'notes.txt' }] }],
    ['another frame', { frame: 3 }],
    ['no frame of the loop', { frame: 8 }],
    ['another cascade', { cascade: 0 }],
    ['no cascade', { cascade: 2 }],
    ['no figures', { statistics: {} }],
    ['figures of too many channels', { statistics: { foam: [FIGURES, FIGURES] } }],
    ['figures of another map', { statistics: { jacobian: [FIGURES] } }],
    ['another kind', { kind: 'frame' as const }],
  ])('is none of this plan with %s', (_, change) => {
    expect(isOfPlan(plan, { ...FOAM, ...change })).toBe(false);
    const line = { plan: plan.hash, ...FOAM, ...change } as JournalLine;
    const { frames, notices } = toldOf(plan, [{ path: 'j', changedMs: 0, entries: [line], damagedLines: 0 }]);
    expect(frames).toEqual([]);
    expect(notices).toHaveLength(1);
  });

  it.each([
    { plan: 'sha256:1' },
    { cascade: -1 },
    { frame: 1.5 },
    { frame: 2 ** 60 },
    { files: [{ path: 'x', bytes: 1, sha256: 'md5' }] },
    { files: 'c1/foam.0003.png' },
    { statistics: { foam: [{ ...FIGURES, sum: null }] } },
    { statistics: { foam: [{ ...FIGURES, clipped: 0.5 }] } },
    { statistics: { whitecaps: [FIGURES] } },
    { statistics: [] },
    { kind: 'survey' },
  ])('has no such shape: %j', (change) => {
    expect(isJournalLine({ plan: plan.hash, ...FOAM, ...change })).toBe(false);
  });
});

describe('other lines', () => {
  it.each([
    [{ kind: 'begin', task: 'bake', host: 'h', pid: 1 }, true],
    [{ kind: 'begin', task: 'x'.repeat(2000), host: 'h', pid: 1 }, false],
    [{ kind: 'end', outcome: 'done' }, true],
    [{ kind: 'end', outcome: 'lost' }, false],
    [{ kind: 'level', cascade: 0, breakingCode: 65535, coverage: 0.1, note: null }, true],
    [{ kind: 'level', cascade: 0, breakingCode: 65536, coverage: 0.1, note: null }, false],
    [{ kind: 'level', cascade: 0, breakingCode: 1, coverage: 1.1, note: null }, false],
  ])('%j: %s', (line, isLine) => {
    expect(isJournalLine({ plan: plan.hash, ...line })).toBe(isLine);
  });

  it('about the level of a cascade that is not there or has no foam count for nothing', () => {
    const level = { plan: plan.hash, kind: 'level', breakingCode: 1, coverage: 0.1, note: null } as const;
    const calm = { ...plan, cascades: plan.cascades.map((cascade) => ({ ...cascade, foam: null })) };
    const journal = (cascade: number) => [
      { path: 'j', changedMs: 0, entries: [{ ...level, cascade }], damagedLines: 0 },
    ];
    expect(toldOf(plan, journal(1)).levels).toHaveLength(1);
    expect(toldOf(plan, journal(2)).levels).toEqual([]);
    expect(toldOf(calm, journal(1)).levels).toEqual([]);
  });
});
