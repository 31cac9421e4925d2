import { adler32 } from './adler32';
import { alignToByte, beginBits, bitCursor, putBits } from './bit-writer';
import { putCompressed } from './deflate';

/*
 * The envelope of zlib: two bytes, DEFLATE blocks, the checksum of what they hold.
 * Source: RFC 1950.
 */

/** Compression method 8 with a window of 32768 bytes; the fastest level; no dictionary; divisible by 31. */
const HEADER: u64 = 0x0178;

let checksum: u32 = 1;

export function beginZlib(at: usize): void {
  checksum = 1;
  beginBits(at);
  putBits(HEADER, 16);
}

/** Appends bytes; see putCompressed. */
export function putZlib(start: usize, from: usize, to: usize, kind: usize, isLast: bool): void {
  checksum = adler32(checksum, from, to);
  putCompressed(start, from, to, kind, isLast);
}

/** Ends the stream, behind its last bytes. Returns the address behind it. */
export function endZlib(): usize {
  alignToByte();
  putBits(bswap<u32>(checksum), 32);
  return bitCursor();
}

/**
 * A stream of its own for some bytes.
 * @param out receives it; room for twice the bytes, or for 64 KiB where that is more
 * @param kind see putCompressed
 * @returns bytes written
 */
export function putStream(out: usize, from: usize, to: usize, kind: usize): usize {
  beginZlib(out);
  putZlib(from, from, to, kind, true);
  return endZlib() - out;
}
