import {
  appendFileSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  rmSync,
  truncateSync,
  writeFileSync,
} from 'node:fs';
import { join } from 'node:path';
import { expect, it } from 'vitest';
import { CannotCreateError, InternalError } from '../../../src/errors.ts';
import { newJournal, readJournals } from '../../../src/store/journal.ts';
import { withTemporaryFolder } from '../../support/foreign-program.ts';

interface Sample {
  readonly path: string;
  readonly value: number;
}

function isSample(value: unknown): value is Sample {
  if (typeof value !== 'object' || value === null) return false;
  return (
    'path' in value && typeof value.path === 'string' && 'value' in value && typeof value.value === 'number'
  );
}

/** The text of a journal that holds some entries. */
function journalText(folder: string, entries: readonly Sample[]): string {
  const journal = newJournal<Sample>(folder, 'text');
  for (const entry of entries) journal.append(entry);
  journal.close();
  const text = readFileSync(join(folder, 'text.jsonl'), 'utf8');
  rmSync(join(folder, 'text.jsonl'));
  return text;
}

it('gives back numbers to the bit, journals by name and entries in order', () => {
  withTemporaryFolder((folder) => {
    const values = [0.1 + 0.2, 5e-324, -1.7976931348623157e308, 2 ** 53 - 1, 1 / 3, -0.1];
    const second = newJournal<Sample>(join(folder, 'journals'), 'b');
    const first = newJournal<Sample>(join(folder, 'journals'), 'a');
    for (const value of values) {
      second.append({ path: 'λ/second', value });
      first.append({ path: 'first","check":"0', value: value / 2 });
    }
    // Read while both are open, as a gather may.
    const read = readJournals(join(folder, 'journals'), isSample);
    expect(read.map(({ path, damagedLines }) => [path, damagedLines])).toEqual([
      ['a.jsonl', 0],
      ['b.jsonl', 0],
    ]);
    const [a, b] = read.map(({ entries }) => entries);
    expect(new Set(a.map(({ path }) => path))).toEqual(new Set(['first","check":"0']));
    const bits = (numbers: readonly number[]) => new Uint8Array(Float64Array.from(numbers).buffer);
    expect(bits(b.map(({ value }) => value))).toEqual(bits(values));
    first.close();
    second.close();
    expect(() => first.append({ path: 'late', value: 1 })).toThrow(InternalError);
  });
});

it('writes nothing before there is something to say, and never into a journal that is there', () => {
  withTemporaryFolder((folder) => {
    newJournal<Sample>(folder, 'silent').close();
    expect(readdirSync(folder)).toEqual([]);
    newJournal<Sample>(folder, 'j').append({ path: 'x', value: 1 });
    expect(() => newJournal<Sample>(folder, 'j').append({ path: 'y', value: 2 })).toThrow(CannotCreateError);
  });
});

it('ignores a torn last line, wherever it was torn', () => {
  withTemporaryFolder((folder) => {
    const [whole, torn] = journalText(folder, [
      { path: 'whole', value: 1 },
      { path: 'λ', value: 123 },
    ])
      .split('\n')
      .map((line) => Buffer.from(line));
    for (let length = 0; length <= torn.length; length++) {
      writeFileSync(join(folder, 'torn.jsonl'), `${whole}\n`);
      appendFileSync(join(folder, 'torn.jsonl'), torn.subarray(0, length));
      const [journal] = readJournals(folder, isSample);
      expect(journal.entries).toEqual([{ path: 'whole', value: 1 }]);
      expect(journal.damagedLines).toBe(0);
    }
  });
});

it('knows every line in which a single byte was changed, and keeps the others', () => {
  withTemporaryFolder((folder) => {
    const entry = { path: 'c0/foam.0001.png', value: -0.12345678901234566 };
    const line = journalText(folder, [entry]).trimEnd();
    for (let at = 0; at < line.length; at++) {
      const other = line[at] === '7' ? '8' : '7';
      const changed = line.slice(0, at) + other + line.slice(at + 1);
      writeFileSync(join(folder, 'j.jsonl'), `${line}\n${changed}\n${line}\n`);
      const [journal] = readJournals(folder, isSample);
      expect(journal.damagedLines, changed).toBe(1);
      expect(journal.entries).toEqual([entry, entry]);
    }
  });
});

it('counts lines that are no entries', () => {
  withTemporaryFolder((folder) => {
    const good = journalText(folder, [{ path: 'x', value: 1 }]);
    const wrong = journalText(folder, [{ path: 'x', value: '1' } as unknown as Sample]);
    for (const bad of ['\n', '{"path":\n', '{"path":"x","value":1}\n', '\0\0\0\0\n', 'null\n', wrong]) {
      writeFileSync(join(folder, 'j.jsonl'), good + bad + good);
      const [{ entries, damagedLines }] = readJournals(folder, isSample);
      expect([entries.length, damagedLines], JSON.stringify(bad)).toEqual([2, 1]);
    }
  });
});

it('does not read a file that is far too large for a journal', () => {
  withTemporaryFolder((folder) => {
    writeFileSync(join(folder, 'j.jsonl'), '');
    // Sparse: takes no room on the disk.
    truncateSync(join(folder, 'j.jsonl'), 2 ** 40);
    expect(readJournals(folder, isSample)).toMatchObject([{ entries: [], damagedLines: 1 }]);
  });
});

it('refuses a number that JSON would turn into null, and writes nothing of that line', () => {
  withTemporaryFolder((folder) => {
    const journal = newJournal<Sample>(folder, 'j');
    journal.append({ path: 'x', value: 1 });
    const before = readFileSync(join(folder, 'j.jsonl'), 'utf8');
    for (const value of [Number.NaN, Infinity]) {
      expect(() => journal.append({ path: 'x', value })).toThrow(InternalError);
    }
    journal.close();
    expect(readFileSync(join(folder, 'j.jsonl'), 'utf8')).toBe(before);
  });
});

it('reads nothing from a folder that is not there, and other files and folders not at all', () => {
  withTemporaryFolder((folder) => {
    expect(readJournals(join(folder, 'none'), isSample)).toEqual([]);
    writeFileSync(join(folder, 'notes.txt'), 'not a journal\n');
    mkdirSync(join(folder, 'folder.jsonl'));
    expect(readJournals(folder, isSample)).toEqual([]);
  });
});

it('says so where a journal cannot be made', () => {
  withTemporaryFolder((folder) => {
    writeFileSync(join(folder, 'file'), '');
    const journal = newJournal<Sample>(join(folder, 'file'), 'j');
    expect(() => journal.append({ path: 'x', value: 1 })).toThrow(CannotCreateError);
  });
});
