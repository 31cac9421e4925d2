import {
  type Dirent,
  existsSync,
  readdirSync,
  readFileSync,
  rmdirSync,
  rmSync,
  type Stats,
  statfsSync,
  statSync,
} from 'node:fs';
import { dirname, join, relative, resolve, sep } from 'node:path';
import { CannotCreateError, InputError } from '../errors.ts';
import { sha256 } from '../hash.ts';
import { fileError, systemCode } from './file-errors.ts';
import { insidePath } from './safe-path.ts';

/*
 * A bake folder: what is in it, and removing from it. Paths are relative to the folder with `/` between their parts.
 */

/**
 * All files in a folder and its folders, sorted; none where the folder does not exist yet. Symbolic links are listed but
 * not followed.
 * @throws ReadWriteError
 */
export function filesIn(folder: string): string[] {
  const root = resolve(folder);
  let entries: Dirent[];
  try {
    entries = readdirSync(root, { recursive: true, withFileTypes: true });
  } catch (cause) {
    if (systemCode(cause) === 'ENOENT' && !existsSync(root)) return [];
    throw fileError('read', root, cause);
  }
  return entries
    .filter((entry) => !entry.isDirectory())
    .map((entry) => relative(root, join(entry.parentPath, entry.name)).split(sep).join('/'))
    .sort();
}

/**
 * Checks that a folder is there or can be made there.
 * @throws CannotCreateError where something else is in its place; ReadWriteError
 */
export function requireFolderPlace(folder: string): void {
  const path = resolve(folder);
  let status: Stats | undefined;
  try {
    status = statSync(path, { throwIfNoEntry: false });
  } catch (cause) {
    throw fileError('create', path, cause);
  }
  if (status?.isDirectory() === false) {
    throw new CannotCreateError(
      `Cannot create ${path}: a file is in the place of the folder. Choose another path or move that file away.`,
    );
  }
}

/**
 * Whether there is a file of that path.
 * @throws ReadWriteError where the system does not say
 */
export function hasFile(folder: string, relativePath: string): boolean {
  return fileStatus(folder, relativePath)?.isFile() ?? false;
}

/**
 * What the system says about a path; undefined where there is nothing.
 * @throws ReadWriteError where it does not say
 */
export function fileStatus(folder: string, relativePath: string): Stats | undefined {
  const path = insidePath(folder, relativePath);
  try {
    return statSync(path, { throwIfNoEntry: false });
  } catch (cause) {
    if (systemCode(cause) === 'ENOTDIR') return undefined;
    throw fileError('read', path, cause);
  }
}

/**
 * The bytes of a file, the caller's.
 * @throws ReadWriteError
 */
export function fileBytes(folder: string, relativePath: string): Uint8Array {
  const path = insidePath(folder, relativePath);
  try {
    return readFileSync(path);
  } catch (cause) {
    throw fileError('read', path, cause);
  }
}

/** Size and hash of a file, as journals and manifests state them. */
export interface FileDigest {
  readonly bytes: number;
  /** `sha256:<hex>`. */
  readonly sha256: string;
}

/**
 * The text of a file that anybody may have put there: never more than a stated size is read.
 * @param largestBytes what a file of this kind can have at most
 * @throws InputError where it is larger; ReadWriteError
 */
export function fileText(folder: string, relativePath: string, largestBytes: number): string {
  const size = fileStatus(folder, relativePath)?.size ?? 0;
  if (size > largestBytes) {
    throw new InputError(insidePath(folder, relativePath), [
      {
        path: '',
        line: 0,
        column: 0,
        expected: `at most ${largestBytes} bytes`,
        found: `${size}`,
        remedy: 'This is no file of ours: move it away.',
      },
    ]);
  }
  return new TextDecoder().decode(fileBytes(folder, relativePath));
}

/**
 * Whether a file is there with the size and hash that a journal or manifest states. A file of another size is not read.
 * @throws ReadWriteError
 */
export function isIntact(folder: string, digest: FileDigest & { readonly path: string }): boolean {
  return hasSize(folder, digest) && sha256(fileBytes(folder, digest.path)) === digest.sha256;
}

/**
 * Whether a file is there with the size that a journal or manifest states: a look that costs next to nothing.
 * @throws ReadWriteError
 */
export function hasSize(
  folder: string,
  { path, bytes }: { readonly path: string; readonly bytes: number },
): boolean {
  const status = fileStatus(folder, path);
  return status?.isFile() === true && status.size === bytes;
}

/**
 * Removes the named files and no other; those that are gone already do not matter. Folders that this empties go too,
 * up to the bake folder itself, which stays.
 * @throws InputError for a path that leaves the folder, before anything is removed; ReadWriteError
 */
export function removeFiles(folder: string, relativePaths: readonly string[]): void {
  const root = resolve(folder);
  const paths = relativePaths.map((relativePath) => insidePath(root, relativePath));
  for (const path of paths) {
    try {
      rmSync(path, { force: true });
    } catch (cause) {
      throw fileError('remove', path, cause);
    }
  }
  for (const path of paths) removeEmptyFolders(dirname(path), root);
}

function removeEmptyFolders(from: string, root: string): void {
  for (let folder = from; folder !== root; folder = dirname(folder)) {
    try {
      rmdirSync(folder);
    } catch {
      // Not empty, or gone: either way the folders above are not ours to touch.
      return;
    }
  }
}

/**
 * Free space for this user where a folder is or will be, bytes.
 * @throws ReadWriteError
 */
export function freeBytes(folder: string): number {
  let place = resolve(folder);
  while (!existsSync(place) && dirname(place) !== place) place = dirname(place);
  try {
    const { bavail, bsize } = statfsSync(place);
    return bavail * bsize;
  } catch (cause) {
    throw fileError('read', place, cause);
  }
}
