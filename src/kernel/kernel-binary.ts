import { readFileSync } from 'node:fs';

/** Programs compiled from AssemblyScript by `src/kernel/build.mjs`. */
export type KernelName = 'wave' | 'code';

const modules = new Map<KernelName, WebAssembly.Module>();

/**
 * A kernel's compiled module. Read and compiled once a thread; the same file serves `src` under test and `dist`.
 *
 * @throws where the file is missing (the package was not built) or this machine has no WebAssembly SIMD
 */
export function kernelModule(name: KernelName): WebAssembly.Module {
  const made = modules.get(name);
  if (made !== undefined) return made;
  const module = new WebAssembly.Module(
    readFileSync(new URL(`../../dist/kernel/${name}.wasm`, import.meta.url)),
  );
  modules.set(name, module);
  return module;
}

/** A function of type () -> v128 that returns zeros: the shortest program that needs SIMD. */
const SIMD_PROBE = Uint8Array.of(
  ...[0x00, 0x61, 0x73, 0x6d, 0x01, 0x00, 0x00, 0x00], // magic and version
  ...[0x01, 0x05, 0x01, 0x60, 0x00, 0x01, 0x7b], // type: () -> v128
  ...[0x03, 0x02, 0x01, 0x00], // one function of that type
  ...[0x0a, 0x08, 0x01, 0x06, 0x00, 0x41, 0x00, 0xfd, 0x0f, 0x0b], // i32.const 0, i8x16.splat
);

/** Whether this machine's WebAssembly knows SIMD. Source: WebAssembly core specification 2.0. */
export function simdAvailable(): boolean {
  return typeof WebAssembly === 'object' && WebAssembly.validate(SIMD_PROBE);
}
