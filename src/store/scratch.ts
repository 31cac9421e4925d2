import { closeSync, openSync, readSync } from 'node:fs';
import { ReadWriteError } from '../errors.ts';
import { fileError } from './file-errors.ts';
import { insidePath } from './safe-path.ts';

/**
 * Reads the same stretch of many files, one behind the other: a block of rows of every frame of a loop, say, where the
 * frames together do not fit in memory. Files are opened one at a time, so their number has no limit.
 * @param out receives `byteLength` bytes of each file, in the order of the paths; the caller's
 * @param relativePaths files in the folder
 * @param byteOffset where the stretch begins in each
 * @param byteLength its length; `out` has room for this times the number of files, or more
 * @throws ReadWriteError where a file is missing or ends before the stretch does
 */
export function fillFromFiles(
  out: Uint8Array,
  folder: string,
  relativePaths: readonly string[],
  byteOffset: number,
  byteLength: number,
): void {
  for (const [f, relativePath] of relativePaths.entries()) {
    const path = insidePath(folder, relativePath);
    const stretch = out.subarray(f * byteLength, (f + 1) * byteLength);
    if (stretch.length !== byteLength)
      throw new RangeError(`No room for file ${f} of ${relativePaths.length}.`);
    let read: number;
    try {
      read = bytesRead(path, stretch, byteOffset);
    } catch (cause) {
      throw fileError('read', path, cause);
    }
    if (read !== byteLength) {
      const found = `${read} bytes of ${byteLength} from byte ${byteOffset} on`;
      throw new ReadWriteError(
        `${path} ends too soon: it has ${found}. Remove it and run the same command again.`,
      );
    }
  }
}

/** Fills `out` from a file as far as that goes and returns how far. */
function bytesRead(path: string, out: Uint8Array, byteOffset: number): number {
  const file = openSync(path, 'r');
  try {
    let total = 0;
    while (total < out.length) {
      const read = readSync(file, out, total, out.length - total, byteOffset + total);
      if (read === 0) break;
      total += read;
    }
    return total;
  } finally {
    closeSync(file);
  }
}
