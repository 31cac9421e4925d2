/** The part of the WebAssembly interface that the kernels use; the types of Node 20 leave it out. */
declare namespace WebAssembly {
  class Module {
    constructor(bytes: Uint8Array);
  }
  class Memory {
    constructor(size: { readonly initial: number; readonly maximum?: number });
    readonly buffer: ArrayBuffer;
    /** Adds pages of 64 kB; views of the old buffer lose their bytes. */
    grow(pages: number): number;
  }
  class Instance {
    constructor(module: Module, imports: Readonly<Record<string, Readonly<Record<string, unknown>>>>);
    readonly exports: unknown;
  }
  function validate(bytes: Uint8Array): boolean;
}
