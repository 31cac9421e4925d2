/** One class of the sea-state code. */
export interface SeaState {
  readonly code: number;
  readonly word: string;
  /** Significant heights of the class: above `overM`, up to and including `upToM`. */
  readonly overM: number;
  readonly upToM: number;
}

/** State of the sea by significant height. Source: WMO code table 3700. */
export const SEA_STATES: readonly SeaState[] = Object.freeze([
  { code: 0, word: 'calm (glassy)', overM: -Infinity, upToM: 0 },
  { code: 1, word: 'calm (rippled)', overM: 0, upToM: 0.1 },
  { code: 2, word: 'smooth', overM: 0.1, upToM: 0.5 },
  { code: 3, word: 'slight', overM: 0.5, upToM: 1.25 },
  { code: 4, word: 'moderate', overM: 1.25, upToM: 2.5 },
  { code: 5, word: 'rough', overM: 2.5, upToM: 4 },
  { code: 6, word: 'very rough', overM: 4, upToM: 6 },
  { code: 7, word: 'high', overM: 6, upToM: 9 },
  { code: 8, word: 'very high', overM: 9, upToM: 14 },
  { code: 9, word: 'phenomenal', overM: 14, upToM: Infinity },
]);

/** One force of the Beaufort scale. */
export interface BeaufortForce {
  readonly force: number;
  readonly word: string;
  /** The weakest and the strongest wind at 10 m that count as this force, m/s. */
  readonly fromMps: number;
  readonly toMps: number;
  /** Heights to expect well out at sea, m; `Infinity` where the scale names none. */
  readonly probableHeightM: number;
  readonly maximumHeightM: number;
}

/**
 * Wind forces with the waves they raise on the open sea. The probable height is what an observer sees, about half of
 * a fully developed sea's significant height from force 9 on.
 * Source: Beaufort scale, heights as printed by the Met Office, speed limits and words from memory.
 */
export const BEAUFORT_FORCES: readonly BeaufortForce[] = Object.freeze([
  beaufort(0, 'calm', 0, 0.2, 0, 0),
  beaufort(1, 'light air', 0.3, 1.5, 0.1, 0.1),
  beaufort(2, 'light breeze', 1.6, 3.3, 0.2, 0.3),
  beaufort(3, 'gentle breeze', 3.4, 5.4, 0.6, 1),
  beaufort(4, 'moderate breeze', 5.5, 7.9, 1, 1.5),
  beaufort(5, 'fresh breeze', 8, 10.7, 2, 2.5),
  beaufort(6, 'strong breeze', 10.8, 13.8, 3, 4),
  beaufort(7, 'near gale', 13.9, 17.1, 4, 5.5),
  beaufort(8, 'gale', 17.2, 20.7, 5.5, 7.5),
  beaufort(9, 'strong gale', 20.8, 24.4, 7, 10),
  beaufort(10, 'storm', 24.5, 28.4, 9, 12.5),
  beaufort(11, 'violent storm', 28.5, 32.6, 11.5, 16),
  beaufort(12, 'hurricane', 32.7, Infinity, 14, Infinity),
]);

/**
 * The sea state of a significant height; a height on a border belongs to the lower class.
 *
 * @param significantHeightM m, >= 0
 * @throws RangeError if it is negative or not a number
 */
export function seaState(significantHeightM: number): SeaState {
  const state = SEA_STATES.find(({ upToM }) => significantHeightM <= upToM);
  if (state === undefined || significantHeightM < 0) {
    throw new RangeError(`significant height must be >= 0 m, found ${significantHeightM}`);
  }
  return state;
}

/**
 * The Beaufort force of a wind speed. Speeds are given to .1 m/s in the scale; in between, the lower force counts.
 *
 * @param windSpeedMps U10, m/s, >= 0
 * @throws RangeError if it is negative or not a number
 */
export function beaufortForce(windSpeedMps: number): BeaufortForce {
  const force = BEAUFORT_FORCES.findLast(({ fromMps }) => windSpeedMps >= fromMps);
  if (force === undefined) throw new RangeError(`wind speed must be >= 0 m/s, found ${windSpeedMps}`);
  return force;
}

/**
 * The wind speed that stands for a Beaufort force.
 *
 *     U10 = .836 B^(3/2)
 *
 * Source: Stewart 2008, ch. 4.
 *
 * @param force B, 0 .. 12
 * @returns m/s
 */
export function beaufortWindSpeed(force: number): number {
  return 0.836 * force ** 1.5;
}

function beaufort(
  force: number,
  word: string,
  fromMps: number,
  toMps: number,
  probableHeightM: number,
  maximumHeightM: number,
): BeaufortForce {
  return Object.freeze({ force, word, fromMps, toMps, probableHeightM, maximumHeightM });
}
