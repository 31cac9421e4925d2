import { z } from 'zod';
import { SEA_SCHEMA } from './schema.ts';

/** Identifies the schema of sea files of version 1; a name, not an address. */
export const SEA_SCHEMA_ID = 'urn:loopswell:sea-file:1';

/**
 * JSON Schema (draft 2020-12) of a sea file as it is written, for editors. It knows keys, words, units and the ranges
 * of bare numbers; rules that tie several keys together are checked only by `parseSea`.
 */
export function seaJsonSchema(): Record<string, unknown> {
  const { $schema, ...schema } = z.toJSONSchema(SEA_SCHEMA, { target: 'draft-2020-12', io: 'input' });
  return { $schema, $id: SEA_SCHEMA_ID, title: 'loopswell sea file', ...schema };
}
