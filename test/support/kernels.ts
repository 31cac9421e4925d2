import { existsSync } from 'node:fs';
import { describe } from 'vitest';

/**
 * `describe` for tests that need a compiled kernel: where it was not built they are skipped and say so; in CI they fail.
 * Kernels are built by `npm run build`.
 */
export function describeKernel(kernel: 'wave' | 'code', name: string, tests: () => void): void {
  const isBuilt = existsSync(new URL(`../../dist/kernel/${kernel}.wasm`, import.meta.url));
  if (isBuilt || process.env.CI !== undefined) describe(name, tests);
  else describe.skip(`${name} (skipped: dist/kernel/${kernel}.wasm is missing, run npm run build)`, tests);
}
