import type { ChannelStatistics } from '../maps/encoded-map.ts';
import { MAP_NAMES, type MapName } from '../sea/sea.ts';
import type { FrameResult, WrittenFile } from './jobs.ts';

/** A journal line: one finished frame of one cascade, with the exact figures of what was written. */
export type JournalEntry = Omit<FrameResult, 'seconds'>;

/** Whether a parsed journal line has the shape of an entry. Journals lie on shared disks: nothing is taken on trust. */
export function isJournalEntry(value: unknown): value is JournalEntry {
  if (!isRecord(value)) return false;
  return (
    (value.kind === 'frame' || value.kind === 'foam') &&
    isCount(value.cascade) &&
    isCount(value.frame) &&
    Array.isArray(value.files) &&
    value.files.every(isWrittenFile) &&
    isRecord(value.statistics) &&
    Object.entries(value.statistics).every(
      ([map, list]) => MAP_NAMES.includes(map as MapName) && Array.isArray(list) && list.every(isStatistics),
    )
  );
}

function isWrittenFile(value: unknown): value is WrittenFile {
  return (
    isRecord(value) &&
    typeof value.path === 'string' &&
    isCount(value.bytes) &&
    typeof value.sha256 === 'string' &&
    /^sha256:[0-9a-f]{64}$/.test(value.sha256)
  );
}

function isStatistics(value: unknown): value is ChannelStatistics {
  return (
    isRecord(value) &&
    ['sum', 'sumOfSquares', 'min', 'max', 'clipped'].every((key) => Number.isFinite(value[key]))
  );
}

function isRecord(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

function isCount(value: unknown): value is number {
  return Number.isSafeInteger(value) && (value as number) >= 0;
}
