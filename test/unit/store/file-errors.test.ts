import { expect, it } from 'vitest';
import type { LoopswellError } from '../../../src/errors.ts';
import { fileError, systemCode } from '../../../src/store/file-errors.ts';

/** An error as node:fs throws it. */
function systemError(code: string): Error {
  return Object.assign(new Error(`${code}: as the system words it`), { code });
}

it.each([
  // A place that cannot be used for output is 73; a disk that breaks down or fills up is 74, and so is all reading.
  ['create', 'EACCES', 73],
  ['create', 'EROFS', 73],
  ['create', 'ENOENT', 73],
  ['write', 'EISDIR', 73],
  ['create', 'ENOSPC', 74],
  ['write', 'ENOSPC', 74],
  ['write', 'EDQUOT', 74],
  ['write', 'EIO', 74],
  ['create', 'EMFILE', 74],
  ['read', 'EACCES', 74],
  ['read', 'ENOENT', 74],
  ['remove', 'EPERM', 74],
] as const)('%s refused with %s leads to exit status %i', (action, code, status) => {
  const cause = systemError(code);
  const error = fileError(action, '/bake/c0/frame', cause) as LoopswellError;
  expect(error.exitStatus).toBe(status);
  expect(error.message).toMatch(new RegExp(`^Cannot ${action} /bake/c0/frame: .+ \\(${code}\\)\\. .+\\.$`));
  expect(error.cause).toBe(cause);
});

it('says that a full disk is no loss', () => {
  expect((fileError('write', 'x', systemError('ENOSPC')) as Error).message).toContain('it resumes');
});

it('passes on what the system says where the code is not known', () => {
  expect((fileError('write', 'x', systemError('EWEIRD')) as Error).message).toContain(
    'EWEIRD: as the system words it (EWEIRD)',
  );
});

it('leaves an error alone that is not the system’s', () => {
  for (const cause of [new RangeError('Array buffer allocation failed'), new TypeError('no'), 'odd', null]) {
    expect(fileError('read', 'x', cause)).toBe(cause);
    expect(systemCode(cause)).toBe('');
  }
});
