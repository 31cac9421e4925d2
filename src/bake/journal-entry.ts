import type { ChannelStatistics } from '../maps/encoded-map.ts';
import type { PowerSums } from '../math/statistics.ts';
import type { Plan } from '../plan/plan.ts';
import { MAP_NAMES, type MapName } from '../sea/sea.ts';
import type { FrameResult, WrittenFile } from './jobs.ts';
import { expectedFiles } from './paths.ts';

/** A line of a journal. Every line names its plan, so that files of two plans are never taken for one bake. */
export type JournalLine = { readonly plan: string } & (Begin | FrameEntry | LevelEntry | End);

/** A process has begun to work. */
export interface Begin {
  readonly kind: 'begin';
  /** What it was told to make, for people: `bake`, `shard 2/8`, `frames 1-24`. */
  readonly task: string;
  readonly host: string;
  readonly pid: number;
}

/** One finished frame of one cascade, with the exact figures of what was written. */
export type FrameEntry = Omit<FrameResult, 'seconds'>;

/** The breaking level of a cascade's foam has been found. */
export interface LevelEntry {
  readonly kind: 'level';
  readonly cascade: number;
  /** J code at which foam starts. */
  readonly breakingCode: number;
  /** Mean of the written map over the loop and all texels. */
  readonly coverage: number;
  /** Why the target was missed, or null. */
  readonly note: string | null;
}

/** A process has ended of its own accord. */
export interface End {
  readonly kind: 'end';
  readonly outcome: 'done' | 'stopped' | 'failed';
}

/** A note about coverage is one sentence. */
const LONGEST_TEXT = 1000;

/** Whether a parsed line has the shape of one. Journals lie on shared disks: nothing is taken on trust. */
export function isJournalLine(value: unknown): value is JournalLine {
  if (!isRecord(value) || !isHash(value.plan)) return false;
  switch (value.kind) {
    case 'begin':
      return isText(value.task) && isText(value.host) && isCount(value.pid);
    case 'frame':
    case 'foam':
      return isFrameEntry(value);
    case 'level':
      return (
        isCount(value.cascade) &&
        isCount(value.breakingCode) &&
        value.breakingCode <= 65535 &&
        isShare(value.coverage) &&
        (value.note === null || isText(value.note))
      );
    case 'end':
      return value.outcome === 'done' || value.outcome === 'stopped' || value.outcome === 'failed';
    default:
      return false;
  }
}

/**
 * Whether a frame's line tells of what this plan makes: its files by name, and figures of each channel. Nothing else
 * is ever read or counted, so a journal cannot name a file that is not the bake's.
 */
export function isOfPlan(plan: Plan, entry: FrameEntry): boolean {
  const cascade = plan.cascades.at(entry.cascade);
  if (cascade === undefined || entry.frame >= cascade.loop.frameCount) return false;
  const paths = expectedFiles(plan, entry.kind, entry);
  if (paths.length === 0 || paths.join('\n') !== entry.files.map(({ path }) => path).join('\n')) return false;
  const maps = cascade.maps.filter(({ map }) => (map === 'foam') === (entry.kind === 'foam'));
  return (
    maps.length === Object.keys(entry.statistics).length &&
    maps.every(({ map, channels }) => entry.statistics[map]?.length === channels.length)
  );
}

function isFrameEntry(value: Readonly<Record<string, unknown>>): boolean {
  return (
    isCount(value.cascade) &&
    isCount(value.frame) &&
    Array.isArray(value.files) &&
    value.files.every(isWrittenFile) &&
    isRecord(value.statistics) &&
    Object.entries(value.statistics).every(
      ([map, list]) => MAP_NAMES.includes(map as MapName) && Array.isArray(list) && list.every(isStatistics),
    ) &&
    (value.heights === null || isPowerSums(value.heights)) &&
    (value.foldedTexels === null || isCount(value.foldedTexels))
  );
}

function isWrittenFile(value: unknown): value is WrittenFile {
  return isRecord(value) && isText(value.path) && isCount(value.bytes) && isHash(value.sha256);
}

function isStatistics(value: unknown): value is ChannelStatistics {
  return (
    isRecord(value) &&
    ['sum', 'sumOfSquares', 'min', 'max'].every((key) => Number.isFinite(value[key])) &&
    isCount(value.clipped)
  );
}

function isPowerSums(value: unknown): value is PowerSums {
  return (
    isRecord(value) &&
    ['count', 'sum', 'squares', 'cubes', 'fourths', 'minimum', 'maximum'].every((key) =>
      Number.isFinite(value[key]),
    )
  );
}

function isRecord(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

function isText(value: unknown): value is string {
  return typeof value === 'string' && value.length <= LONGEST_TEXT;
}

function isHash(value: unknown): value is string {
  return typeof value === 'string' && /^sha256:[0-9a-f]{64}$/.test(value);
}

function isCount(value: unknown): value is number {
  return Number.isSafeInteger(value) && (value as number) >= 0;
}

function isShare(value: unknown): value is number {
  return typeof value === 'number' && value >= 0 && value <= 1;
}
