import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
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
    expect(seaText(path)).toMatchObject({ name: 'my.bay', source: path, text: TINY_SEA_YAML });
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

describe('files that a sea file refers to', () => {
  const TABLE = 'frequency,energy,direction,spread\n0.1,1,250,30\n0.2,2,250,30\n0.3,1,250,30\n';
  const measured = (keys: string): string =>
    `seaFile: 1\ntitle: Measured\nsystems:\n  - { kind: measured, ${keys} }\n`;

  test('are found from its folder, wherever the tool runs', () => {
    mkdirSync(join(folder, 'records'));
    written('records/table.csv', TABLE);
    const sea = loadSea(written('measured.yaml', measured('file: records/table.csv')));
    expect(sea.systems).toMatchObject([{ kind: 'measured', source: 'records/table.csv' }]);
    expect(loadSea(written('records/measured.yaml', measured('file: table.csv'))).systems).toHaveLength(1);
    expect(Object.isFrozen(sea.systems[0].kind === 'measured' && sea.systems[0].spectrum.cos1)).toBe(true);
  });

  test('that cannot be read are told at the line that names them', () => {
    const path = written('lost.yaml', measured('file: nowhere.csv'));
    expect(() => loadSea(path)).toThrow(/lost\.yaml:4:29: systems\[0\]\.file: .* found none there/);
    written('bytes.csv', Uint8Array.of(0xff, 0xfe, 0x00));
    expect(() => loadSea(written('bytes.yaml', measured('file: bytes.csv')))).toThrow(/no text in UTF-8/);
    expect(() => loadSea(written('folder.yaml', measured('file: records')))).toThrow(/found no regular file/);
    written('huge.csv', new Uint8Array((1 << 25) + 1));
    expect(() => loadSea(written('huge.yaml', measured('file: huge.csv')))).toThrow(/more than 32 MiB/);
  });

  test('have lines of their own for what is wrong inside them, once the sea file is right', () => {
    written('cut.csv', TABLE.slice(0, -8));
    const path = written('cut.yaml', measured('file: cut.csv'));
    expect(() => loadSea(path)).toThrow(InputError);
    expect(() => loadSea(path)).toThrow(/^cut\.csv:4:1: expected 4 values/);
    const both = written('both.yaml', `${measured('file: cut.csv')}loop: { seconds: -1 }\n`);
    expect(() => loadSea(both)).toThrow(/^\S*both\.yaml:5:18: loop\.seconds/);
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
      expect(parseSea(text, { readFile: seaText(name).readFile })).toEqual(loadSea(name));
      expect(seaWarnings(loadSea(name))).toEqual([]);
    },
  );
});
