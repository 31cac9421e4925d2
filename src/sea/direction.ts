const FULL_TURN = 2 * Math.PI;

/** A direction in [0, 2 pi). */
export function directionRad(direction: number): number {
  const turned = direction % FULL_TURN;
  // Added only where needed: the sum is rounded. 360 deg and -0 come out as 0 exactly.
  const positive = turned < 0 ? turned + FULL_TURN : turned;
  return positive >= FULL_TURN || positive === 0 ? 0 : positive;
}
