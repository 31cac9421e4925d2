import { bitCursor, MOST_BITS, putCode, resumeBits, waitingBits, waitingCount } from './bit-writer';
import { LENGTH_BITS, LENGTH_MASK } from './canonical-code';
import {
  distanceExtraBits,
  distanceOf,
  distanceSymbol,
  lengthExtraBits,
  lengthOf,
  lengthSymbol,
  literalsOf,
} from './sequences';
import { DISTANCE_CODES, LITERAL_CODES, PAIR_CODES } from './workspace';

/*
 * The loops that write the symbols of a block. They keep the waiting bits in registers, and flush as seldom as the
 * longest codes allow: a flush takes as many instructions as the codes of two bytes.
 *
 * Measured, ns a byte: displacement, 16 bits (6.8 bits a byte) / normals, 8 bits (3.2 bits a byte)
 *     single bytes, flush every four     0.94   0.98
 *     pairs, flush every four            0.69   0.62
 *     pairs, flush every six             0.65   0.59
 *     pairs, flush every eight           1.25   0.52
 */

/**
 * Writes sequences.
 *
 * Literals go four at a time; the last 0 to 3 of a sequence too, with empty codes behind them, for no branch can
 * foretell how many there are. A match is one piece, of at most 12 + 5 + 12 + 13 bits.
 *
 * @param sequences the list
 * @param from the first byte of the block; three bytes behind its end are read
 */
export function putSequences(sequences: usize, from: usize): void {
  let waiting = waitingBits();
  let count = waitingCount();
  let out = bitCursor();
  for (let s = sequences; ; s += 8) {
    const to = from + literalsOf(s);
    for (; from + 4 <= to; from += 4) {
      const four = load<u32>(from);
      const a = <u64>load<u32>((four & 0xff) << 2, LITERAL_CODES);
      const b = <u64>load<u32>((four >> 6) & 0x3fc, LITERAL_CODES);
      const c = <u64>load<u32>((four >> 14) & 0x3fc, LITERAL_CODES);
      const d = <u64>load<u32>((four >> 22) & 0x3fc, LITERAL_CODES);
      const ab = (a >> LENGTH_BITS) | ((b >> LENGTH_BITS) << a);
      const cd = (c >> LENGTH_BITS) | ((d >> LENGTH_BITS) << c);
      waiting |= (ab | (cd << (a + b))) << count;
      count += (a + b + c + d) & LENGTH_MASK;
      store<u64>(out, waiting);
      out += <usize>(count >> 3);
      waiting >>= count & 56;
      count &= 7;
    }
    const left = <i64>(to - from);
    const rest = load<u32>(from);
    const e = <u64>load<u32>((rest & 0xff) << 2, LITERAL_CODES) & ifLess(0, left);
    const f = <u64>load<u32>((rest >> 6) & 0x3fc, LITERAL_CODES) & ifLess(1, left);
    const g = <u64>load<u32>((rest >> 14) & 0x3fc, LITERAL_CODES) & ifLess(2, left);
    const ef = (e >> LENGTH_BITS) | ((f >> LENGTH_BITS) << e);
    waiting |= (ef | ((g >> LENGTH_BITS) << (e + f))) << count;
    count += (e + f + g) & LENGTH_MASK;
    store<u64>(out, waiting);
    out += <usize>(count >> 3);
    waiting >>= count & 56;
    count &= 7;

    const length = lengthOf(s);
    if (length === 0) break;
    from = to + length;
    const lengthCode = <u64>load<u32>(LITERAL_CODES + (lengthSymbol(length) << 2));
    waiting |= (lengthCode >> LENGTH_BITS) << count;
    count += lengthCode & LENGTH_MASK;
    const lengthBits = <u64>lengthExtraBits(length);
    waiting |= (<u64>(length - 3) & (((<u64>1) << lengthBits) - 1)) << count;
    count += lengthBits;
    const distance = distanceOf(s);
    const distanceCode = <u64>load<u32>(DISTANCE_CODES + (distanceSymbol(distance) << 2));
    waiting |= (distanceCode >> LENGTH_BITS) << count;
    count += distanceCode & LENGTH_MASK;
    const distanceBits = <u64>distanceExtraBits(distance);
    waiting |= (<u64>(distance - 1) & (((<u64>1) << distanceBits) - 1)) << count;
    count += distanceBits;
    store<u64>(out, waiting);
    out += <usize>(count >> 3);
    waiting >>= count & 56;
    count &= 7;
  }
  resumeBits(waiting, count, out);
}

/** All ones where a < b, else 0. */
function ifLess(a: i64, b: i64): u64 {
  return <u64>((a - b) >> 63);
}

/**
 * Writes literals by the codes of pairs, six before a flush; where these need more bits than there is room for, which
 * is rare, one by one.
 */
export function putPairs(from: usize, to: usize): void {
  let waiting = waitingBits();
  let count = waitingCount();
  let out = bitCursor();
  for (; from + 8 <= to; from += 6) {
    const six = load<u64>(from);
    const a = <u64>load<u32>((<u32>six & 0xffff) << 2, PAIR_CODES);
    const b = <u64>load<u32>((<u32>six >> 16) << 2, PAIR_CODES);
    const c = <u64>load<u32>(<u32>(six >> 30) & 0x3fffc, PAIR_CODES);
    const length = (a + b + c) & LENGTH_MASK;
    if (length > MOST_BITS) {
      resumeBits(waiting, count, out);
      putEach(from, from + 6);
      waiting = waitingBits();
      count = waitingCount();
      out = bitCursor();
      continue;
    }
    const ab = (a >> LENGTH_BITS) | ((b >> LENGTH_BITS) << a);
    waiting |= (ab | ((c >> LENGTH_BITS) << (a + b))) << count;
    count += length;
    store<u64>(out, waiting);
    out += <usize>(count >> 3);
    waiting >>= count & 56;
    count &= 7;
  }
  resumeBits(waiting, count, out);
  putEach(from, to);
}

/** As putPairs, eight before a flush. */
export function putShortPairs(from: usize, to: usize): void {
  let waiting = waitingBits();
  let count = waitingCount();
  let out = bitCursor();
  for (; from + 8 <= to; from += 8) {
    const eight = load<u64>(from);
    const a = <u64>load<u32>((<u32>eight & 0xffff) << 2, PAIR_CODES);
    const b = <u64>load<u32>((<u32>eight >> 16) << 2, PAIR_CODES);
    const c = <u64>load<u32>(<u32>(eight >> 30) & 0x3fffc, PAIR_CODES);
    const d = <u64>load<u32>(<u32>(eight >> 46) & 0x3fffc, PAIR_CODES);
    const length = (a + b + c + d) & LENGTH_MASK;
    if (length > MOST_BITS) {
      resumeBits(waiting, count, out);
      putEach(from, from + 8);
      waiting = waitingBits();
      count = waitingCount();
      out = bitCursor();
      continue;
    }
    const ab = (a >> LENGTH_BITS) | ((b >> LENGTH_BITS) << a);
    const cd = (c >> LENGTH_BITS) | ((d >> LENGTH_BITS) << c);
    waiting |= (ab | (cd << (a + b))) << count;
    count += length;
    store<u64>(out, waiting);
    out += <usize>(count >> 3);
    waiting >>= count & 56;
    count &= 7;
  }
  resumeBits(waiting, count, out);
  putEach(from, to);
}

function putEach(from: usize, to: usize): void {
  for (; from < to; from++) putCode(load<u32>(LITERAL_CODES + ((<usize>load<u8>(from)) << 2)));
}
