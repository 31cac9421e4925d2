import { CannotCreateError, ReadWriteError } from '../errors.ts';

/** What was being done to a file or folder when the system refused. */
export type FileAction = 'create' | 'write' | 'read' | 'remove';

/** What went wrong and what the user can do, by the system's error code. */
const ADVICE: Readonly<Record<string, readonly [trouble: string, remedy: string]>> = {
  EACCES: ['permission denied', 'Choose a folder you may write to, or change its permissions.'],
  EPERM: ['the system does not permit it', 'Choose another folder.'],
  EROFS: ['the file system is read-only', 'Choose a folder on another disk.'],
  ENOENT: ['there is no such file or folder', 'Check the path, and that nothing removes files meanwhile.'],
  ENOTDIR: ['a part of the path is a file, not a folder', 'Choose another path or move that file away.'],
  EISDIR: ['a folder is in the place of the file', 'Choose another path or move that folder away.'],
  EEXIST: ['something else has that name', 'Choose another path or move it away.'],
  ENOTEMPTY: ['the folder is not empty', 'Choose another path.'],
  ENAMETOOLONG: ['the name is too long', 'Choose a shorter path.'],
  ELOOP: ['its links lead in a circle', 'Choose another path.'],
  ENOSPC: [
    'the disk is full',
    'Free space, or choose another disk, and run the same command again: it resumes.',
  ],
  EDQUOT: ['the disk quota is used up', 'Free space and run the same command again: it resumes.'],
  EFBIG: ['the file is too large for this file system', 'Choose another disk.'],
  EMFILE: ['too many files are open', 'Raise the limit (ulimit -n) or use fewer threads.'],
  ENFILE: ['too many files are open on this machine', 'Wait, or raise the limit of the system.'],
  EIO: ['the disk reports an error', 'Check the disk or the network share.'],
  ESTALE: ['the network share has changed underneath', 'Run the same command again: it resumes.'],
};

/** Codes that mean a place cannot be used at all, rather than that reading or writing broke down there. */
const UNUSABLE_PLACE = new Set([
  'EACCES',
  'EPERM',
  'EROFS',
  'ENOENT',
  'ENOTDIR',
  'EISDIR',
  'EEXIST',
  'ENOTEMPTY',
  'ENAMETOOLONG',
  'ELOOP',
]);

/** The system's code of an error, e.g. `ENOENT`; empty where it has none. */
export function systemCode(cause: unknown): string {
  if (!(cause instanceof Error) || !('code' in cause)) return '';
  return typeof cause.code === 'string' ? cause.code : '';
}

/**
 * The error to raise when the system refused to do something to a file: what, where, why and what to do.
 * @param cause what was thrown: by a call of node:fs, or by our own code in between, which is no trouble with a file
 * @returns CannotCreateError (73) where the place cannot be used for output, else ReadWriteError (74); an error that
 *   is not the system's as it is
 */
export function fileError(action: FileAction, path: string, cause: unknown): unknown {
  const code = systemCode(cause);
  if (code === '' || !(cause instanceof Error)) return cause;
  const [trouble, remedy] = ADVICE[code] ?? [cause.message, 'Check the disk and run the same command again.'];
  const message = `Cannot ${action} ${path}: ${trouble} (${code}). ${remedy}`;
  const cannotCreate = (action === 'create' || action === 'write') && UNUSABLE_PLACE.has(code);
  return cannotCreate ? new CannotCreateError(message, { cause }) : new ReadWriteError(message, { cause });
}
