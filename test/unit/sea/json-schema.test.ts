import { readFileSync, writeFileSync } from 'node:fs';
import { Ajv2020 } from 'ajv/dist/2020.js';
import { describe, expect, test } from 'vitest';
import { parse } from 'yaml';
import { SEA_SCHEMA_ID, seaJsonSchema } from '../../../src/sea/json-schema.ts';
import { presetNames, presetText } from '../../../src/sea/load.ts';
import { TINY_SEA_KEYS, TINY_SEA_YAML } from '../../support/tiny-seas.ts';

const SHIPPED = new URL('../../../presets/sea.schema.json', import.meta.url);

// strict: unknown keywords are errors; discriminators make tuples of types that strictTypes would question.
const validate = new Ajv2020({ strict: true, strictTypes: false, allErrors: true }).compile(seaJsonSchema());

test('the shipped schema is the current one', () => {
  const current = `${JSON.stringify(seaJsonSchema(), null, 2)}\n`;
  // UPDATE_SCHEMA=1 npx vitest run test/unit/sea/json-schema.test.ts
  if (process.env.UPDATE_SCHEMA) writeFileSync(SHIPPED, current);
  expect(readFileSync(SHIPPED, 'utf8')).toBe(current);
});

test('it names itself and its draft', () => {
  expect(seaJsonSchema()).toMatchObject({
    $schema: 'https://json-schema.org/draft/2020-12/schema',
    $id: SEA_SCHEMA_ID,
    additionalProperties: false,
    required: ['seaFile', 'title', 'systems'],
  });
});

test.each(presetNames())('preset %s is valid', (name) => {
  validate(parse(presetText(name)));
  expect(validate.errors).toBeNull();
});

test('the tiny sea is valid', () => {
  expect(validate(TINY_SEA_KEYS)).toBe(true);
  expect(validate(parse(TINY_SEA_YAML))).toBe(true);
});

describe('what is wrong on its own is not valid', () => {
  test.each([
    [{ seaFile: 2 }],
    [{ title: '' }],
    [{ title: undefined }],
    [{ tilte: 'Test' }],
    [{ systems: [] }],
    [{ systems: [{ kind: 'tide', from: 0 }] }],
    [{ systems: [{ kind: 'swell', from: '250 kn', significantHeight: 1, peakPeriod: 9 }] }],
    [{ systems: [{ kind: 'swell', from: 0, significantHeight: -1, peakPeriod: 9 }] }],
    [{ systems: [{ kind: 'swell', from: 0, significantHeight: 1, peakPeriod: 9, fetch: 1 }] }],
    [{ water: { depth: 0 } }],
    [{ loop: { frames: 0, frameRate: 24 } }],
    [{ foam: { coverage: 2 } }],
    [{ maps: { displacement: { format: 'png', bits: 12 } } }],
    [{ output: { axes: 'x-up' } }],
  ])('%j', (changes) => {
    expect(validate(JSON.parse(JSON.stringify({ ...TINY_SEA_KEYS, ...changes })))).toBe(false);
  });
});

test('every key has a description for editors', () => {
  const missing: string[] = [];
  const visit = (schema: unknown, path: string): void => {
    if (typeof schema !== 'object' || schema === null) return;
    for (const [key, value] of Object.entries(schema)) {
      if (key === 'properties') {
        for (const [name, property] of Object.entries(value as Record<string, { description?: string }>)) {
          if (!property.description) missing.push(`${path}.${name}`);
          visit(property, `${path}.${name}`);
        }
      } else visit(value, path);
    }
  };
  visit(seaJsonSchema(), '');
  expect(missing).toEqual([]);
});
