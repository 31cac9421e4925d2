import { InputError } from '../errors.ts';
import { sha256 } from '../hash.ts';
import { angularFrequency } from '../physics/dispersion.ts';
import { loopSeconds } from '../sea/loop-length.ts';
import type { Sea } from '../sea/sea.ts';
import { OUTPUT_VERSION, VERSION } from '../version.ts';
import { bandVariances, type SeaWavesRequest, seaWaves, systemTables } from '../waves/cascade-waves.ts';
import { fieldDeviations } from '../waves/field-deviations.ts';
import { type RadialTable, radialIntegral } from '../waves/radial-table.ts';
import type { CascadeWaves, WaveAmplitudes } from '../waves/wave-amplitudes.ts';
import { canonicalJson } from './canonical-json.ts';
import { type CascadeLayout, cascadeLayouts } from './cascade-layout.ts';
import {
  cascadeReports,
  lossReport,
  seaIntegral,
  seaPeakWavelength,
  systemReports,
} from './cascade-report.ts';
import { costReport } from './cost.ts';
import { plannedMap } from './encodings.ts';
import { cascadeFoam, foamShares, plannedFoam } from './foam-plan.ts';
import { loopReport } from './loop-report.ts';
import type { EngineName, Plan, PlannedCascade, PlannedFoam, PlannedSystem, SeaReport } from './plan.ts';
import { resolvedSystems } from './systems.ts';
import { planWarnings } from './warnings.ts';

export interface PlanOptions {
  readonly engine?: EngineName;
}

export const PLAN_DEFAULTS: Readonly<Required<PlanOptions>> = Object.freeze({ engine: 'float32' });

/** A plan and the waves it was made with, so that a bake need not draw them again. */
export interface PlannedBake {
  readonly plan: Plan;
  /** In the order of the plan's cascades. */
  readonly waves: readonly CascadeWaves[];
}

/**
 * Makes every decision of a bake: wave systems, cascades and their bands, loops, ranges, foam; draws the waves and
 * reports what is lost.
 *
 * @param sea a validated sea
 */
export function planBake(sea: Sea, options: PlanOptions = {}): PlannedBake {
  const resolved = resolvedSystems(sea);
  const spectra = { water: sea.water, systems: resolved, gains: sea.shaping.bandGains };
  const layouts = cascadeLayouts(sea, systemTables(spectra, []));
  const tables = systemTables(spectra, layouts);
  const waves = seaWaves(wavesRequest(sea, resolved, layouts));
  const systems = plannedSystems(resolved, tables);
  const foam = plannedFoam(sea, resolved);
  const shares = foam === null ? null : foamShares(sea.foam, layouts, tables, sea.water.depthM);
  const cascades = layouts.map((layout, c) =>
    plannedCascade(sea, layout, c, waves[c], tables, foam, shares === null ? 0 : shares[c]),
  );
  const tallies = waves.map(({ tallies }) => tallies);
  const decided = {
    format: 'loopswell-plan',
    version: 1,
    generator: { name: 'loopswell', version: VERSION, outputVersion: OUTPUT_VERSION },
    engine: options.engine ?? PLAN_DEFAULTS.engine,
    title: sea.title,
    seed: sea.seed,
    water: sea.water,
    current: sea.current,
    systems,
    shaping: sea.shaping,
    loop: sea.loop,
    cascades,
    foam,
    output: sea.output,
  } as const;
  const report = {
    sea: seaReport(tables, waves, sea),
    systems: systemReports(tallies, tables, layouts),
    cascades: cascadeReports(layouts, tallies, tables),
    losses: lossReport(layouts, tallies, tables),
    loop: loopReport(layouts, tallies, tables, sea.loop, sea.water, sea.current),
    cost: costReport(cascades, decided.engine),
    warnings: [],
  };
  const warnings = planWarnings(sea, { ...decided, report });
  const plan: Plan = { ...decided, report: { ...report, warnings }, hash: sha256(canonicalJson(decided)) };
  return { plan: deepFrozen(plan), waves };
}

/** The waves of a plan, drawn anew from its numbers alone: what a process does that was handed a saved plan. */
export function wavesOfPlan(plan: Plan): readonly CascadeWaves[] {
  return seaWaves(wavesRequest(plan, plan.systems, plan.cascades));
}

/**
 * A saved plan with its waves, drawn anew and compared with those it was saved with.
 *
 * @param source file name for messages
 * @throws InputError where this runtime draws other waves: its frames would not fit those of the others
 */
export function plannedBakeOf(plan: Plan, source = '<plan>'): PlannedBake {
  const waves = wavesOrProblem(plan, source);
  const problems = plan.cascades.flatMap(({ amplitudesHash: expected }, c) => {
    const found = amplitudesHash(waves[c].amplitudes);
    if (found === expected) return [];
    const remedy =
      'The mathematics of this runtime rounds differently: bake with the Node that saved the plan, or plan the sea anew.';
    return [{ path: `cascades[${c}].amplitudesHash`, line: 0, column: 0, expected, found, remedy }];
  });
  if (problems.length > 0) throw new InputError(source, problems);
  return { plan, waves };
}

