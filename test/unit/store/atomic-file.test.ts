import {
  chmodSync,
  existsSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  statSync,
  writeFileSync,
} from 'node:fs';
import { join } from 'node:path';
import { expect, it } from 'vitest';
import { CannotCreateError, InputError, type LoopswellError } from '../../../src/errors.ts';
import { makeFolders, writeFileAtomic, writeFileOnce } from '../../../src/store/atomic-file.ts';
import { withTemporaryFolder } from '../../support/foreign-program.ts';

/** The error that `body` raises. */
function raised(body: () => void): unknown {
  try {
    body();
    return undefined;
  } catch (error) {
    return error;
  }
}

it('writes bytes and texts, makes folders, replaces a file, and leaves nothing else', () => {
  withTemporaryFolder((folder) => {
    const bytes = Uint8Array.from({ length: 100_000 }, (_, i) => i);
    writeFileAtomic(folder, 'c0/deep/displacement.0001.exr', bytes.subarray(5));
    expect(Uint8Array.from(readFileSync(join(folder, 'c0/deep/displacement.0001.exr')))).toEqual(
      bytes.subarray(5),
    );
    writeFileAtomic(folder, 'manifest.json', '{"unit":"λ"}', { sync: true });
    writeFileAtomic(folder, 'manifest.json', '{}', { sync: true });
    expect(readFileSync(join(folder, 'manifest.json'), 'utf8')).toBe('{}');
    writeFileAtomic(folder, 'empty', new Uint8Array(0));
    expect(statSync(join(folder, 'empty')).size).toBe(0);
    expect(readdirSync(folder, { recursive: true }).sort()).toEqual([
      'c0',
      'c0/deep',
      'c0/deep/displacement.0001.exr',
      'empty',
      'manifest.json',
    ]);
  });
});

it('replaces the file as a whole: a reader that has the old one open keeps the old bytes', () => {
  withTemporaryFolder((folder) => {
    writeFileAtomic(folder, 'frame', 'old');
    const before = statSync(join(folder, 'frame')).ino;
    writeFileAtomic(folder, 'frame', 'new');
    expect(statSync(join(folder, 'frame')).ino).not.toBe(before);
  });
});

it('says 73, the path and a remedy where the place cannot be used, and leaves no temporary', () => {
  withTemporaryFolder((folder) => {
    writeFileSync(join(folder, 'file'), '');
    mkdirSync(join(folder, 'taken', 'inner'), { recursive: true });
    const cases: [relativePath: string, code: RegExp][] = [
      ['file/frame.exr', /EEXIST|ENOTDIR/],
      ['taken', /EISDIR|ENOTEMPTY|EEXIST/],
      [`${'n'.repeat(300)}`, /ENAMETOOLONG/],
      [`${'n'.repeat(300)}/frame.exr`, /ENAMETOOLONG/],
    ];
    for (const [relativePath, code] of cases) {
      const error = raised(() => writeFileAtomic(folder, relativePath, 'x'));
      expect(error, relativePath).toBeInstanceOf(CannotCreateError);
      const { message, exitStatus } = error as LoopswellError;
      expect(exitStatus).toBe(73);
      expect(message).toMatch(code);
      expect(message).toContain(join(folder, relativePath));
      expect(message).toMatch(/Choose a/);
    }
    expect(readdirSync(folder, { recursive: true }).sort()).toEqual(['file', 'taken', 'taken/inner']);
  });
});

// Root may write anywhere, so this needs another user.
it.skipIf(process.getuid?.() === 0)('says 73 where permission is denied', () => {
  withTemporaryFolder((folder) => {
    chmodSync(folder, 0o500);
    expect(() => writeFileAtomic(folder, 'frame', 'x')).toThrow(/permission denied \(EACCES\)/);
    chmodSync(folder, 0o700);
  });
});

it('never writes outside its folder', () => {
  withTemporaryFolder((outer) => {
    const folder = join(outer, 'bake');
    expect(() => writeFileAtomic(folder, '../escaped', 'x')).toThrow(InputError);
    expect(existsSync(join(outer, 'escaped'))).toBe(false);
    expect(existsSync(folder)).toBe(false);
  });
});

it('makes no folder where a missing one means that it was taken away', () => {
  withTemporaryFolder((folder) => {
    expect(() => writeFileAtomic(folder, 'c0/frame', 'x', { makeFolders: false })).toThrow(/ENOENT/);
    makeFolders(folder, ['c0', 'c1/deep', 'c0']);
    writeFileAtomic(folder, 'c0/frame', 'x', { makeFolders: false });
    expect(readdirSync(folder, { recursive: true }).sort()).toEqual(['c0', 'c0/frame', 'c1', 'c1/deep']);
    expect(() => makeFolders(folder, ['c0/frame/x'])).toThrow(CannotCreateError);
    expect(() => makeFolders(folder, ['../outside'])).toThrow(InputError);
  });
});

it('writes a file once: who comes later changes nothing and is told', () => {
  withTemporaryFolder((folder) => {
    expect(writeFileOnce(folder, 'work/plan.json', 'first')).toBe(true);
    expect(writeFileOnce(folder, 'work/plan.json', 'second')).toBe(false);
    expect(readFileSync(join(folder, 'work/plan.json'), 'utf8')).toBe('first');
    expect(readdirSync(join(folder, 'work'))).toEqual(['plan.json']);
    mkdirSync(join(folder, 'taken'));
    expect(writeFileOnce(folder, 'taken', 'x')).toBe(false);
  });
});
