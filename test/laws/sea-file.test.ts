import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { stringify } from 'yaml';
import { InputError } from '../../src/errors.ts';
import { loopSeconds } from '../../src/sea/loop.ts';
import { parseSea, seaFromObject } from '../../src/sea/parse.ts';
import type { Sea } from '../../src/sea/sea.ts';
import { type Dimension, quantityFromNumber, quantityFromText, UNITS } from '../../src/sea/units.ts';
import { seaWarnings } from '../../src/sea/warnings.ts';
import { TINY_SEA_YAML } from '../support/tiny-seas.ts';

/** Every key that a sea file has, with values sound and unsound. */
const FULL_SEA = {
  seaFile: 1,
  title: 'Everything at once',
  seed: 12,
  water: {
    depth: '20 m',
    density: 1025,
    surfaceTension: 0.0742,
    gravity: 9.8,
    current: { speed: 1, toward: 90 },
  },
  systems: [
    {
      kind: 'wind-sea',
      name: 'a',
      from: 200,
      windSpeed: '16 kn',
      windHeight: 12,
      fetch: '80 km',
      duration: '9 h',
      growth: 'wilson',
      spreading: 'mitsuyasu',
    },
    {
      kind: 'wind-sea',
      from: 190,
      beaufort: 4,
      seaState: 3,
      spectrum: { form: 'ochi-hubble', row: 3 },
      spreading: { form: 'wrapped-normal', width: 30 },
      scaleTo: 0.4,
    },
    {
      kind: 'wind-sea',
      from: 210,
      significantHeight: 0.5,
      peakPeriod: 3,
      spreading: { swellNarrowing: 0.2 },
    },
    {
      kind: 'swell',
      from: '300 deg',
      significantHeight: 1,
      peakPeriod: 11,
      peakEnhancement: 5,
      spreading: { s: 50 },
    },
  ],
  shaping: {
    bandGains: [{ longest: 5, shortest: 1, gain: 2 }],
    againstWind: 0.5,
    horizontalScale: 1.2,
    matchHeight: false,
    amplitudes: 'deterministic',
  },
  loop: { seconds: 12, frameRate: 24, firstFrame: 101 },
  cascades: [
    { patch: 500, resolution: 256 },
    { patch: 60, resolution: 128, band: { longest: 12, shortest: 2 }, loop: { seconds: 6 } },
  ],
  foam: { coverage: '3 %', decayTime: 2, residue: 'keep', shares: [0.75, 0.25] },
  maps: {
    displacement: { format: 'png', bits: 16, range: '6 sigmas' },
    normal: 'png',
    foam: 'png',
    velocity: 'exr',
  },
  output: {
    axes: 'y-up',
    rowZero: 'south',
    normalGreen: 'south',
    lengthUnit: 'cm',
    exrChannels: 'layered',
    padding: 5,
  },
};

