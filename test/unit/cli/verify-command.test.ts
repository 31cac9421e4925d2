import { readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { EXIT_STATUS, type VerifyReport } from '../../../src/index.ts';
import { TINY_SEA_YAML } from '../../support/tiny-seas.ts';
import { capturedIo, inNewFolder, type Outcome, outcomeOf } from './captured-io.ts';

const run = (...argv: string[]): Promise<Outcome> => outcomeOf(argv, capturedIo());

/** A finished tiny bake. */
async function onBake(test: (folder: string) => Promise<void>): Promise<void> {
  await inNewFolder(async (root) => {
    const sea = join(root, 'tiny.yaml');
    writeFileSync(sea, TINY_SEA_YAML);
    const folder = join(root, 'baked');
    expect((await run('bake', sea, '-o', folder, '--threads', '0', '-q')).status).toBe(EXIT_STATUS.done);
    await test(folder);
  });
}

describe('verify', () => {
  it('prints a row for each question and ends with 0 where all is well', async () => {
    await onBake(async (folder) => {
      const { status, stdout } = await run('verify', folder);
      expect(stdout).toMatch(/^ok {2,}files +bake/m);
      expect(stdout).toMatch(/^ok {2,}dispersion +c0/m);
      expect(stdout).toMatch(/\d+ passed, 0 failed, \d+ not applicable\./);
      expect(status).toBe(EXIT_STATUS.done);
    });
  });

  it('ends with 1 and names the check where a byte was changed', async () => {
    await onBake(async (folder) => {
      const path = join(folder, 'c0', 'normal.0002.png');
      const bytes = readFileSync(path);
      bytes[bytes.length - 20] ^= 1;
      writeFileSync(path, bytes);
      const { status, stdout, stderr } = await run('verify', folder);
      expect(status).toBe(EXIT_STATUS.verificationFailed);
      expect(stdout).toMatch(/^FAIL {2}files/m);
      expect(stderr).toMatch(/\d+ of \d+ checks failed/);
    });
  });

  it('prints its report as JSON, of some frames or of the quick checks', async () => {
    await onBake(async (folder) => {
      const report = JSON.parse(
        (await run('verify', folder, '--json', '--frames', '2-3')).stdout,
      ) as VerifyReport;
      expect(report.passed).toBe(true);
      // What needs the whole loop is not judged.
      expect(report.checks.find(({ name }) => name === 'dispersion')?.passed).toBeNull();
      const quick = JSON.parse((await run('verify', folder, '--json', '--quick')).stdout) as VerifyReport;
      expect(quick.checks.map(({ name }) => name)).toContain('files');
      expect(quick.checks.length).toBeLessThan(report.checks.length);
    });
  });

  it('refuses a folder without a bake, and frames outside the loop', async () => {
    await inNewFolder(async (root) => {
      const { status, stderr } = await run('verify', root);
      expect(status).toBe(EXIT_STATUS.readWrite);
      expect(stderr).toContain('manifest.json');
    });
    await onBake(async (folder) => {
      expect((await run('verify', folder, '--frames', '90-99')).status).toBe(EXIT_STATUS.usage);
    });
  });
});
