import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

/** A program of another maker that checks our files. */
export interface ForeignProgram {
  readonly name: string;
  /**
   * Whether tests that need it may be left out: it is missing, and this is not CI. On CI the tests run and fail, so
   * that a check cannot vanish unseen.
   */
  readonly skip: boolean;
  /**
   * Runs it and returns what it printed.
   * @throws Error where it is missing, or exits with another status than 0
   */
  readonly run: (...args: string[]) => string;
}

/** The program of a name on this machine, e.g. `oiiotool`. Debian: openimageio-tools, openexr, pngcheck. */
export function externalProgram(name: string): ForeignProgram {
  const found = spawnSync('sh', ['-c', `command -v ${name}`]).status === 0;
  return {
    name,
    skip: !found && process.env.CI !== 'true',
    run(...args) {
      const { error, status, stdout, stderr } = spawnSync(name, args, { encoding: 'utf8' });
      if (error !== undefined) throw new Error(`${name} cannot be run: ${error.message}`);
      if (status !== 0)
        throw new Error(`${name} ${args.join(' ')} exited with ${status}: ${stdout}${stderr}`);
      return stdout + stderr;
    },
  };
}

/** Calls `body` with a new folder that is gone afterwards. */
export function withTemporaryFolder<Result>(body: (folder: string) => Result): Result {
  const folder = mkdtempSync(join(tmpdir(), 'loopswell-test-'));
  try {
    return body(folder);
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}
