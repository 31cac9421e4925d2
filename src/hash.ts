import { createHash } from 'node:crypto';

/** SHA-256 of some bytes as `sha256:<hex>`, the form every hash in plans, journals and manifests has. */
export function sha256(bytes: Uint8Array | string): string {
  return `sha256:${createHash('sha256').update(bytes).digest('hex')}`;
}
