import { bandLimits, bandWeight } from '../waves/band.ts';
import { SHORTEST_REPORTED_M } from '../waves/cascade-waves.ts';
import { nyquistWavenumber } from '../waves/lattice.ts';
import type { LatticeTally } from '../waves/lattice-tally.ts';
import { type RadialTable, radialIntegral } from '../waves/radial-table.ts';
import { bandGaps, type CascadeLayout } from './cascade-layout.ts';
import type { CascadeReport, LossReport, SystemReport } from './plan.ts';

/** Waves with fewer than this across a tile are seen as its large features. */
const LARGE_FEATURE_WAVES = 8;

/** Waves that spread all round have no mean direction to shift: theirs is the noise of a resultant this short. */
const NO_MEAN_DIRECTION = 0.01;

/** What each cascade carries, of height and of slope. */
export function cascadeReports(
  layouts: readonly CascadeLayout[],
  tallies: readonly (readonly LatticeTally[])[],
  tables: readonly RadialTable[],
): readonly CascadeReport[] {
  const m0 = seaIntegral(tables, () => 1);
  const slope = seaIntegral(tables, reportedSlope);
  return layouts.map((layout, c) => {
    const { kMinRadPerM, kMaxRadPerM } = bandLimits(layout.band);
    const patch = layout.patchLengthM;
    const longestWavelengthM = kMinRadPerM === 0 ? patch : Math.min(patch, (2 * Math.PI) / kMinRadPerM);
    const shortestWavelengthM = (2 * Math.PI) / Math.min(kMaxRadPerM, nyquistWavenumber(layout));
    return {
      id: `c${c}`,
      longestWavelengthM,
      shortestWavelengthM,
      heightVarianceShare: seaIntegral(tables, (k) => bandWeight(k, layout.band)) / m0,
      slopeVarianceShare: seaIntegral(tables, (k) => bandWeight(k, layout.band) * reportedSlope(k)) / slope,
      wavesAcross: c === 0 ? patch / seaPeakWavelength(tables) : patch / longestWavelengthM,
      vertexSpacingM: shortestWavelengthM / 4,
      effectiveWaves: effectiveWaves(tallies[c]),
      cellSumError: cellSumError(
        tallies[c],
        seaIntegral(tables, (k) => bandWeight(k, layout.band)),
      ),
      repetition: c === 0 ? null : repetition(layouts, c, tables),
    };
  });
}

/** Integral over k of the whole sea's E(k) f(k). */
export function seaIntegral(tables: readonly RadialTable[], f: (kRadPerM: number) => number): number {
  return tables.reduce((sum, table) => sum + radialIntegral(table, f), 0);
}

/** Slope per height variance of the waves that reports speak of: k^2 down to 0.1 m. */
export function reportedSlope(kRadPerM: number): number {
  return kRadPerM > (2 * Math.PI) / SHORTEST_REPORTED_M ? 0 : kRadPerM * kRadPerM;
}

/** Wavelength at the peak of the system that holds most energy, m. */
export function seaPeakWavelength(tables: readonly RadialTable[]): number {
  const energies = tables.map((table) => radialIntegral(table, () => 1));
  const highest = tables[energies.indexOf(Math.max(...energies))];
  return (2 * Math.PI) / highest.spectrum.peakWavenumberRadPerM;
}

/**
 * Of what the eye sees at the size of a tile's large features, the share that repeats with the tile: slope variance of
 * the cascade in waves with fewer than 8 across, over the slope variance of all cascades in waves as long.
 */
function repetition(layouts: readonly CascadeLayout[], c: number, tables: readonly RadialTable[]): number {
  const kLimit = (2 * Math.PI * LARGE_FEATURE_WAVES) / layouts[c].patchLengthM;
  const slope = (weight: (k: number) => number): number =>
    seaIntegral(tables, (k) => (k > kLimit ? 0 : weight(k) * reportedSlope(k)));
  const all = slope((k) => layouts.reduce((sum, { band }) => sum + bandWeight(k, band), 0));
  return all === 0 ? 0 : slope((k) => bandWeight(k, layouts[c].band)) / all;
}

/** Relative error of the sum of all cells against the one-dimensional integral of the band, m^2. */
function cellSumError(tallies: readonly LatticeTally[], bandVariance: number): number {
  if (bandVariance === 0) return 0;
  return tallies.reduce((sum, { variance, zeroCell }) => sum + variance + zeroCell, 0) / bandVariance - 1;
}

function effectiveWaves(tallies: readonly LatticeTally[]): number {
  const variance = tallies.reduce((sum, tally) => sum + tally.variance, 0);
  const squares = tallies.reduce((sum, tally) => sum + tally.squares, 0);
  return squares === 0 ? 0 : variance ** 2 / squares;
}

/** What the lattices of all cascades together do to each system. */
export function systemReports(
  tallies: readonly (readonly LatticeTally[])[],
  tables: readonly RadialTable[],
  layouts: readonly CascadeLayout[],
): readonly SystemReport[] {
  const m0 = seaIntegral(tables, () => 1);
  return tables.map((table, s) => {
    const own = tallies.map((list) => list[s]);
    const sum = (value: (tally: LatticeTally) => number): number =>
      own.reduce((total, tally) => total + value(tally), 0);
    const variance = sum((tally) => tally.variance);
    const covered = (k: number): number => layouts.reduce((w, { band }) => w + bandWeight(k, band), 0);
    const coveredVariance = radialIntegral(table, covered);
    const coveredFrequency = radialIntegral(table, (k) => covered(k) * table.spectrum.intrinsicFrequency(k));
    const systemVariance = radialIntegral(table, () => 1);
    const [east, north] = [sum((tally) => tally.east), sum((tally) => tally.north)];
    const isDirected = Math.hypot(east, north) > NO_MEAN_DIRECTION * variance;
    return {
      name: table.spectrum.system.name,
      heightVarianceShare: systemVariance / m0,
      meanFrequencyShift:
        variance === 0
          ? 0
          : sum((tally) => tally.frequency) / variance / (coveredFrequency / coveredVariance) - 1,
      meanDirectionShiftRad: isDirected
        ? wrapped(Math.atan2(north, east) - table.spectrum.system.towardRad)
        : 0,
      effectiveWaves: variance === 0 ? 0 : variance ** 2 / sum((tally) => tally.squares),
      zeroCellShare: sum((tally) => tally.zeroCell) / systemVariance,
    };
  });
}

/** Energy that reaches no file, and slope that is left to a shader as roughness. */
export function lossReport(
  layouts: readonly CascadeLayout[],
  tallies: readonly (readonly LatticeTally[])[],
  tables: readonly RadialTable[],
): LossReport {
  const m0 = seaIntegral(tables, () => 1);
  const left = (k: number): number => 1 - layouts.reduce((sum, { band }) => sum + bandWeight(k, band), 0);
  const all = tallies.flat();
  return {
    notInAnyCascade: seaIntegral(tables, left) / m0,
    zeroCells: all.reduce((sum, tally) => sum + tally.zeroCell, 0) / m0,
    tooFastForFrames: all.reduce((sum, tally) => sum + tally.notShown, 0) / m0,
    slopeVarianceLeftOut: seaIntegral(tables, (k) => left(k) * reportedSlope(k)),
    gaps: bandGaps(layouts),
  };
}

function wrapped(angle: number): number {
  return angle - 2 * Math.PI * Math.round(angle / (2 * Math.PI));
}
