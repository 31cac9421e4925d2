import { appendFileSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, it } from 'vitest';
import { CannotCreateError, InputError, InternalError } from '../../../src/errors.ts';
import { openJournal, readJournals } from '../../../src/store/journal.ts';
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

it('gives back numbers to the bit, journals by name and entries in order', () => {
  withTemporaryFolder((folder) => {
    const values = [0.1 + 0.2, 5e-324, -1.7976931348623157e308, 2 ** 53 - 1, 1 / 3, -0.1];
    const second = openJournal<Sample>(join(folder, 'journals'), 'b');
    const first = openJournal<Sample>(join(folder, 'journals'), 'a');
    for (const value of values) {
      second.append({ path: 'λ/second', value });
      first.append({ path: 'first', value: value / 2 });
    }
    // Read while both are open, as a gather may.
    const read = readJournals(join(folder, 'journals'), isSample);
    expect(read.map(({ path }) => path)).toEqual([
      ...values.map(() => 'first'),
      ...values.map(() => 'λ/second'),
    ]);
    const bits = (numbers: readonly number[]) => new Uint8Array(Float64Array.from(numbers).buffer);
    expect(bits(read.slice(values.length).map(({ value }) => value))).toEqual(bits(values));
    first.close();
    second.close();
    expect(() => first.append({ path: 'late', value: 1 })).toThrow();
  });
});

it('ignores a torn last line, wherever it was torn, and cuts it off before adding', () => {
  withTemporaryFolder((folder) => {
    const path = join(folder, 'torn.jsonl');
    const whole = `${JSON.stringify({ path: 'whole', value: 1 })}\n`;
    const torn = JSON.stringify({ path: 'λ', value: 123 });
    const bytes = Buffer.from(torn);
    for (let length = 0; length <= bytes.length; length++) {
      writeFileSync(path, whole);
      appendFileSync(path, bytes.subarray(0, length));
      expect(readJournals(folder, isSample)).toEqual([{ path: 'whole', value: 1 }]);
      const journal = openJournal<Sample>(folder, 'torn');
      journal.append({ path: 'after', value: 2 });
      journal.close();
      expect(readJournals(folder, isSample).map((entry) => entry.path)).toEqual(['whole', 'after']);
    }
  });
});

it('refuses a finished line that is not an entry, with its place', () => {
  withTemporaryFolder((folder) => {
    const good = JSON.stringify({ path: 'x', value: 1 });
    for (const bad of ['', '{"path":', '{"path":"x","value":"1"}', '\0\0\0\0', 'null']) {
      writeFileSync(join(folder, 'j.jsonl'), `${good}\n${bad}\n${good}\n`);
      expect(() => readJournals(folder, isSample), bad).toThrow(InputError);
      expect(() => readJournals(folder, isSample), bad).toThrow(/^j\.jsonl:2:1: expected an entry/);
    }
  });
});

it('refuses a number that JSON would turn into null, and writes nothing of that line', () => {
  withTemporaryFolder((folder) => {
    const journal = openJournal<Sample>(folder, 'j');
    journal.append({ path: 'x', value: 1 });
    for (const value of [Number.NaN, Infinity]) {
      expect(() => journal.append({ path: 'x', value })).toThrow(InternalError);
    }
    journal.close();
    expect(readFileSync(join(folder, 'j.jsonl'), 'utf8')).toBe('{"path":"x","value":1}\n');
  });
});

it('reads nothing from a folder that is not there, and other files not at all', () => {
  withTemporaryFolder((folder) => {
    expect(readJournals(join(folder, 'none'), isSample)).toEqual([]);
    writeFileSync(join(folder, 'notes.txt'), 'not a journal\n');
    expect(readJournals(folder, isSample)).toEqual([]);
  });
});

it('says so where a journal cannot be made', () => {
  withTemporaryFolder((folder) => {
    writeFileSync(join(folder, 'file'), '');
    expect(() => openJournal(join(folder, 'file'), 'j')).toThrow(CannotCreateError);
  });
});
