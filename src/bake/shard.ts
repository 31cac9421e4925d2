import { SAMPLE_BYTES } from '../image/image.ts';
import type { Plan, PlannedCascade } from '../plan/plan.ts';
import type { FrameId } from './jobs.ts';
import type { FrameRange, Part } from './options.ts';

/**
 * The frames a run is to make: of all cascades, those in the range or all, or one shard of those. In the order of
 * frames, cascades side by side.
 */
export function wantedFrames(plan: Plan, range: FrameRange | null, shard: Part | null): readonly FrameId[] {
  const { firstFrame } = plan.loop;
  const inRange = (frame: number): boolean =>
    range === null || (frame + firstFrame >= range.first && frame + firstFrame <= range.last);
  const all = plan.cascades.flatMap(({ loop }, cascade) =>
    Array.from({ length: loop.frameCount }, (_, frame): FrameId => ({ cascade, frame })),
  );
  const wanted = all.filter(({ frame }) => inRange(frame));
  const own = shard === null ? wanted : shardOf(plan, wanted, shard);
  return own.toSorted((a, b) => a.frame - b.frame || a.cascade - b.cascade);
}

/**
 * One shard's frames: dealt out from the dearest cascade to the cheapest, each to the shard that has least to do, so
 * that no two shards differ by more than the dearest frame. Whole numbers throughout: every machine deals alike.
 */
function shardOf(plan: Plan, frames: readonly FrameId[], { index, count }: Part): readonly FrameId[] {
  const costs = plan.cascades.map(frameCost);
  const dearestFirst = frames.toSorted(
    (a, b) => costs[b.cascade] - costs[a.cascade] || a.cascade - b.cascade || a.frame - b.frame,
  );
  // Loads of the shards, least first; of equal ones the lower number first.
  const hands = Array.from({ length: count }, (_, i) => ({ shard: i + 1, load: 0 }));
  const own: FrameId[] = [];
  for (const id of dearestFirst) {
    const [least] = hands.splice(0, 1);
    if (least.shard === index) own.push(id);
    const hand = { shard: least.shard, load: least.load + costs[id.cascade] };
    hands.splice(insertionIndex(hands, hand), 0, hand);
  }
  return own;
}

interface Hand {
  readonly shard: number;
  readonly load: number;
}

/** Where a hand belongs among sorted ones. */
function insertionIndex(hands: readonly Hand[], hand: Hand): number {
  let [low, high] = [0, hands.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    const { load, shard } = hands[middle];
    if (load < hand.load || (load === hand.load && shard < hand.shard)) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** Work of one frame in some unit, a whole number: transforms and bytes to encode, a texel. */
export function frameCost({ resolution: N, maps, foam }: PlannedCascade): number {
  const stored = maps.reduce((sum, { channels, sample }) => sum + channels.length * SAMPLE_BYTES[sample], 0);
  const log2N = 31 - Math.clz32(N);
  return N * N * (4 * log2N + 5 * stored + (foam === null ? 0 : 6));
}

/** One part of a cascade's foam: a run of frames [from, to). */
export function foamRun(frameCount: number, { index, count }: Part): readonly [number, number] {
  return [Math.floor(((index - 1) * frameCount) / count), Math.floor((index * frameCount) / count)];
}
