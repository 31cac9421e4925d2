import { posix, resolve, sep, win32 } from 'node:path';
import { InputError } from '../errors.ts';

/**
 * The absolute path of a file inside a folder, from a path that may come out of a manifest or a journal of another
 * person. `/` separates on every system, so that a bake can move between them.
 *
 * This judges the text of the path alone: a symbolic link that the user put into the folder is followed.
 * @param root the folder, in any form
 * @param relative path from there, e.g. `c0/displacement.0001.exr`
 * @throws InputError where the path is empty, absolute, holds a backslash or a NUL, or leaves the folder
 */
export function insidePath(root: string, relative: string): string {
  const fault = pathFault(relative);
  if (fault !== null) {
    const remedy = 'Use paths relative to the folder of the bake, without "..".';
    const problem = {
      path: '',
      line: 0,
      column: 0,
      expected: 'a path inside the folder',
      found: fault,
      remedy,
    };
    throw new InputError(JSON.stringify(relative), [problem]);
  }
  return resolve(root, relative.split('/').join(sep));
}

function pathFault(relative: string): string | null {
  if (relative === '') return 'nothing';
  if (relative.includes('\0')) return 'a NUL';
  if (relative.includes('\\')) return 'a backslash';
  // `C:x` is relative to a drive's own folder: isAbsolute does not see it.
  if (posix.isAbsolute(relative) || win32.isAbsolute(relative) || /^[A-Za-z]:/.test(relative)) {
    return 'an absolute path';
  }
  const segments = posix.normalize(relative).split('/');
  if (segments[0] === '..') return 'a path that leaves it';
  if (segments[0] === '.') return 'the folder itself';
  return null;
}
