import { roundedUp64 } from '../alignment.ts';
import { kernelModule } from '../kernel-binary.ts';

/** The kernel's functions; what they do and their arguments: src/kernel/code/assembly. Addresses are in bytes. */
export interface CodeProgram {
  readonly WORKSPACE_BYTES: { readonly value: number };
  readonly LARGEST_BLOCK: { readonly value: number };
  pngScratchBytes(rowBytes: number): number;
  beginPng(scratch: number, width: number, channels: number, sampleBytes: number): void;
  clearRowAbove(): void;
  setRowAbove(planes: number, step: number): void;
  sampleRows(planes: number, step: number, rows: number): void;
  beginPixels(out: number): number;
  putRows(planes: number, step: number, rows: number, isLast: boolean): void;
  endPixels(): number;
  exrScratchBytes(blockBytes: number): number;
  beginExr(): void;
  putExrBlock(
    out: number,
    planes: number,
    step: number,
    channels: number,
    rowBytes: number,
    rows: number,
    inPairs: boolean,
    scratch: number,
  ): number;
  putStream(out: number, from: number, to: number, kind: number): number;
}

/** Where in the kernel's memory the parts of one image are, addresses in bytes. */
export interface ImageMemory {
  readonly scratch: number;
  /** Rows of the first plane; the others lie `step` bytes apart. */
  readonly planes: number;
  readonly step: number;
  /** The file, to the end of the memory. */
  readonly file: number;
}

/** A kernel with a memory of its own, which serves one image at a time and is kept by its thread. */
export interface CodeKernel {
  readonly program: CodeProgram;
  /** The memory as it is now; laying it out or reserving may replace it. */
  readonly bytes: () => Uint8Array;
  /** Lays the memory out for an image; ends what was laid out before. */
  readonly layOut: (scratchBytes: number, channels: number, planeBytes: number) => ImageMemory;
  /** Makes the memory reach to an address. */
  readonly reserve: (end: number) => void;
}

const PAGE = 65536;

/** Room for whole vectors behind each part. */
const MARGIN = 64;

let threadKernel: CodeKernel | undefined;

/**
 * The kernel of this thread, made when first asked for.
 * @throws where the binary is missing or this machine has no WebAssembly SIMD
 */
export function codeKernel(): CodeKernel {
  threadKernel ??= newKernel();
  return threadKernel;
}

function newKernel(): CodeKernel {
  const memory = new WebAssembly.Memory({ initial: 32, maximum: 65536 });
  const program = new WebAssembly.Instance(kernelModule('code'), { env: { memory } }).exports as CodeProgram;
  const workspaceBytes = roundedUp64(program.WORKSPACE_BYTES.value + MARGIN);
  let bytes = new Uint8Array(memory.buffer);
  return {
    program,
    bytes() {
      if (bytes.buffer !== memory.buffer) bytes = new Uint8Array(memory.buffer);
      return bytes;
    },
    layOut(scratchBytes, channels, planeBytes) {
      const scratch = workspaceBytes;
      const planes = roundedUp64(scratch + scratchBytes + MARGIN);
      const step = roundedUp64(planeBytes + MARGIN);
      return { scratch, planes, step, file: planes + channels * step };
    },
    reserve(end) {
      const missing = end - memory.buffer.byteLength;
      if (missing > 0) memory.grow(Math.ceil(missing / PAGE));
    },
  };
}