/** The law: a sea, or one report whose problems all say where, what and how to mend it. */
function seaOrReport(read: () => Sea, hasText: boolean): Sea | null {
  try {
    const sea = read();
    expectDeeplyFrozen(sea);
    for (const warning of seaWarnings(sea)) expect(warning).toMatch(/^[^\n]{20,}\.$/);
    return sea;
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    expect(error.problems.length).toBeGreaterThan(0);
    for (const { line, column, expected, found, remedy } of error.problems.slice(0, 50)) {
      if (hasText) expect(Math.min(line, column)).toBeGreaterThanOrEqual(1);
      expect(Math.min(expected.length, found.length, remedy.length)).toBeGreaterThan(0);
      expect(expected + found + remedy).not.toMatch(/undefined|\[object|NaN m/);
    }
    return null;
  }
}

function expectDeeplyFrozen(value: unknown): void {
  if (typeof value !== 'object' || value === null) return;
  expect(Object.isFrozen(value)).toBe(true);
  for (const inner of Object.values(value)) expectDeeplyFrozen(inner);
}

/** Something that is unlikely to be right anywhere. */
const ODDITY: fc.Arbitrary<unknown> = fc.oneof(
  fc.constantFrom<unknown>(
    null,
    '',
    'deep',
    'auto',
    'off',
    'exr',
    '12 m',
    '5 kn',
    '1e400 m',
    [],
    {},
    true,
    -1,
    0,
  ),
  fc.constantFrom<unknown>(
    '__proto__',
    'hasOwnProperty',
    '24/0',
    '0/0',
    '1/3 fps',
    1e308,
    5e-324,
    -0,
    '6 sigmas',
  ),
  fc.double(),
  fc.integer(),
  fc.string({ maxLength: 12, unit: 'binary' }),
  fc.array(fc.integer(), { maxLength: 3 }),
  fc.dictionary(fc.string({ maxLength: 8 }), fc.integer(), { maxKeys: 3 }),
);

type Path = (string | number)[];

function pathsOf(value: unknown, path: Path = []): Path[] {
  if (typeof value !== 'object' || value === null) return [path];
  const inner = Object.entries(value).flatMap(([key, item]) =>
    pathsOf(item, [...path, Array.isArray(value) ? Number(key) : key]),
  );
  return path.length === 0 ? inner : [path, ...inner];
}

function changed(
  document: unknown,
  path: Path,
  change: (parent: Record<string, unknown>, key: string) => void,
): unknown {
  const copy = structuredClone(document);
  const parent = path.slice(0, -1).reduce<unknown>((at, step) => (at as Record<string, unknown>)[step], copy);
  change(parent as Record<string, unknown>, String(path.at(-1)));
  return copy;
}

const CHANGE = fc.oneof(
  fc.tuple(fc.constantFrom(...pathsOf(FULL_SEA)), ODDITY).map(
    ([path, value]) =>
      (document: unknown) =>
        changed(document, path, (parent, key) => {
          parent[key] = value;
        }),
  ),
  fc.constantFrom(...pathsOf(FULL_SEA)).map(
    (path) => (document: unknown) =>
      changed(document, path, (parent, key) => {
        delete parent[key];
      }),
  ),
  fc.tuple(fc.constantFrom(...pathsOf(FULL_SEA)), fc.string({ minLength: 1, maxLength: 6 })).map(
    ([path, name]) =>
      (document: unknown) =>
        changed(document, path, (parent) => {
          if (!Array.isArray(parent)) Object.defineProperty(parent, name, { value: 1, enumerable: true });
        }),
  ),
);

const RUNS = { seed: 20, numRuns: 400 };

describe('a sea or a report, never anything else', () => {
  test('the sea that is changed below is sound', () => {
    expect(seaOrReport(() => parseSea(stringify(FULL_SEA)), true)).toEqual(seaFromObject(FULL_SEA));
  });

  test('any text', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary', maxLength: 200 }), (text) => {
        expect(seaOrReport(() => parseSea(text), true)).toBeNull();
      }),
      RUNS,
    );
  });

  test('pieces of YAML in any order', () => {
    const piece = fc.constantFrom(
      ...[
        'seaFile: 1',
        '\n',
        '\n  ',
        '- ',
        ': ',
        '{',
        '}',
        '[',
        ']',
        ', ',
        '"',
        "'",
        '#',
        '&a ',
        '*a',
        '|',
        '>',
        '!!str ',
      ],
      ...[
        '? ',
        '--- ',
        '%YAML 1.1\n',
        'systems',
        'title',
        'swell',
        '<<',
        '\t',
        '~',
        '.nan',
        '0x1F',
        '1e9',
        '\ufeff',
        '...\n',
      ],
    );
    fc.assert(
      fc.property(fc.array(piece, { maxLength: 40 }), (pieces) => {
        expect(seaOrReport(() => parseSea(pieces.join('')), true)).toBeNull();
      }),
      RUNS,
    );
  });

  test('a sound file with characters lost, doubled or replaced', () => {
    const at = fc.nat(TINY_SEA_YAML.length - 1);
    fc.assert(
      fc.property(
        at,
        fc.nat(12),
        fc.string({ maxLength: 4, unit: 'grapheme-ascii' }),
        (start, length, text) => {
          seaOrReport(
            () => parseSea(TINY_SEA_YAML.slice(0, start) + text + TINY_SEA_YAML.slice(start + length)),
            true,
          );
        },
      ),
      RUNS,
    );
  });

  test('a sound sea with keys changed, lost and added, in memory and as text', () => {
    let sound = 0;
    fc.assert(
      fc.property(fc.array(CHANGE, { minLength: 1, maxLength: 2 }), (changes) => {
        let document: unknown = FULL_SEA;
        for (const change of changes) {
          try {
            document = change(document);
          } catch {
            // The second change may look for what the first has removed.
          }
        }
        const sea = seaOrReport(() => seaFromObject(document), false);
        const text = stringify(document, { aliasDuplicateObjects: false });
        const again = seaOrReport(() => parseSea(text), true);
        expect(again).toEqual(sea);
        if (sea !== null) sound++;
      }),
      RUNS,
    );
    // Some changes are harmless (an optional key lost): the law must have been tried on both sides.
    expect(sound).toBeGreaterThan(RUNS.numRuns / 50);
    expect(sound).toBeLessThan(RUNS.numRuns / 2);
  });

  test('any value in memory', () => {
    fc.assert(
      fc.property(fc.anything({ withNullPrototype: true, withMap: true, withBigInt: true }), (value) => {
        expect(seaOrReport(() => seaFromObject(value), false)).toBeNull();
      }),
      RUNS,
    );
  });
});

