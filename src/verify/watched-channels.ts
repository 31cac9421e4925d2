import type { Quantity } from '../image/image.ts';
import type { ManifestCascade } from '../manifest/manifest.ts';

/**
 * The channel by which each map's steps in time and space are followed: the one that varies most. Foam is left out: it
 * comes in bursts, and has a law of its own.
 */
export function watchedChannels({ maps }: ManifestCascade): readonly Quantity[] {
  return Object.entries(maps).flatMap(([name, { channels }]) => {
    if (name === 'foam') return [];
    const [most] = [...channels].sort((a, b) => b.written.deviation - a.written.deviation);
    return [most.quantity];
  });
}
