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

interface UnitTable {
  /** Unit of a bare number, as messages name it; a key of `units`, or empty for a pure number. */
  readonly bare: string;
  /** Factor of a bare number to SI and radians. */
  readonly bareFactor: number;
  /** Factor of each accepted unit to SI and radians. */
  readonly units: Readonly<Record<string, number>>;
}

const RAD_PER_DEG = Math.PI / 180;

/**
 * The units a sea file may use. Bare numbers are SI, but for directions, which are nautical degrees there.
 * Sources: nautical mile 1852 m (1929), foot 0.3048 m (1959), knot one nautical mile an hour: exact by definition.
 */
export const UNITS: Readonly<Record<Dimension, UnitTable>> = Object.freeze({
  speed: {
    bare: 'm/s',
    bareFactor: 1,
    units: { 'm/s': 1, 'km/h': 1 / 3.6, kn: 1852 / 3600, kt: 1852 / 3600 },
  },
  length: { bare: 'm', bareFactor: 1, units: { m: 1, km: 1000, cm: 0.01, mm: 0.001, ft: 0.3048, nmi: 1852 } },
  time: { bare: 's', bareFactor: 1, units: { s: 1, ms: 0.001, min: 60, h: 3600 } },
  direction: { bare: 'deg', bareFactor: RAD_PER_DEG, units: { deg: RAD_PER_DEG, '°': RAD_PER_DEG, rad: 1 } },
  density: { bare: 'kg/m3', bareFactor: 1, units: { 'kg/m3': 1, 'g/cm3': 1000 } },
  'surface tension': { bare: 'N/m', bareFactor: 1, units: { 'N/m': 1, 'mN/m': 0.001 } },
  acceleration: { bare: 'm/s2', bareFactor: 1, units: { 'm/s2': 1 } },
  ratio: { bare: '', bareFactor: 1, units: { '%': 0.01 } },
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
  return Number(number) * UNITS[dimension].units[unit];
}

/** The value of a bare number, in SI and radians. */
export function quantityFromNumber(number: number, dimension: Dimension): number {
  return number * UNITS[dimension].bareFactor;
}

/** The accepted units as a list for messages: `m/s, km/h, kn, kt`. */
export function unitNames(dimension: Dimension): string {
  return Object.keys(UNITS[dimension].units).join(', ');
}