test('a key of one letter wrong is always reported at its line, with the right key', () => {
  const lines = TINY_SEA_YAML.split('\n');
  const keyed = lines.flatMap((line, i) => {
    const key = /^[ -]*([a-zA-Z]{4,}):/.exec(line)?.[1];
    return key === undefined ? [] : [{ i, key, column: line.indexOf(key) + 1 }];
  });
  fc.assert(
    fc.property(fc.constantFrom(...keyed), fc.nat(20), ({ i, key, column }, position) => {
      const p = position % key.length;
      const wrong = `${key.slice(0, p)}q${key.slice(p + 1)}`;
      const text = lines.with(i, lines[i].replace(key, wrong)).join('\n');
      const report = (): unknown => parseSea(text, { source: 'f' });
      // A lost discriminator is reported as missing, as the keys beside it cannot be judged without it.
      if (key === 'kind') expect(report).toThrow('Add `kind`');
      else
        expect(report).toThrow(new RegExp(`f:${i + 1}:${column}: .*\`${wrong}\`\\. Did you mean \`${key}\``));
    }),
    { seed: 21, numRuns: 100 },
  );
});

test('a number with a unit means the same as the bare number it stands for', () => {
  const units = (Object.keys(UNITS) as Dimension[]).flatMap((dimension) =>
    Object.keys(UNITS[dimension].units).map((unit) => ({ dimension, unit })),
  );
  fc.assert(
    fc.property(
      fc.constantFrom(...units),
      fc.double({ min: 1e-6, max: 1e9, noNaN: true }),
      ({ dimension, unit }, x) => {
        const value = quantityFromText(`${x} ${unit}`, dimension) as number;
        const one = quantityFromText(`1 ${unit}`, dimension) as number;
        // Three roundings at most: each half a unit in the last place.
        expect(Math.abs(value / (x * one) - 1)).toBeLessThanOrEqual(4 * Number.EPSILON);
        if (unit === UNITS[dimension].bare) expect(value).toBe(quantityFromNumber(x, dimension));
      },
    ),
    RUNS,
  );
});

test('a loop is whole frames, and a loop of its own divides it exactly', () => {
  const rate = fc.constantFrom('24', '25', '30', '12', '24000/1001', '30000/1001', '60000/1001', '12.5');
  fc.assert(
    fc.property(
      rate,
      fc.integer({ min: 1, max: 2000 }),
      fc.integer({ min: 1, max: 400 }),
      (frameRate, frames, own) => {
        const document = {
          ...FULL_SEA,
          foam: 'off',
          maps: { normal: 'png' },
          loop: { frameRate, frames },
          cascades: [{ patch: 100, loop: { frames: own } }],
        };
        const sea = seaOrReport(() => seaFromObject(document), false);
        expect(sea !== null).toBe(frames % own === 0);
        if (sea?.cascades.plan !== 'list') return;
        const whole = loopSeconds(sea.loop);
        const part = loopSeconds(sea.cascades.list[0].loop ?? sea.loop);
        const repeats = BigInt(frames / own);
        expect(part.numerator * whole.denominator * repeats).toBe(whole.numerator * part.denominator);
      },
    ),
    RUNS,
  );
});
