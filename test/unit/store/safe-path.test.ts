import { resolve } from 'node:path';
import { expect, it } from 'vitest';
import { InputError } from '../../../src/errors.ts';
import { insidePath } from '../../../src/store/safe-path.ts';

it.each([
  ['manifest.json', '/bake/manifest.json'],
  ['c0/displacement.0001.exr', '/bake/c0/displacement.0001.exr'],
  ['c0/../c1/x', '/bake/c1/x'],
  ['./x', '/bake/x'],
  ['..x/...', '/bake/..x/...'],
  ['with space', '/bake/with space'],
])('"%s" is inside', (relative, path) => {
  expect(insidePath('/bake', relative)).toBe(resolve(path));
  expect(insidePath('/bake/sub/..', relative)).toBe(resolve(path));
});

it.each([
  '',
  '.',
  './',
  'a/..',
  '..',
  '../x',
  'c0/../../x',
  'c0/../../bake-2/x',
  '/etc/passwd',
  '//server/share',
  'C:\\x',
  'C:/x',
  'C:x',
  'c0\\x',
  '..\\x',
  'x\0.exr',
])('%j is refused', (relative) => {
  expect(() => insidePath('/bake', relative)).toThrow(InputError);
});

it('allows nothing outside even where the folder is the root of the disk', () => {
  expect(insidePath('/', 'x')).toBe(resolve('/x'));
  expect(() => insidePath('/', '../x')).toThrow(InputError);
});
