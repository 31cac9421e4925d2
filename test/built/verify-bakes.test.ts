import { afterAll, describe, expect, it } from 'vitest';
import { ENGINE_NAMES } from '../../src/plan/plan.ts';
import { CHECKS } from '../../src/verify/registry.ts';
import { verifyBake } from '../../src/verify/verify-bake.ts';
import { bakeShelf, SMALL_SEAS } from '../support/small-bakes.ts';

const shelf = bakeShelf();
afterAll(shelf.remove);

describe('a sound bake', () => {
  it.each(Object.keys(SMALL_SEAS))('passes every check: %s', async (name) => {
    const report = await verifyBake(await shelf.bake(name));
    const failed = report.checks.filter(({ passed }) => passed === false);
    expect(failed).toEqual([]);
    expect(report.passed).toBe(true);
  });

  it.each(ENGINE_NAMES)('passes by whatever engine made it: %s', async (engine) => {
    const { checks } = await verifyBake(await shelf.bake('spoilable', {}, engine));
    expect(checks.filter(({ passed }) => passed === false)).toEqual([]);
  });

  it('of every map leaves no question open', async () => {
    const { checks } = await verifyBake(await shelf.bake('every map'));
    expect(checks.filter(({ passed }) => passed === null)).toEqual([]);
    for (const { name } of CHECKS) expect(checks.map((check) => check.name)).toContain(name);
  });

  it.each([
    ['height alone', ['horizontal', 'derivatives', 'foam']],
    ['slope alone', ['heights', 'dispersion', 'direction', 'spectrum', 'horizontal', 'derivatives', 'foam']],
  ])('says what it cannot judge without the map for it: %s', async (name, open) => {
    const { checks } = await verifyBake(await shelf.bake(name));
    const found = checks.filter(({ passed }) => passed === null).map((check) => check.name);
    expect([...new Set(found)]).toEqual(expect.arrayContaining(open));
    expect([...new Set(found)].filter((check) => !open.includes(check))).toEqual([]);
  });

  it.each([1, 2, 3, 5])('of %i frames passes', async (frames) => {
    const report = await verifyBake(await shelf.bake('tiny', { loop: { frames, frameRate: 4 } }));
    expect(report.checks.filter(({ passed }) => passed === false)).toEqual([]);
  });
});
