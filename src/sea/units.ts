/** What a number in a sea file measures. */
export type Dimension =
  | 'speed'
  | 'length'
  | 'time'
  | 'direction'
  | 'density'
  | 'surface tension'
  | 'acceleration'
  | 'ratio';

/** A factor to SI as a ratio: dividing by 100 rounds once, multiplying by 0.01 twice (70 % would not be 0.7). */
type Factor = readonly [multiplier: number, divisor: number];

interface UnitTable {
  /** Unit of a bare number, as messages name it; empty for a pure number. */
  readonly bare: string;
  /** Factor of a bare number to SI and radians. */
  readonly bareFactor: Factor;
  /** Factor of each accepted unit to SI and radians. */
  readonly units: Readonly<Record<string, Factor>>;
}

const ONE: Factor = [1, 1];
const RAD_PER_DEG: Factor = [Math.PI, 180];
const MPS_PER_KNOT: Factor = [1852, 3600];

/**
 * The units a sea file may use. Bare numbers are SI, but for directions, which are nautical degrees there.
 * Sources: nautical mile 1852 m (1929), foot 0.3048 m (1959), knot one nautical mile an hour: exact by definition.
 */
export const UNITS: Readonly<Record<Dimension, UnitTable>> = Object.freeze({
  speed: {
    bare: 'm/s',
    bareFactor: ONE,
    units: { 'm/s': ONE, 'km/h': [1000, 3600], kn: MPS_PER_KNOT, kt: MPS_PER_KNOT },
  },
  length: {
    bare: 'm',
    bareFactor: ONE,
    units: { m: ONE, km: [1000, 1], cm: [1, 100], mm: [1, 1000], ft: [3048, 10000], nmi: [1852, 1] },
  },
  time: { bare: 's', bareFactor: ONE, units: { s: ONE, ms: [1, 1000], min: [60, 1], h: [3600, 1] } },
  direction: {
    bare: 'deg',
    bareFactor: RAD_PER_DEG,
    units: { deg: RAD_PER_DEG, '°': RAD_PER_DEG, rad: ONE },
  },
  density: { bare: 'kg/m3', bareFactor: ONE, units: { 'kg/m3': ONE, 'g/cm3': [1000, 1] } },
  'surface tension': { bare: 'N/m', bareFactor: ONE, units: { 'N/m': ONE, 'mN/m': [1, 1000] } },
  acceleration: { bare: 'm/s2', bareFactor: ONE, units: { 'm/s2': ONE } },
  ratio: { bare: '', bareFactor: ONE, units: { '%': [1, 100] } },
});

const NUMBER = '[-+]?(?:[0-9]+(?:\\.[0-9]*)?|\\.[0-9]+)(?:[eE][-+]?[0-9]+)?';

/** The texts of a dimension, `<number> <unit>`, as a regular expression that JSON Schema can carry too. */
export function quantityPattern(dimension: Dimension): RegExp {
  const units = Object.keys(UNITS[dimension].units).join('|');
  return new RegExp(`^\\s*${NUMBER}\\s*(?:${units})\\s*$`);
}

/**
 * The value of a text such as `24 kn`, in SI and radians.
 *
 * @returns null where the text is not a number followed by a unit of this dimension.
 */
export function quantityFromText(text: string, dimension: Dimension): number | null {
  if (!quantityPattern(dimension).test(text)) return null;
  const [number] = new RegExp(NUMBER).exec(text) as RegExpExecArray;
  const unit = text.slice(text.indexOf(number) + number.length).trim();
  return scaled(Number(number), UNITS[dimension].units[unit]);
}

/** The value of a bare number, in SI and radians. */
export function quantityFromNumber(number: number, dimension: Dimension): number {
  return scaled(number, UNITS[dimension].bareFactor);
}

function scaled(number: number, [multiplier, divisor]: Factor): number {
  return (number * multiplier) / divisor;
}

/** The accepted units as a list for messages: `m/s, km/h, kn, kt`. */
export function unitNames(dimension: Dimension): string {
  return Object.keys(UNITS[dimension].units).join(', ');
}
