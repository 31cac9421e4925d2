import {
  closeSync,
  existsSync,
  fsyncSync,
  linkSync,
  mkdirSync,
  openSync,
  renameSync,
  rmSync,
  statSync,
  writeSync,
} from 'node:fs';
import { dirname, join } from 'node:path';
import { type FileAction, fileError, systemCode } from './file-errors.ts';
import { insidePath } from './safe-path.ts';
import { temporaryName } from './temporary-name.ts';

export interface WriteOptions {
  /**
   * Wait until the disk itself has the bytes, so that the file survives a power cut: for manifests and the like, not
   * for frames, which a resumed bake makes again. Default false.
   */
  readonly sync?: boolean;
  /** Make missing folders. Default true; false where a missing folder means that somebody took it away. */
  readonly makeFolders?: boolean;
  /** Whether the file may be run as a program. Default false. */
  readonly executable?: boolean;
}

/**
 * Writes a file so that a reader finds either all of it or none: into a temporary in the same folder, then renamed over
 * the name. Synchronous: frames are written inside worker threads.
 * @param folder root of the bake
 * @param relativePath where in it, `/` between folders
 * @param bytes read only
 * @throws InputError where the path leaves the folder; CannotCreateError, ReadWriteError: then no temporary is left
 */
export function writeFileAtomic(
  folder: string,
  relativePath: string,
  bytes: Uint8Array | string,
  options: WriteOptions = {},
): void {
  placeFile(folder, relativePath, bytes, options, (temporary, path) => {
    renameSync(temporary, path);
    return true;
  });
}

/**
 * Writes a file unless there is one of that name: of several processes that do this at once, one succeeds. Rests on
 * hard links, which refuse a taken name on every system; where the file system has none, on a look beforehand.
 * @returns whether this call made the file
 * @throws as `writeFileAtomic`
 */
export function writeFileOnce(
  folder: string,
  relativePath: string,
  bytes: Uint8Array | string,
  options: WriteOptions = {},
): boolean {
  return placeFile(folder, relativePath, bytes, options, (temporary, path) => {
    try {
      linkSync(temporary, path);
      return true;
    } catch (cause) {
      if (systemCode(cause) === 'EEXIST') return false;
      if (!NO_LINKS.has(systemCode(cause))) throw cause;
      if (existsSync(path)) return false;
      renameSync(temporary, path);
      return true;
    } finally {
      removeQuietly(temporary);
    }
  });
}

/** What file systems without hard links answer. */
const NO_LINKS = new Set(['EPERM', 'ENOTSUP', 'EOPNOTSUPP', 'ENOSYS', 'EMLINK']);

/** Writes the bytes under a temporary name beside the path and has `place` give them their own. */
function placeFile(
  folder: string,
  relativePath: string,
  bytes: Uint8Array | string,
  { sync = false, makeFolders = true, executable = false }: WriteOptions,
  place: (temporary: string, path: string) => boolean,
): boolean {
  const path = insidePath(folder, relativePath);
  const parent = dirname(path);
  const temporary = join(parent, temporaryName());
  const data = typeof bytes === 'string' ? new TextEncoder().encode(bytes) : bytes;
  let action: FileAction = 'create';
  try {
    if (makeFolders) makeFolder(parent);
    const file = openSync(temporary, 'wx', executable ? 0o777 : 0o666);
    try {
      action = 'write';
      writeWhole(file, data);
      if (sync) fsyncSync(file);
    } finally {
      closeSync(file);
    }
    const placed = place(temporary, path);
    if (sync) syncFolder(parent);
    return placed;
  } catch (cause) {
    removeQuietly(temporary);
    throw fileError(action, path, cause);
  }
}

/**
 * Makes folders inside a folder, and that one, where they are missing.
 * @throws InputError where a path leaves the folder; CannotCreateError, ReadWriteError
 */
export function makeFolders(folder: string, relativePaths: readonly string[]): void {
  for (const path of relativePaths.map((relativePath) => insidePath(folder, relativePath))) {
    try {
      makeFolder(path);
    } catch (cause) {
      throw fileError('create', path, cause);
    }
  }
}

/**
 * Makes a folder and those above it. Not by the system's recursive call, which says that there is no such folder where
 * the truth is that the disk is read-only.
 */
export function makeFolder(path: string): void {
  try {
    mkdirSync(path);
  } catch (cause) {
    const parent = dirname(path);
    if (systemCode(cause) === 'ENOENT' && parent !== path) {
      makeFolder(parent);
      makeFolder(path);
    } else if (!isFolder(path)) throw cause;
  }
}

function isFolder(path: string): boolean {
  return statSync(path, { throwIfNoEntry: false })?.isDirectory() ?? false;
}

/** A single write may take only part of the bytes: on a full disk, or beyond 2 GiB. */
function writeWhole(file: number, data: Uint8Array): void {
  let written = 0;
  while (written < data.length) written += writeSync(file, data, written);
}

/** Makes the new name itself durable. Windows cannot open folders and needs no such step. */
function syncFolder(path: string): void {
  if (process.platform === 'win32') return;
  const folder = openSync(path, 'r');
  try {
    fsyncSync(folder);
  } finally {
    closeSync(folder);
  }
}

/** The write has failed already: that is the error to report, not what becomes of its temporary. */
function removeQuietly(path: string): void {
  try {
    rmSync(path, { force: true });
  } catch {
    // Left to the next run's cleaning.
  }
}
