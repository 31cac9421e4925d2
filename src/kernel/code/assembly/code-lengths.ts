import { LANE_COUNTS, LENGTH_COUNTS, SORTED, SORTED_SPARE } from './workspace';

/** u32[256]: where the next key with each digit goes. The counts of bytes have been added up by then. */
const DIGIT_PLACES: usize = LANE_COUNTS;

/**
 * Lengths of a prefix code that is as short as can be for the counts, with no code longer than `limit` bits.
 *
 * Source of the lengths: Moffat and Katajainen 1995, "In-place calculation of minimum-redundancy codes"; of the limit:
 * JPEG (ISO/IEC 10918-1), annex K.2, "adjust BITS". Both from memory. Where the limit binds, the code is at most a few
 * parts in a thousand longer than the one of package-merge, which needs 13 passes in place of one.
 *
 * @param lengths receives u8[symbols]: bits of each code, 0 where the count is 0
 * @param counts u32[symbols], each below 2^23, their sum below 2^32; a symbol that stands alone gets one bit
 * @param symbols size of the alphabet, at most 288
 * @param limit at most 15, and 2^limit not below the number of symbols that occur
 */
export function fillCodeLengths(lengths: usize, counts: usize, symbols: usize, limit: usize): void {
  memory.fill(lengths, 0, symbols);
  const n = sortSymbols(counts, symbols);
  if (n === 0) return;
  if (n === 1) {
    store<u8>(lengths + (load<u32>(SORTED) & 0x1ff), 1);
    return;
  }
  fillLeafDepths(n);
  limitDepths(limit);
  // The rarest symbols get the longest codes.
  let place = SORTED;
  for (let depth: usize = limit; depth > 0; depth--) {
    for (let left = load<u32>(LENGTH_COUNTS + ((<usize>depth) << 2)); left > 0; left--, place += 4) {
      store<u8>(lengths + (load<u32>(place) & 0x1ff), <u8>depth);
    }
  }
}

/**
 * SORTED = symbols that occur, `count << 9 | symbol`, by rising count and within one count by rising symbol: a radix
 * sort over the bytes of the count.
 * @returns how many there are
 */
function sortSymbols(counts: usize, symbols: usize): i32 {
  let n = 0;
  let largest: u32 = 0;
  for (let s: usize = 0; s < symbols; s++) {
    const count = load<u32>(counts + ((<usize>s) << 2));
    if (count === 0) continue;
    store<u32>(SORTED + ((<usize>n) << 2), (count << 9) | <u32>s);
    n++;
    if (count > largest) largest = count;
  }
  let from = SORTED;
  let to = SORTED_SPARE;
  for (let shift = 9; largest > 0; shift += 8, largest >>= 8) {
    sortByByte(from, to, n, shift);
    const sorted = to;
    to = from;
    from = sorted;
  }
  if (from !== SORTED) memory.copy(SORTED, from, (<usize>n) << 2);
  return n;
}

/** One stable pass of the radix sort, over the byte of the keys that begins at bit `shift`. */
function sortByByte(from: usize, to: usize, n: i32, shift: i32): void {
  memory.fill(DIGIT_PLACES, 0, 1024);
  const end = from + ((<usize>n) << 2);
  for (let p = from; p < end; p += 4) {
    const place = DIGIT_PLACES + ((<usize>((load<u32>(p) >> shift) & 0xff)) << 2);
    store<u32>(place, load<u32>(place) + 4);
  }
  let sum: u32 = <u32>to;
  for (let digit: usize = 0; digit < 1024; digit += 4) {
    const bytes = load<u32>(DIGIT_PLACES + digit);
    store<u32>(DIGIT_PLACES + digit, sum);
    sum += bytes;
  }
  for (let p = from; p < end; p += 4) {
    const key = load<u32>(p);
    const place = DIGIT_PLACES + ((<usize>((key >> shift) & 0xff)) << 2);
    const target = load<u32>(place);
    store<u32>(target, key);
    store<u32>(place, target + 4);
  }
}

/**
 * LENGTH_COUNTS[d] = leaves at depth d of a Huffman tree over the n >= 2 counts in SORTED.
 *
 * The array A goes, in place, from weights to parents to depths of internal nodes. A count of 2^23 and 288 symbols
 * keep weights below 2^32 and depths below 48 (a tree of depth d needs a Fibonacci number of occurrences).
 */
function fillLeafDepths(n: i32): void {
  const A = SORTED_SPARE;
  for (let i: usize = 0; i < (<usize>n) << 2; i += 4) store<u32>(A + i, load<u32>(SORTED + i) >> 9);

  // Weights: each internal node is the sum of the two lightest that have no parent yet, leaf or internal.
  let root = 0;
  let leaf = 0;
  for (let next = 0; next < n - 1; next++) {
    let weight: u32 = 0;
    for (let child = 0; child < 2; child++) {
      const internal = root < next ? at(A, root) : u32.MAX_VALUE;
      if (leaf < n && at(A, leaf) <= internal) {
        weight += at(A, leaf);
        leaf++;
      } else {
        weight += internal;
        put(A, root, next);
        root++;
      }
    }
    put(A, next, weight);
  }

  // Depths of internal nodes, from the root down; a parent stands behind its children.
  put(A, n - 2, 0);
  for (let next = n - 3; next >= 0; next--) put(A, next, at(A, <i32>at(A, next)) + 1);

  // Leaves: of the nodes that a depth has room for, those that are not internal.
  memory.fill(LENGTH_COUNTS, 0, 4 * 64);
  let room = 1;
  let internal = n - 2;
  for (let depth = 0; room > 0; depth++) {
    let used = 0;
    while (internal >= 0 && <i32>at(A, internal) === depth) {
      used++;
      internal--;
    }
    put(LENGTH_COUNTS, depth, room - used);
    room = 2 * used;
  }
}

/**
 * Moves leaves up until none is deeper than the limit: two siblings too deep become one, one level up, and the other
 * hangs beside a leaf that is lifted less deep. Keeps the tree full.
 */
function limitDepths(limit: usize): void {
  for (let depth: usize = 63; depth > limit; depth--) {
    while (at(LENGTH_COUNTS, depth) > 0) {
      let shallow = depth - 2;
      while (at(LENGTH_COUNTS, shallow) === 0) shallow--;
      put(LENGTH_COUNTS, depth, at(LENGTH_COUNTS, depth) - 2);
      put(LENGTH_COUNTS, depth - 1, at(LENGTH_COUNTS, depth - 1) + 1);
      put(LENGTH_COUNTS, shallow + 1, at(LENGTH_COUNTS, shallow + 1) + 2);
      put(LENGTH_COUNTS, shallow, at(LENGTH_COUNTS, shallow) - 1);
    }
  }
}

function at(array: usize, index: usize): u32 {
  return load<u32>(array + (index << 2));
}

function put(array: usize, index: usize, value: u32): void {
  store<u32>(array + (index << 2), value);
}
