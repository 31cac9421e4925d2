import { InputError } from '../errors.ts';
import { canonicalJson } from '../plan/canonical-json.ts';
import type { Manifest } from './manifest.ts';
import { MANIFEST_SCHEMA } from './schema.ts';

/** The text of `manifest.json`. */
export function manifestText(manifest: Manifest): string {
  return `${canonicalJson(manifest, 1)}\n`;
}

/**
 * Reads a manifest. It may come from a shared disk, so its shape is checked whole.
 *
 * @param source file name for messages
 * @throws InputError naming the first things that are wrong
 */
export function parseManifest(text: string, source: string): Manifest {
  const remedy = 'Bake again, or give the manifest.json of a finished bake.';
  const problem = (path: string, expected: string, found: string): InputError =>
    new InputError(source, [{ path, line: 0, column: 0, expected, found, remedy }]);
  let document: unknown;
  try {
    document = JSON.parse(text);
  } catch (error) {
    throw problem('', 'JSON', (error as Error).message);
  }
  const result = MANIFEST_SCHEMA.safeParse(document);
  if (result.success) return result.data;
  const [issue] = result.error.issues;
  throw problem(issue.path.join('.'), 'a loopswell manifest, version 1', issue.message);
}
