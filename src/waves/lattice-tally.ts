/** Sums over the discrete waves of one system on one tile: the material of the lattice and loop reports. */
export interface LatticeTally {
  readonly system: string;
  /** Variance in the cell round k = 0, lost, m^2. */
  readonly zeroCell: number;
  /** Sum of cell variances P, m^2. */
  variance: number;
  /** Sum of P^2, m^4: m0^2 / sum P^2 is the effective number of waves. */
  squares: number;
  /** Sum of P sigma, m^2 rad/s. */
  frequency: number;
  /** Sums of P cos, P sin of the waves' directions. */
  east: number;
  north: number;
  /** Sum of P k^2, with k in units of the tile's wavenumber step. */
  slope: number;
  /** Sum of P (error of frequency / sigma)^2, and the same weighted by k^2. */
  frequencyError: number;
  slopeFrequencyError: number;
  /** Variance in waves longer than the loop. */
  longerThanLoop: number;
  /** Variance in waves of more than N/2 turns, and all that the frames do not show. */
  aboveHalfFrames: number;
  notShown: number;
  /** Variance (and slope variance) that linear blending between frames takes from the shown waves. */
  blendingLoss: number;
  slopeBlendingLoss: number;
}

export function emptyTally(system: string, zeroCell: number): LatticeTally {
  return {
    system,
    zeroCell,
    variance: 0,
    squares: 0,
    frequency: 0,
    east: 0,
    north: 0,
    slope: 0,
    frequencyError: 0,
    slopeFrequencyError: 0,
    longerThanLoop: 0,
    aboveHalfFrames: 0,
    notShown: 0,
    blendingLoss: 0,
    slopeBlendingLoss: 0,
  };
}

/** One discrete wave as the tally sees it. */
export interface TalliedWave {
  /** Cell variance, m^2, and the part of it the frames show. */
  readonly variance: number;
  readonly shown: number;
  readonly nx: number;
  readonly ny: number;
  /** Intrinsic and absolute angular frequency, rad/s. */
  readonly sigma: number;
  readonly omega: number;
  readonly turns: number;
  readonly periodS: number;
  readonly frameCount: number;
}

/** Adds one wave. */
export function addToTally(tally: LatticeTally, wave: TalliedWave): void {
  const { variance: P, shown, nx, ny, sigma, omega, turns } = wave;
  const n2 = nx * nx + ny * ny;
  const n = Math.sqrt(n2);
  const error = ((2 * Math.PI * turns) / wave.periodS - omega) / sigma;
  tally.variance += P;
  tally.squares += P * P;
  tally.frequency += P * sigma;
  tally.east += (P * nx) / n;
  tally.north += (P * ny) / n;
  tally.slope += P * n2;
  tally.frequencyError += P * error * error;
  tally.slopeFrequencyError += P * n2 * error * error;
  if (sigma * wave.periodS < 2 * Math.PI) tally.longerThanLoop += P;
  if (Math.abs(turns) > wave.frameCount / 2) tally.aboveHalfFrames += P;
  tally.notShown += P - shown;
  // Between two frames the mean of e^{i x t} over linear weights keeps (2 + cos x)/3 of the variance.
  const lost = (shown * (1 - Math.cos((2 * Math.PI * turns) / wave.frameCount))) / 3;
  tally.blendingLoss += lost;
  tally.slopeBlendingLoss += lost * n2;
}
