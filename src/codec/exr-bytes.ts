import { damage } from './damage.ts';

/*
 * The basic data types of OpenEXR: little-endian numbers and zero-terminated names. The functions that make bytes
 * return new arrays.
 */

const encoder = new TextEncoder();
const decoder = new TextDecoder();

/** One byte. */
export function uint8(value: number): Uint8Array {
  return Uint8Array.of(value);
}

/** A 32-bit integer; unsigned ones have the same bytes. */
export function int32LE(value: number): Uint8Array {
  const bytes = new Uint8Array(4);
  new DataView(bytes.buffer).setInt32(0, value, true);
  return bytes;
}

/** A 64-bit unsigned integer. */
export function uint64LE(value: number): Uint8Array {
  const bytes = new Uint8Array(8);
  new DataView(bytes.buffer).setBigUint64(0, BigInt(value), true);
  return bytes;
}

/** A binary32 number. */
export function floatLE(value: number): Uint8Array {
  const bytes = new Uint8Array(4);
  new DataView(bytes.buffer).setFloat32(0, value, true);
  return bytes;
}

/** A text of the `string` type, whose length stands before it. */
export function utf8(text: string): Uint8Array {
  return encoder.encode(text);
}

/** A name: its bytes and a 0. */
export function nullTerminated(text: string): Uint8Array {
  return encoder.encode(`${text}\0`);
}

/** Reads the basic types one after another and refuses to step over the end. */
export interface ExrReader {
  readonly offset: () => number;
  readonly seek: (offset: number) => void;
  readonly uint8: () => number;
  readonly int32: () => number;
  readonly float: () => number;
  readonly double: () => number;
  /** An offset in the file; refused where it exceeds 2^53. */
  readonly uint64: () => number;
  /** A zero-terminated name of at most 255 bytes. */
  readonly name: () => string;
  readonly text: (length: number) => string;
  /** A view of the next bytes, not a copy. */
  readonly view: (length: number) => Uint8Array;
}

/**
 * A reader over some bytes, which stay the caller's.
 * @param source what to call the file in messages
 * @throws InputError from each of its methods where the bytes end too soon
 */
export function exrReader(bytes: Uint8Array, source: string): ExrReader {
  const numbers = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  let at = 0;

  /** Steps over `length` bytes and returns where they began. */
  function step(length: number): number {
    if (length < 0 || at + length > bytes.length) {
      throw damage(source, `byte ${at}`, `${length} more bytes`, `${bytes.length - at}`);
    }
    at += length;
    return at - length;
  }

  function view(length: number): Uint8Array {
    const start = step(length);
    return bytes.subarray(start, start + length);
  }

  return {
    offset: () => at,
    seek(offset) {
      if (offset > bytes.length) throw damage(source, `byte ${at}`, 'an offset inside the file', `${offset}`);
      at = offset;
    },
    uint8: () => numbers.getUint8(step(1)),
    int32: () => numbers.getInt32(step(4), true),
    float: () => numbers.getFloat32(step(4), true),
    double: () => numbers.getFloat64(step(8), true),
    uint64() {
      const value = Number(numbers.getBigUint64(step(8), true));
      if (!Number.isSafeInteger(value)) throw damage(source, `byte ${at}`, 'an offset', `${value}`);
      return value;
    },
    name() {
      const end = bytes.subarray(at, at + 256).indexOf(0);
      if (end < 0) throw damage(source, `byte ${at}`, 'a name of at most 255 bytes', 'no end of it');
      const text = decoder.decode(bytes.subarray(at, at + end));
      at += end + 1;
      return text;
    },
    text: (length) => decoder.decode(view(length)),
    view,
  };
}
