import { BEAUFORT_FORCES, SEA_STATES } from '../physics/sea-states.ts';
import type { GrowthName, WindSeaRequest } from '../sea/sea.ts';

// How the numbers of a wave system were reached, in the words of its `basis`.

/** Names of the growth laws in print. */
export const GROWTH_WORDS: Readonly<Record<GrowthName, string>> = Object.freeze({
  jonswap: 'JONSWAP 1973 fetch law',
  'kahma-calkoen': 'Kahma & Calkoen 1992',
  'shore-protection-manual': 'Shore Protection Manual 1984',
  wilson: 'Wilson 1965',
  'young-verhagen': 'Young & Verhagen 1996',
});

/** `12.3 m/s wind`, with what it was made from where that is not the wind at 10 m itself. */
export function windWords({ wind, windSpeedMps }: WindSeaRequest): string {
  const U10 = `${(windSpeedMps ?? 0).toFixed(1)} m/s`;
  if (wind?.by === 'beaufort') {
    const { force, word, fromMps, toMps } = BEAUFORT_FORCES[wind.force];
    const range = toMps === Infinity ? `from ${fromMps} m/s` : `${fromMps} to ${toMps} m/s`;
    return `Beaufort ${force}, ${word} (${range}): ${U10} wind`;
  }
  if (wind?.by === 'speed' && wind.heightM !== 10) {
    return `${wind.speedMps.toFixed(1)} m/s wind at ${wind.heightM} m, ${U10} at 10 m (log law, drag of Wu 1982)`;
  }
  return `${U10} wind`;
}

/** `sea state 5, rough (2.5 to 4 m): ` where a height stands for a class of the code, else nothing. */
export function seaStateWords(code: number | null): string {
  if (code === null) return '';
  const { word, overM, upToM } = SEA_STATES[code];
  const range = upToM === Infinity ? `over ${overM} m` : `${overM} to ${upToM} m`;
  return `sea state ${code}, ${word} (${range}): `;
}

/** A number as a basis prints it. */
export function inShort(value: number, digits = 3): string {
  return String(Number(value.toPrecision(digits)));
}
