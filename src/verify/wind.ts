import type { Manifest } from '../manifest/manifest.ts';

/** Direction toward which the strongest wind blows, or without one the highest system runs; rad counter-clockwise from east. */
export function windDirection({ sea: { systems } }: Manifest): number {
  const [first] = [...systems].sort(
    (a, b) => (b.windSpeedMps ?? 0) - (a.windSpeedMps ?? 0) || b.significantHeightM - a.significantHeightM,
  );
  return first?.towardRad ?? 0;
}

/** The strongest wind of a sea's systems, m/s; null for a sea without wind. */
export function strongestWind({ sea: { systems } }: Manifest): number | null {
  const winds = systems.flatMap(({ windSpeedMps }) => windSpeedMps ?? []);
  return winds.length === 0 ? null : Math.max(...winds);
}
