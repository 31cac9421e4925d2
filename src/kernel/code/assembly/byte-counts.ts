import { LANE_COUNTS, LITERAL_COUNTS } from './workspace';

/** Begins to count the bytes of a block. */
export function beginByteCounts(): void {
  memory.fill(LANE_COUNTS, 0, 4 * 1024);
}

/**
 * Counts bytes. Four counts take turns, because equal bytes follow one another and an addition in memory waits for the
 * last one to the same place.
 */
export function countBytes(from: usize, to: usize): void {
  for (; from + 8 <= to; from += 8) {
    const eight = load<u64>(from);
    addOne(<usize>(eight << 2) & 0x3fc);
    addOne((<usize>(eight >> 6) & 0x3fc) + 1024);
    addOne((<usize>(eight >> 14) & 0x3fc) + 2048);
    addOne((<usize>(eight >> 22) & 0x3fc) + 3072);
    addOne(<usize>(eight >> 30) & 0x3fc);
    addOne((<usize>(eight >> 38) & 0x3fc) + 1024);
    addOne((<usize>(eight >> 46) & 0x3fc) + 2048);
    addOne((<usize>(eight >> 54) & 0x3fc) + 3072);
  }
  for (; from < to; from++) addOne((<usize>load<u8>(from)) << 2);
}

function addOne(offset: usize): void {
  store<u32>(offset, load<u32>(offset, LANE_COUNTS) + 1, LANE_COUNTS);
}

/** LITERAL_COUNTS of the 256 bytes = `weight` times what was counted so far. */
export function endByteCounts(weight: u32): void {
  for (let s: usize = 0; s < 1024; s += 16) {
    const first = i32x4.add(v128.load(s, LANE_COUNTS), v128.load(s, LANE_COUNTS + 1024));
    const second = i32x4.add(v128.load(s, LANE_COUNTS + 2048), v128.load(s, LANE_COUNTS + 3072));
    v128.store(s, i32x4.mul(i32x4.add(first, second), i32x4.splat(weight)), LITERAL_COUNTS);
  }
}
