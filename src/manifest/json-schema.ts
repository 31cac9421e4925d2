import { z } from 'zod';
import { MANIFEST_SCHEMA } from './schema.ts';

/** JSON Schema (draft 2020-12) of `manifest.json`. */
export function manifestJsonSchema(): Record<string, unknown> {
  const schema = z.toJSONSchema(MANIFEST_SCHEMA, { target: 'draft-2020-12', io: 'input' });
  return { ...schema, $id: 'urn:loopswell:manifest:1', title: 'loopswell manifest, version 1' };
}
