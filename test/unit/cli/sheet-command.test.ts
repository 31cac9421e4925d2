import { readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { PNG } from 'pngjs';
import { describe, expect, it } from 'vitest';
import { EXIT_STATUS } from '../../../src/index.ts';
import { TINY_SEA_YAML } from '../../support/tiny-seas.ts';
import { capturedIo, inNewFolder, outcomeOf } from './captured-io.ts';

describe('sheet', () => {
  it('draws every map of a bake, at the size asked for', async () => {
    await inNewFolder(async (root) => {
      const sea = join(root, 'tiny.yaml');
      writeFileSync(sea, TINY_SEA_YAML);
      const folder = join(root, 'baked');
      await outcomeOf(['bake', sea, '-o', folder, '--threads', '0', '-q'], capturedIo());
      const path = join(root, 'sheet.png');
      const { status, stdout } = await outcomeOf(
        ['sheet', folder, '-o', path, '--pictures', '2', '--cell', '48'],
        capturedIo(),
      );
      expect(status).toBe(EXIT_STATUS.done);
      expect(stdout).toBe(`${path}\n`);

      const { width, height, data } = PNG.sync.read(readFileSync(path));
      // One cascade, three maps of two pictures, a line between pictures and a gap round each group.
      expect([width, height]).toEqual([8 + 3 * (2 * 49 + 8), 8 + 48 + 8]);
      // The middle group holds normals: blue, as the surface mostly looks up.
      const at = 4 * (32 * width + 8 + 98 + 8 + 24);
      const [red, green, blue] = data.subarray(at, at + 3);
      expect(blue).toBeGreaterThan(200);
      expect(Math.abs(red - 128) + Math.abs(green - 128)).toBeLessThan(120);
    });
  });

  it('refuses sizes that make no picture', async () => {
    const { status, stderr } = await outcomeOf(['sheet', 'nowhere', '--cell', '3'], capturedIo());
    expect(status).toBe(EXIT_STATUS.usage);
    expect(stderr).toContain('from 16 to 4096');
  });
});
