import { describe, expect, test } from 'vitest';
import { type Dimension, quantityFromNumber, quantityFromText, UNITS } from '../../../src/sea/units.ts';

describe('quantityFromText', () => {
  // Exact by definition: foot 0.3048 m (1959), nautical mile 1852 m (1929), knot a nautical mile an hour.
  test.each<[string, Dimension, number]>([
    ['24 kn', 'speed', (24 * 1852) / 3600],
    ['36 km/h', 'speed', 10],
    ['7.5m/s', 'speed', 7.5],
    ['120 km', 'length', 120000],
    ['12 ft', 'length', 3.6576],
    ['1.2 nmi', 'length', 2222.4],
    [' .5 m ', 'length', 0.5],
    ['8 s', 'time', 8],
    ['1.5 min', 'time', 90],
    ['2 h', 'time', 7200],
    ['250 ms', 'time', 0.25],
    ['250 deg', 'direction', (250 * Math.PI) / 180],
    ['-90 °', 'direction', -Math.PI / 2],
    ['1 rad', 'direction', 1],
    ['1.025 g/cm3', 'density', 1025],
    ['74.2 mN/m', 'surface tension', 0.0742],
    ['9.81 m/s2', 'acceleration', 9.81],
    ['2.5 %', 'ratio', 0.025],
    ['70 %', 'ratio', 0.7],
    ['1e3 m', 'length', 1000],
  ])('%j as %s', (text, dimension, si) => {
    const value = quantityFromText(text, dimension) as number;
    // One multiplication and one division, each rounded once; exact wherever the factor is a power of ten.
    expect(value).toBe(si);
  });

  test.each<[string, Dimension]>([
    ['24', 'speed'],
    ['24 kn', 'length'],
    ['24 KN', 'speed'],
    ['twelve m', 'length'],
    ['12 m m', 'length'],
    ['0x10 m', 'length'],
    ['1,5 m', 'length'],
    ['m', 'length'],
    ['', 'time'],
    ['12 constructor', 'length'],
    ['Infinity m', 'length'],
  ])('refuses %j as %s', (text, dimension) => {
    expect(quantityFromText(text, dimension)).toBeNull();
  });
});

test('bare numbers are SI, but directions are degrees', () => {
  for (const dimension of Object.keys(UNITS) as Dimension[]) {
    expect(quantityFromNumber(90, dimension)).toBe(dimension === 'direction' ? Math.PI / 2 : 90);
  }
});
