import { codeKernel } from '../../src/kernel/code/code-kernel.ts';

/** What the kernel is told about bytes, as in src/kernel/code/assembly/deflate.ts. */
export const KINDS = { any: 0, 'perhaps noise': 1, repetitive: 2, 'repetitive pairs': 3 } as const;

export type Kind = keyof typeof KINDS;

/** The zlib stream that the kernel makes of some bytes. */
export function kernelStream(bytes: Uint8Array, kind: Kind = 'any'): Uint8Array {
  const kernel = codeKernel();
  const { planes, file } = kernel.layOut(0, 1, bytes.length);
  kernel.reserve(file + 2 * bytes.length + 65536);
  kernel.bytes().set(bytes, planes);
  const length = kernel.program.putStream(file, planes, planes + bytes.length, KINDS[kind]);
  return kernel.bytes().slice(file, file + length);
}