/** The parameters of a plan's systems are only known to be of a published form once that form has taken them. */
function wavesOrProblem(plan: Plan, source: string): readonly CascadeWaves[] {
  try {
    return wavesOfPlan(plan);
  } catch (cause) {
    const found = cause instanceof Error ? cause.message : String(cause);
    const expected = 'wave systems that can be drawn';
    const remedy = 'The file was altered after it was saved: plan the sea again.';
    throw new InputError(source, [{ path: 'systems', line: 0, column: 0, expected, found, remedy }], {
      cause,
    });
  }
}

/** The plan's hash as its content gives it. */
export function planHash({ report: _report, hash: _hash, ...decided }: Plan): string {
  return sha256(canonicalJson(decided));
}

/** SHA-256 over the bytes of a cascade's amplitudes and turns. */
export function amplitudesHash({ amplitude, turns }: WaveAmplitudes): string {
  const bytes = (array: Float64Array | Int32Array): Uint8Array =>
    new Uint8Array(array.buffer, array.byteOffset, array.byteLength);
  return sha256(`${sha256(bytes(amplitude))} ${sha256(bytes(turns))}`);
}

function wavesRequest(
  sea: Pick<Sea, 'water' | 'current' | 'seed' | 'shaping'>,
  systems: SeaWavesRequest['systems'],
  layouts: readonly CascadeLayout[],
): SeaWavesRequest {
  return {
    water: sea.water,
    current: sea.current,
    systems,
    gains: sea.shaping.bandGains,
    cascades: layouts.map(({ patchLengthM, resolution, band, loop }) => ({
      patchLengthM,
      resolution,
      band,
      frameCount: loop.frameCount,
      periodS: loopSeconds(loop),
    })),
    seed: sea.seed,
    amplitudes: sea.shaping.amplitudes,
    matchHeight: sea.shaping.matchHeight,
  };
}

function plannedSystems(
  resolved: ReturnType<typeof resolvedSystems>,
  tables: readonly RadialTable[],
): readonly PlannedSystem[] {
  return resolved.map((system, s) => ({
    ...system,
    significantHeightM: 4 * Math.sqrt(radialIntegral(tables[s], () => 1)),
    peakPeriodS: (2 * Math.PI) / tables[s].spectrum.omegaPeakRadPerS,
    peakWavelengthM: (2 * Math.PI) / tables[s].spectrum.peakWavenumberRadPerM,
  }));
}

function plannedCascade(
  sea: Sea,
  layout: CascadeLayout,
  c: number,
  waves: CascadeWaves,
  tables: readonly RadialTable[],
  foam: PlannedFoam | null,
  foamShare: number,
): PlannedCascade {
  const id = `c${c}`;
  const deviations = fieldDeviations(waves.amplitudes, sea.water.depthM, sea.shaping.horizontalScale);
  const ownFoam = foam === null ? null : cascadeFoam(foam, sea.foam, foamShare, layout, deviations);
  const maps = sea.maps.filter(({ map }) => map !== 'foam' || ownFoam !== null);
  return {
    id,
    patchLengthM: layout.patchLengthM,
    resolution: layout.resolution,
    band: layout.band,
    loop: layout.loop,
    bandVariancesM2: bandVariances(tables, layout.band),
    amplitudesHash: amplitudesHash(waves.amplitudes),
    expectedHeightDeviationM: Math.sqrt(waves.expectedVariance),
    deviations,
    maps: maps.map((request) => plannedMap(request, id, deviations, sea.output)),
    foam: ownFoam,
  };
}

function seaReport(tables: readonly RadialTable[], waves: readonly CascadeWaves[], sea: Sea): SeaReport {
  const peakWavelengthM = seaPeakWavelength(tables);
  const m0 = seaIntegral(tables, () => 1);
  const m2 = tables.reduce(
    (sum, table) => sum + radialIntegral(table, (k) => table.spectrum.intrinsicFrequency(k) ** 2),
    0,
  );
  return {
    significantHeightM: 4 * Math.sqrt(m0),
    expectedHeightM: 4 * Math.sqrt(waves.reduce((sum, { expectedVariance }) => sum + expectedVariance, 0)),
    peakPeriodS: (2 * Math.PI) / angularFrequency((2 * Math.PI) / peakWavelengthM, sea.water),
    peakWavelengthM,
    meanZeroCrossingPeriodS: 2 * Math.PI * Math.sqrt(m0 / m2),
  };
}

/** Freezes an object and everything below it; the plan travels through user code. */
function deepFrozen<T>(value: T): T {
  if (typeof value === 'object' && value !== null && !Object.isFrozen(value)) {
    Object.freeze(value);
    for (const item of Object.values(value)) deepFrozen(item);
  }
  return value;
}
