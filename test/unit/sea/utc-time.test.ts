import fc from 'fast-check';
import { expect, test } from 'vitest';
import { utcMinutes, utcMinutesFromText, utcText } from '../../../src/sea/utc-time.ts';

test.each([
  ['2000-01-01T00:00Z', 0],
  ['2000-01-01 00:01', 1],
  ['1999-12-31T23:59Z', -1],
  ['2000-03-01T00:00:00Z', 60 * 1440],
  ['2001-01-01T00:00 UTC', 366 * 1440],
  ['1900-03-01T00:00Z', (-36525 + 1 + 59) * 1440],
])('%s is %d minutes', (text, minutes) => {
  expect(utcMinutesFromText(text)).toBe(minutes);
});

test.each([
  '2020-02-30T00:00Z',
  '2021-02-29T00:00Z',
  '1900-02-29T00:00Z',
  '2020-13-01T00:00Z',
  '2020-00-01T00:00Z',
  '2020-01-00T00:00Z',
  '2020-01-01T24:00Z',
  '2020-01-01T00:60Z',
  '2020-01-01',
  'yesterday',
  '2020-01-01T00:00+02:00',
])('%s is no moment', (text) => {
  expect(utcMinutesFromText(text)).toBeNull();
});

// The calendar of the runtime, an implementation of its own.
test('agrees with the calendar of the runtime, there and back', () => {
  const from = Date.UTC(1900, 0, 1) / 60000;
  const to = Date.UTC(2200, 0, 1) / 60000 - 1;
  fc.assert(
    fc.property(fc.integer({ min: from, max: to }), (unixMinutes) => {
      const date = new Date(unixMinutes * 60000);
      const minutes = utcMinutes(
        date.getUTCFullYear(),
        date.getUTCMonth() + 1,
        date.getUTCDate(),
        date.getUTCHours(),
        date.getUTCMinutes(),
      ) as number;
      expect(minutes).toBe(unixMinutes - Date.UTC(2000, 0, 1) / 60000);
      expect(utcText(minutes)).toBe(`${date.toISOString().slice(0, 16).replace('T', ' ')} UTC`);
    }),
    { numRuns: 300 },
  );
});
