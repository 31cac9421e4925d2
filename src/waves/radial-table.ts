import type { DirectionalSpectrum } from './directional-spectrum.ts';

/**
 * What a wave system needs at a wavenumber, tabulated over ln k and interpolated linearly, so that the millions of
 * evaluations of a cell integration cost one logarithm and no spectrum.
 *
 * With 512 nodes per unit of ln k the interpolation of a JONSWAP peak is right to 6e-5 of the peak, but for the one
 * interval where Hasselmann's exponent jumps (test/unit/waves/radial-table.test.ts).
 */
export interface RadialTable {
  readonly spectrum: DirectionalSpectrum;
  readonly lnFirst: number;
  readonly nodesPerLn: number;
  /** Wavenumber of each node, rad/m, ascending; Float64Array, as are the arrays below, one entry a node. */
  readonly wavenumber: Float64Array;
  /** E(k), variance per wavenumber, m^3. */
  readonly density: Float64Array;
  /** E(k)/k * normaliser(p(k)), m^4: what multiplies the spreading's shape. */
  readonly amplitude: Float64Array;
  /** Spreading parameter p(k). */
  readonly parameter: Float64Array;
}

const NODES_PER_LN = 512;

/** Tabulates a spectrum between two wavenumbers, rad/m; outside them its energy counts as zero. */
export function radialTable(
  spectrum: DirectionalSpectrum,
  kMinRadPerM: number,
  kMaxRadPerM: number,
): RadialTable {
  const lnFirst = Math.log(kMinRadPerM);
  const count = Math.ceil((Math.log(kMaxRadPerM) - lnFirst) * NODES_PER_LN) + 2;
  const wavenumber = new Float64Array(count);
  const density = new Float64Array(count);
  const amplitude = new Float64Array(count);
  const parameter = new Float64Array(count);
  for (let i = 0; i < count; i++) {
    const k = Math.exp(lnFirst + i / NODES_PER_LN);
    const E = spectrum.wavenumberDensity(k);
    const p = spectrum.spreadingParameter(k);
    wavenumber[i] = k;
    density[i] = E;
    parameter[i] = p;
    amplitude[i] = E === 0 ? 0 : (E / k) * spectrum.spreadingNormaliser(p);
  }
  return { spectrum, lnFirst, nodesPerLn: NODES_PER_LN, wavenumber, density, amplitude, parameter };
}

/**
 * Integral over k of E(k) f(k), by the trapezoidal rule in ln k over the table's nodes: `f` = 1 gives m0 in m^2,
 * f = k^2 the slope variance.
 */
export function radialIntegral(table: RadialTable, f: (kRadPerM: number) => number): number {
  const { wavenumber, density } = table;
  let sum = 0;
  for (let i = 0; i < wavenumber.length; i++) {
    if (density[i] !== 0) sum += density[i] * wavenumber[i] * f(wavenumber[i]);
  }
  return sum / table.nodesPerLn;
}

/**
 * Psi(kx, ky) of one system, m^4, from its table.
 *
 * @param table radial table of the system
 * @param kEast eastward wavenumber, rad/m
 * @param kNorth northward wavenumber, rad/m
 */
export function wavevectorDensity(table: RadialTable, kEast: number, kNorth: number): number {
  const { amplitude, parameter } = table;
  const position = (0.5 * Math.log(kEast * kEast + kNorth * kNorth) - table.lnFirst) * table.nodesPerLn;
  const node = Math.floor(position);
  if (!(node >= 0 && node < amplitude.length - 1)) return 0;
  const t = position - node;
  const a = amplitude[node] + t * (amplitude[node + 1] - amplitude[node]);
  if (a === 0) return 0;
  const p = parameter[node] + t * (parameter[node + 1] - parameter[node]);
  let theta = Math.atan2(kNorth, kEast) - table.spectrum.system.towardRad;
  if (theta > Math.PI) theta -= 2 * Math.PI;
  else if (theta < -Math.PI) theta += 2 * Math.PI;
  return a * table.spectrum.spreadingShape(theta, p);
}
