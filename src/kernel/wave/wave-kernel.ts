import { roundedUp64 } from '../alignment.ts';
import { kernelModule } from '../kernel-binary.ts';

/** The kernel's functions; what they do and their arguments: src/kernel/wave/assembly. Addresses are in bytes. */
export interface WaveProgram {
  evolveStill(h: number, coefficients: number, turns: number, phases: number, count: number): void;
  evolveMoving(h: number, coefficients: number, turns: number, phases: number, count: number): void;
  evolveStillRate(
    rate: number,
    coefficients: number,
    turns: number,
    phases: number,
    omega: number,
    count: number,
  ): void;
  evolveMovingRate(
    rate: number,
    coefficients: number,
    turns: number,
    phases: number,
    omega: number,
    count: number,
  ): void;
  transformGradient(plan: number, waves: number, h: number, gain: number, strips: number): void;
  transformHeight(plan: number, waves: number, h: number, gain: number, scale: number, strips: number): void;
  transformStrain(plan: number, waves: number, h: number, gain: number, strips: number): void;
  transformRow(plan: number, re: number, im: number, strips: number, row: number, inner: number): void;
  transformColumns(plan: number, strips: number, inner: number): void;
  fieldRows(
    out: number,
    field: number,
    scale: number,
    step: number,
    stripBytes: number,
    rows: number,
    columns: number,
  ): void;
  jacobianRows(
    out: number,
    xx: number,
    yy: number,
    xy: number,
    shearScale: number,
    step: number,
    stripBytes: number,
    rows: number,
    columns: number,
  ): void;
  normalRows(
    east: number,
    north: number,
    up: number,
    sx: number,
    sy: number,
    xx: number,
    yy: number,
    xy: number,
    shearScale: number,
    step: number,
    stripBytes: number,
    rows: number,
    columns: number,
  ): void;
  largestMagnitude(values: number, count: number): number;
  storeCodes(
    out: number,
    values: number,
    count: number,
    gain: number,
    offsets: number,
    offsetStep: number,
    largest: number,
    statistics: number,
  ): void;
  storeHalves(
    out: number,
    values: number,
    count: number,
    gain: number,
    shift: number,
    statistics: number,
  ): void;
  storeFloats(
    out: number,
    values: number,
    count: number,
    gain: number,
    shift: number,
    statistics: number,
  ): void;
  pack8(out: number, codes: number, count: number): void;
  pack16(out: number, codes: number, count: number): void;
  packThree8(out: number, codes: number, apart: number, count: number): void;
  packThree16(out: number, codes: number, apart: number, count: number): void;
}

/**
 * A kernel with a memory of its own, private to its thread: copying out of shared WebAssembly memory was measured 3 to 14
 * times slower.
 *
 * The memory has two parts. What is kept stays for good and grows upward. What is lent lies behind it and serves one
 * borrower at a time: keeping or lending anew ends what was lent before.
 */
export interface WaveKernel {
  readonly program: WaveProgram;
  /** The memory as it is now; keeping or lending may replace it. */
  readonly buffer: ArrayBuffer;
  /** Address of new bytes that stay, a multiple of 64. They are zero. */
  keep(bytes: number): number;
  /** Address of bytes to use until the next `keep` or `lend`, a multiple of 64. They hold anything. */
  lend(bytes: number): number;
  /** Bytes that are kept, and of the whole memory. */
  readonly keptBytes: number;
  readonly memoryBytes: number;
}

const PAGE = 65536;

/** Most bytes one WebAssembly memory can have. */
export const LARGEST_MEMORY: number = 65536 * PAGE;

/** What the compiled program itself needs at the bottom of the memory. */
const PROGRAM_BYTES = 1024;

/** A new kernel. Its memory grows as it is asked for. */
export function waveKernel(): WaveKernel {
  const memory = new WebAssembly.Memory({ initial: 1, maximum: LARGEST_MEMORY / PAGE });
  const program = new WebAssembly.Instance(kernelModule('wave'), { env: { memory } }).exports as WaveProgram;
  let kept = PROGRAM_BYTES;
  const reserve = (end: number): void => {
    const missing = end - memory.buffer.byteLength;
    if (missing > 0) memory.grow(Math.ceil(missing / PAGE));
  };
  return {
    program,
    get buffer() {
      return memory.buffer;
    },
    keep(bytes) {
      const address = kept;
      kept = roundedUp64(address + bytes);
      reserve(kept);
      new Uint8Array(memory.buffer, address, kept - address).fill(0);
      return address;
    },
    lend(bytes) {
      reserve(kept + bytes);
      return kept;
    },
    get keptBytes() {
      return kept;
    },
    get memoryBytes() {
      return memory.buffer.byteLength;
    },
  };
}
