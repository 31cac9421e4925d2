import { LANE_COUNTS, LITERAL_COUNTS } from './workspace';

/** Bytes of the smallest block of which a quarter tells whether it is noise. */
const SMALLEST_NOISE: usize = 0x2000;

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

/**
 * LITERAL_COUNTS of the 256 bytes of a long block. A quarter of it is enough where all 256 occur in it, as the low bytes
 * of 16-bit samples see to: the codes become 0.1 % longer. Where some are missing the rest is counted too, for every
 * byte needs a code, and codes for bytes that never come would cost more (they made normals 3 % larger).
 */
export function countLongBlock(from: usize, to: usize): void {
  const quarter = (to - from) >> 2;
  const sixteenth = quarter >> 2;
  beginByteCounts();
  for (let part: usize = 0; part < 4; part++) {
    countBytes(from + part * quarter, from + part * quarter + sixteenth);
  }
  endByteCounts(4);
  if (everyByteOccurs()) return;
  for (let part: usize = 0; part < 4; part++) {
    const end = part < 3 ? from + part * quarter + quarter : to;
    countBytes(from + part * quarter + sixteenth, end);
  }
  endByteCounts(1);
}

function everyByteOccurs(): bool {
  for (let s: usize = 0; s < 1024; s += 4) if (load<u32>(LITERAL_COUNTS + s) === 0) return false;
  return true;
}

/**
 * Whether the first quarter of the bytes looks evenly spread, so that codes could save half a percent at most.
 *
 * The sum of c (c - 1) over the counts c of n bytes is n (n - 1) times the chance that two of them are equal: 1/256 for
 * noise. At 1.03/256 the collision entropy, and so the entropy, is above 7.957 bits. One standard deviation of the sum
 * is 1.1 % for the 2048 bytes of the smallest block and falls as 1 / n.
 */
export function isNoise(from: usize, to: usize): bool {
  if (to - from < SMALLEST_NOISE) return false;
  const n = (to - from) >> 2;
  beginByteCounts();
  countBytes(from, from + n);
  endByteCounts(1);
  let coincidences: u64 = 0;
  for (let s: usize = 0; s < 1024; s += 4) {
    const count = <u64>load<u32>(LITERAL_COUNTS + s);
    coincidences += count * (count - 1);
  }
  return coincidences * 25600 < <u64>n * (n - 1) * 103;
}
