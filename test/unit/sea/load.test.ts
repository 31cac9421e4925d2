import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, test } from 'vitest';
import { InputError, ReadWriteError } from '../../../src/errors.ts';
import { loadSea, presetNames, presetSummaries, presetText, seaText } from '../../../src/sea/load.ts';
import { parseSea } from '../../../src/sea/parse.ts';
import { seaWarnings } from '../../../src/sea/warnings.ts';
import { TINY_SEA_YAML, tinySea } from '../../support/tiny-seas.ts';

const folder = mkdtempSync(join(tmpdir(), 'loopswell-load-'));
afterAll(() => rmSync(folder, { recursive: true }));

function written(name: string, content: string | Uint8Array): string {
  const path = join(folder, name);
  writeFileSync(path, content);
  return path;
}

describe('files', () => {
  test('a sea file gives its name to the bake', () => {
    const path = written('my.bay.yaml', TINY_SEA_YAML);
    expect(seaText(path)).toEqual({ name: 'my.bay', source: path, text: TINY_SEA_YAML });
    expect(loadSea(path)).toEqual(tinySea());
  });

  test('problems carry the path', () => {
    const path = written('wrong.yaml', 'seaFile: 2');
    expect(() => loadSea(path)).toThrow(`${path}:1:10: seaFile`);
  });

  test('what is no text is refused before it is read', () => {
    expect(() => loadSea(written('picture.yaml', Uint8Array.of(0xff, 0xd8, 0xff)))).toThrow(
      /a text in UTF-8/,
    );
    expect(() => loadSea(written('film.yaml', new Uint8Array((1 << 20) + 1)))).toThrow(/at most 1 MiB/);
    expect(() => loadSea(folder)).toThrow(ReadWriteError);
  });

  test('what is not there names the nearest preset', () => {
    expect(() => loadSea('dmeo')).toThrow(InputError);
    expect(() => loadSea('dmeo')).toThrow(/one of the presets .*demo.*found neither. Did you mean `demo`/);
    expect(() => loadSea('./demo')).toThrow(/found neither/);
    expect(() => loadSea(`${folder}/none.yaml`)).toThrow(/Check the path/);
    expect(() => loadSea('a\0b')).toThrow(InputError);
    expect(() => presetText('../package')).toThrow(InputError);
  });
});

describe('presets', () => {
  test('there are at least eight, demo among them', () => {
    expect(presetNames().length).toBeGreaterThanOrEqual(8);
    expect(presetNames()).toContain('demo');
  });

  test.each(presetSummaries())('$name says what it is for in one line', ({ purpose }) => {
    expect(purpose.length).toBeGreaterThan(20);
    expect(purpose.length).toBeLessThanOrEqual(110);
  });

  test('purposes and titles differ', () => {
    expect(new Set(presetSummaries().map(({ purpose }) => purpose)).size).toBe(presetNames().length);
    expect(new Set(presetNames().map((name) => loadSea(name).title)).size).toBe(presetNames().length);
  });

  test.each(presetNames())(
    '%s is a sound sea without a warning of its own, and begins with the line for editors',
    (name) => {
      const text = presetText(name);
      expect(text.startsWith('# yaml-language-server: $schema=./sea.schema.json\n# ')).toBe(true);
      expect(parseSea(text)).toEqual(loadSea(name));
      expect(seaWarnings(loadSea(name))).toEqual([]);
    },
  );
});
