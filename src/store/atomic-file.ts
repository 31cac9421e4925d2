import { closeSync, fsyncSync, mkdirSync, openSync, renameSync, rmSync, writeSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { type FileAction, fileError } from './file-errors.ts';
import { insidePath } from './safe-path.ts';
import { temporaryName } from './temporary-name.ts';

export interface WriteOptions {
  /**
   * Wait until the disk itself has the bytes, so that the file survives a power cut: for manifests and the like, not
   * for frames, which a resumed bake makes again. Default false.
   */
  readonly sync?: boolean;
}

/**
 * Writes a file so that a reader finds either all of it or none: into a temporary in the same folder, then renamed over
 * the name. Folders are made as needed. Synchronous: frames are written inside worker threads.
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
  const path = insidePath(folder, relativePath);
  const parent = dirname(path);
  const temporary = join(parent, temporaryName());
  const data = typeof bytes === 'string' ? new TextEncoder().encode(bytes) : bytes;
  let action: FileAction = 'create';
  try {
    mkdirSync(parent, { recursive: true });
    const file = openSync(temporary, 'wx');
    try {
      action = 'write';
      writeWhole(file, data);
      if (options.sync === true) fsyncSync(file);
    } finally {
      closeSync(file);
    }
    renameSync(temporary, path);
    if (options.sync === true) syncFolder(parent);
  } catch (cause) {
    removeQuietly(temporary);
    throw fileError(action, path, cause);
  }
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
