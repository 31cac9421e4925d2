import { type CascadeLayout, cascadeLayouts } from '../../src/plan/cascade-layout.ts';
import { cascadeReports, lossReport } from '../../src/plan/cascade-report.ts';
import type { CascadeReport, LossReport } from '../../src/plan/plan.ts';
import { resolvedSystems } from '../../src/plan/systems.ts';
import { seaFromObject } from '../../src/sea/parse.ts';
import type { AutoCascades, Sea } from '../../src/sea/sea.ts';
import { systemTables } from '../../src/waves/cascade-waves.ts';
import type { RadialTable } from '../../src/waves/radial-table.ts';

type Keys = Readonly<Record<string, unknown>>;

/** A sea of some systems, all else as by default. */
export function seaOf(systems: readonly Keys[], changes: Keys = {}): Sea {
  const from = (system: Keys): Keys => ({ from: 270, ...system });
  return seaFromObject({ seaFile: 1, title: 'Planned sea', systems: systems.map(from), ...changes });
}

/** The wind sea of a wind in m/s over a fetch in km, spread as in Hasselmann et al. 1980. */
export function windSeaKeys(windSpeed: number, fetchKm: number): Keys {
  return { kind: 'wind-sea', windSpeed, fetch: `${fetchKm} km`, spreading: 'hasselmann' };
}

/** A swell of 2 m, JONSWAP and cos-2s. */
export function swellKeys(peakPeriod: number, peakEnhancement: number, s: number): Keys {
  const spreading = { form: 'cos-2s', s };
  return { kind: 'swell', significantHeight: 2, peakPeriod, peakEnhancement, spreading };
}

/** The same sea with another request for planned cascades, unlimited by what a sea file may ask. */
export function withCascades(sea: Sea, changes: Partial<AutoCascades>): Sea {
  return { ...sea, cascades: { ...(sea.cascades as AutoCascades), ...changes } };
}

export interface LaidOutSea {
  readonly layouts: readonly CascadeLayout[];
  readonly tables: readonly RadialTable[];
  readonly reports: readonly CascadeReport[];
  readonly losses: LossReport;
}

/** The layout of a sea's cascades and what it reports, before any wave is drawn. */
export function laidOut(sea: Sea): LaidOutSea {
  const spectra = { water: sea.water, systems: resolvedSystems(sea), gains: sea.shaping.bandGains };
  const layouts = cascadeLayouts(sea, systemTables(spectra, []));
  const tables = systemTables(spectra, layouts);
  const noWaves = layouts.map(() => []);
  return {
    layouts,
    tables,
    reports: cascadeReports(layouts, noWaves, tables),
    losses: lossReport(layouts, noWaves, tables),
  };
}
