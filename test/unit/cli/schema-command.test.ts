import { describe, expect, it } from 'vitest';
import { EXIT_STATUS, manifestJsonSchema, seaJsonSchema } from '../../../src/index.ts';
import { outcomeOf } from './captured-io.ts';

describe('schema', () => {
  it.each([
    ['sea', seaJsonSchema],
    ['manifest', manifestJsonSchema],
  ])('prints the JSON Schema of a %s', async (of, schema) => {
    const { status, stdout } = await outcomeOf(['schema', of]);
    expect(status).toBe(EXIT_STATUS.done);
    const printed = JSON.parse(stdout);
    expect(printed).toEqual(schema());
    expect(printed.$schema).toBe('https://json-schema.org/draft/2020-12/schema');
  });
});
