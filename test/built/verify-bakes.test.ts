import { afterAll, describe, expect, it } from 'vitest';
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
});
