import { addSequence, beginSequences, LONGEST_MATCH } from './sequences';
import { RUN_SEQUENCES } from './workspace';

/**
 * Repeats from which on a run is written as a match at distance 1: what pays where the byte is cheap. Percent of raw,
 * blocks as here:
 *                                          3      5      8     12   none
 *     foam, 8 bits, not filtered        8.76   8.74   8.79   8.89   18.1
 *     normals, 8 bits, filtered        37.75  37.51  37.49  37.49   37.49
 *     Jacobian, half, high bytes               16.7   16.2   16.5   17.3
 *     displacement, half, high bytes           34.0   33.5   33.4   33.5
 */
const FEWEST_REPEATS: usize = 8;

/**
 * Finds runs of equal bytes; leaves the block as RUN_SEQUENCES.
 *
 * 64 bytes are compared with their predecessors at once. A run shows as a row of ones in the 64-bit result; where no
 * eight ones stand in a row, 57 bytes are passed over, because the last seven may begin one.
 *
 * @returns bytes in runs
 */
export function findRuns(from: usize, to: usize): usize {
  beginSequences(RUN_SEQUENCES);
  let literalsFrom = from;
  let repeated: usize = 0;
  let at = from + 1;
  while (at + 64 <= to) {
    const single = equalToPrevious(at);
    const pairs = single & (single >> 1);
    const fours = pairs & (pairs >> 2);
    const eights = fours & (fours >> 4);
    if (eights === 0) {
      at += 57;
      continue;
    }
    at += <usize>ctz(eights);
    const runEnd = endOfRun(at, to);
    repeated += runEnd - at;
    addRun(at - literalsFrom, runEnd - at);
    literalsFrom = runEnd;
    at = runEnd + 1;
  }
  for (; at + FEWEST_REPEATS <= to; at++) {
    const runEnd = endOfRun(at, to);
    if (runEnd - at < FEWEST_REPEATS) continue;
    repeated += runEnd - at;
    addRun(at - literalsFrom, runEnd - at);
    literalsFrom = runEnd;
    at = runEnd;
  }
  addSequence(to - literalsFrom, 0, 0);
  return repeated;
}

/** Bit i is set where the byte at `at + i` equals the one before it, for 64 bytes. */
function equalToPrevious(at: usize): u64 {
  return equalBits(at) | (equalBits(at + 16) << 16) | (equalBits(at + 32) << 32) | (equalBits(at + 48) << 48);
}

function equalBits(at: usize): u64 {
  return <u64>i8x16.bitmask(i8x16.eq(v128.load(at), v128.load(at - 1)));
}

/** Address of the first byte from `at` on that differs from the one before `at`. */
function endOfRun(at: usize, to: usize): usize {
  const byte = i8x16.splat(load<u8>(at - 1));
  while (at + 16 <= to) {
    const equal = i8x16.bitmask(i8x16.eq(v128.load(at), byte));
    if (equal !== 0xffff) return at + <usize>ctz(~equal);
    at += 16;
  }
  while (at < to && load<u8>(at) === load<u8>(at - 1)) at++;
  return at;
}

/** A run as matches of at most 258, none shorter than 3. */
function addRun(literals: usize, repeats: usize): void {
  while (repeats > 0) {
    const length =
      repeats > LONGEST_MATCH && repeats < LONGEST_MATCH + 3 ? repeats - 3 : min(repeats, LONGEST_MATCH);
    addSequence(literals, length, 1);
    literals = 0;
    repeats -= length;
  }
}
