import { rmSync, statSync } from 'node:fs';
import { posix } from 'node:path';
import { writeFileAtomic } from './atomic-file.ts';
import { fileStatus, filesIn } from './bake-folder.ts';
import { fileError } from './file-errors.ts';
import { insidePath } from './safe-path.ts';
import { HOST, type TemporaryOwner, temporaryName, temporaryOwner } from './temporary-name.ts';

/** A living process writes a temporary in one go; one unchanged for this long is nobody's. */
const STALE_MS = 3_600_000;

/**
 * Removes what killed processes left half written in a bake folder: at once where the process ran on this host and is
 * gone; after an hour without change where it ran elsewhere, or where its number is in use again.
 * @param idleHere whether this process writes nothing there: what bears its own number is then of an earlier process, as
 *   in a container, where everyone is number 1
 * @returns the removed paths, relative to the folder
 * @throws ReadWriteError, CannotCreateError
 */
export function removeStaleTemporaries(folder: string, idleHere: boolean): string[] {
  const temporaries = temporariesIn(folder);
  if (temporaries.length === 0) return [];
  const now = fileClockMs(folder);
  const removed: string[] = [];
  for (const { relativePath, owner } of temporaries) {
    const gone = owner.pid === process.pid ? idleHere : !isAlive(owner.pid);
    const dead = owner.host === HOST && gone;
    // Its writer, or another process that cleans, may finish with it at any moment.
    const changed = fileStatus(folder, relativePath)?.mtimeMs;
    if (changed === undefined || (!dead && now - changed < STALE_MS)) continue;
    remove(folder, relativePath);
    removed.push(relativePath);
  }
  return removed;
}

/**
 * Removes what threads of this process left half written when they were ended. Only for when none of them writes any
 * more.
 * @throws ReadWriteError
 */
export function removeOwnTemporaries(folder: string): void {
  for (const { relativePath, owner } of temporariesIn(folder)) {
    if (owner.host === HOST && owner.pid === process.pid) remove(folder, relativePath);
  }
}

function temporariesIn(folder: string): { readonly relativePath: string; readonly owner: TemporaryOwner }[] {
  return filesIn(folder).flatMap((relativePath) => {
    const owner = temporaryOwner(posix.basename(relativePath));
    return owner === null ? [] : [{ relativePath, owner }];
  });
}

function remove(folder: string, relativePath: string): void {
  const path = insidePath(folder, relativePath);
  try {
    rmSync(path, { force: true });
  } catch (cause) {
    throw fileError('remove', path, cause);
  }
}

/**
 * The time by the clock that stamps files in this folder, ms since 1970: that of the file server, which need not agree
 * with this host's.
 */
function fileClockMs(folder: string): number {
  const probe = temporaryName();
  writeFileAtomic(folder, probe, new Uint8Array(0));
  const path = insidePath(folder, probe);
  try {
    return statSync(path).mtimeMs;
  } catch (cause) {
    throw fileError('read', path, cause);
  } finally {
    rmSync(path, { force: true });
  }
}

/** Whether a process of this number runs on this host. */
export function isAlive(pid: number): boolean {
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    // EPERM: it runs, as another user.
    return error instanceof Error && 'code' in error && error.code === 'EPERM';
  }
}
