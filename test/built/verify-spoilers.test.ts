import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { soundManifest } from '../../src/verify/manifest-file.ts';
import { CHECKS } from '../../src/verify/registry.ts';
import { verifyBake } from '../../src/verify/verify-bake.ts';
import { bakeShelf } from '../support/small-bakes.ts';
import { copiedBake, SPOILERS } from '../support/spoilers.ts';

const shelf = bakeShelf();
const root = mkdtempSync(join(tmpdir(), 'loopswell-spoiled-'));
const table: string[] = [];

afterAll(() => {
  shelf.remove();
  rmSync(root, { recursive: true, force: true });
  console.log(['spoiled bake: checks that fail', ...table].join('\n'));
});

describe('a spoiled bake', () => {
  it.each(SPOILERS.map((spoiler, s) => ({ ...spoiler, s })))(
    '$name',
    async ({ name, sea = 'spoilable', twin, spoil, failing, s }) => {
      const sound = await shelf.bake(sea);
      const other = twin === undefined ? null : soundManifest(await shelf.bake(sea, twin));
      const folder = join(root, String(s));
      spoil(copiedBake(sound, folder), other);
      const report = await verifyBake(folder);
      const failed = new Set(
        report.checks.filter(({ passed }) => passed === false).map((check) => check.name),
      );
      const found = CHECKS.map((check) => check.name).filter((check) => failed.has(check));
      table.push(`${name}: ${found.join(', ')}`);
      rmSync(folder, { recursive: true });
      expect(found).toEqual(failing);
      expect(report.passed).toBe(false);
    },
  );
});

it('every check has been seen red', () => {
  const caught = new Set(SPOILERS.flatMap(({ failing }) => failing));
  expect(CHECKS.map(({ name }) => name).filter((name) => !caught.has(name))).toEqual([]);
});
