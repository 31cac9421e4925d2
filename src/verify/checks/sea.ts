import type { Manifest, ManifestCascadeStatistics, ManifestSystem } from '../../manifest/manifest.ts';
import { angularFrequency } from '../../physics/dispersion.ts';
import { coxMunkSlopeVariance, type SlopeVariance } from '../../physics/slope-variance.ts';
import type { Water } from '../../physics/water.ts';
import { STRONGEST_WHITECAP_WIND_MPS, whitecapCoverage } from '../../physics/whitecaps.ts';
import { windSpeedAtHeight } from '../../physics/wind.ts';
import { lossReport, seaIntegral, seaPeakWavelength } from '../../plan/cascade-report.ts';
import { systemTables } from '../../waves/cascade-waves.ts';
import type { LatticeTally } from '../../waves/lattice-tally.ts';
import { type RadialTable, radialIntegral } from '../../waves/radial-table.ts';
import type { Check } from '../check.ts';
import { figure, figuresVerdict, type StatedFigure } from '../stated-figures.ts';
import { answering, notApplicable } from '../verdict.ts';
import { strongestWind } from '../wind.ts';

/**
 * The figures in the manifest that describe the sea that was asked for: heights and periods of its systems and their
 * sum, the formulas it is judged by, and what the cascades leave out of it.
 */
export const SEA: Check = {
  name: 'sea',
  question: 'Do the figures of the asked-for sea follow from its systems?',
  quick: false,
  begin({ manifest, request }) {
    const tallies: (readonly LatticeTally[])[] = [];
    return {
      cascade(facts) {
        return {
          verdicts({ readable }) {
            if (readable) tallies.push(facts.waves().tallies);
            return [];
          },
        };
      },
      whole() {
        const tables = systemTables(request, request.cascades);
        const question = 'Do the stated losses follow from its cascades?';
        const losses =
          tallies.length < manifest.cascades.length
            ? notApplicable('no file of one of the cascades can be used')
            : figuresVerdict(lossFigures(manifest, tallies, tables));
        return [figuresVerdict(seaFigures(manifest, tables, request.water)), answering(question, losses)];
      },
    };
  },
};

function seaFigures(
  manifest: Manifest,
  tables: readonly RadialTable[],
  water: Water,
): readonly StatedFigure[] {
  const { sea, statistics, cascades } = manifest;
  const { significantHeightM, slopeVariance, foamCoverage, peakPeriodS, meanZeroCrossingPeriodS } =
    statistics;
  const m0 = seaIntegral(tables, () => 1);
  const m2 = seaIntegral(tables, (k) => angularFrequency(k, water) ** 2);
  const peakOmega = angularFrequency((2 * Math.PI) / seaPeakWavelength(tables), water);
  const total = (f: (cascade: ManifestCascadeStatistics) => number): number =>
    cascades.reduce((sum, cascade) => sum + f(cascade.statistics), 0);
  const expected = Math.sqrt(total((cascade) => cascade.significantHeightM.expected ** 2));
  const alongWind = total((cascade) => cascade.slopeVariance.alongWind);
  const acrossWind = total((cascade) => cascade.slopeVariance.acrossWind);
  const wind = strongestWind(manifest);
  const clean = wind !== null && isWithin(wind, WINDS_MPS) ? cleanSlopes(wind) : null;
  const covered = wind !== null && isWithin(wind, WHITECAP_WINDS_MPS) ? whitecapCoverage(wind) : null;
  return [
    ...tables.flatMap((table, s) => systemFigures(sea.systems[s], table)),
    figure('the significant height', significantHeightM.target, 4 * Math.sqrt(m0)),
    figure('the expected significant height', significantHeightM.expected, expected),
    figure('the peak period', peakPeriodS, (2 * Math.PI) / peakOmega),
    figure('the mean zero-crossing period', meanZeroCrossingPeriodS, 2 * Math.PI * Math.sqrt(m0 / m2)),
    figure('the slope variance along the wind', slopeVariance.alongWind, alongWind),
    figure('the slope variance across it', slopeVariance.acrossWind, acrossWind),
    figure(
      'the formula of slopes along the wind',
      slopeVariance.coxMunk?.alongWind ?? null,
      clean?.upwind ?? null,
    ),
    figure(
      'the formula of slopes across it',
      slopeVariance.coxMunk?.acrossWind ?? null,
      clean?.crosswind ?? null,
    ),
    figure('the formula of whitecaps', foamCoverage.whitecapFormula, covered),
  ];
}

/** Winds that the wind profile is made for, and those that the whitecap law is used for. */
const WINDS_MPS = [0, 80] as const;
const WHITECAP_WINDS_MPS = [0, STRONGEST_WHITECAP_WIND_MPS] as const;

function isWithin(value: number, [least, most]: readonly [number, number]): boolean {
  return value >= least && value <= most;
}

function cleanSlopes(windSpeed10mMps: number): SlopeVariance {
  return coxMunkSlopeVariance(windSpeedAtHeight(windSpeed10mMps, 12.5));
}

function systemFigures(system: ManifestSystem, table: RadialTable): readonly StatedFigure[] {
  const { omegaPeakRadPerS, peakWavenumberRadPerM } = table.spectrum;
  const height = 4 * Math.sqrt(radialIntegral(table, () => 1));
  return [
    figure(`the significant height of ${system.name}`, system.significantHeightM, height),
    figure(`the peak period of ${system.name}`, system.peakPeriodS, (2 * Math.PI) / omegaPeakRadPerS),
    figure(`its wavelength`, system.peakWavelengthM, (2 * Math.PI) / peakWavenumberRadPerM),
    // Where waves come from is the direction they run toward, turned round and counted the other way.
    figure(
      'the turn between its two directions',
      1,
      Math.cos(system.towardRad - travelRad(system.fromDeg)),
      1,
    ),
  ];
}

/** Direction of travel of waves from a bearing, rad counter-clockwise from east. */
function travelRad(fromDeg: number): number {
  return -Math.PI / 2 - (fromDeg * Math.PI) / 180;
}

function lossFigures(
  { cascades, losses }: Manifest,
  tallies: readonly (readonly LatticeTally[])[],
  tables: readonly RadialTable[],
): readonly StatedFigure[] {
  const layouts = cascades.map(({ patchLengthM, resolution, band, loop }) => {
    return { patchLengthM, resolution, band, loop: { ...loop, askedSeconds: null } };
  });
  const found = lossReport(layouts, tallies, tables);
  const all = tallies.flat();
  const m0 = all.reduce((sum, { variance }) => sum + variance, 0);
  const error = all.reduce((sum, { frequencyError }) => sum + frequencyError, 0);
  // Shares are compared with the whole.
  return [
    figure('the share in no cascade', losses.notInAnyCascade, found.notInAnyCascade, 1),
    figure('the share lost round k = 0', losses.zeroCells, found.zeroCells, 1),
    figure('the share too fast for the frames', losses.tooFastForFrames, found.tooFastForFrames, 1),
    figure('the slope variance left out', losses.slopeVarianceLeftOut, found.slopeVarianceLeftOut),
    figure('the error of frequency', losses.frequencyError, Math.sqrt(error / m0)),
  ];
}
