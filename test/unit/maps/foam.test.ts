import { describe, expect, it } from 'vitest';
import { advanceFoam, foamSourceTable, shownFoam } from '../../../src/maps/foam.ts';

describe('foamSourceTable', () => {
  it('rises from the breaking code down to full foam a ramp below it', () => {
    const table = foamSourceTable(1000, 200);
    expect(table).toHaveLength(65536);
    expect([0, 799, 800, 850, 900, 1000, 1001, 65535].map((code) => table[code])).toEqual([
      1, 1, 1, 0.75, 0.5, 0, 0, 0,
    ]);
  });

  it('takes levels between two codes, and beyond the codes', () => {
    expect(foamSourceTable(100.5, 2)[100]).toBe(0.25);
    expect(foamSourceTable(-10, 5).some((source) => source > 0)).toBe(false);
    expect(foamSourceTable(1e6, 5).every((source) => source === 1)).toBe(true);
  });
});

describe('advanceFoam', () => {
  it('fades what is there and lets a stronger breaker replace it', () => {
    const source = foamSourceTable(10, 10);
    const foam = Float64Array.of(0.8, 0.8, 0, 0.4);
    advanceFoam(foam, Uint16Array.of(20, 0, 5, 6), source, 0.5);
    expect([...foam]).toEqual([0.4, 1, 0.5, 0.4]);
  });
});

describe('shownFoam', () => {
  it('takes out what never fades and keeps full foam full', () => {
    expect([0, 0.1, 0.2, 0.6, 1].map((foam) => shownFoam(foam, 0.2))).toEqual([
      0,
      0,
      0,
      expect.closeTo(0.5, 15),
      1,
    ]);
  });

  it('shows foam as it is where nothing is removed', () => {
    expect([0, 0.3, 1].map((foam) => shownFoam(foam, 0))).toEqual([0, 0.3, 1]);
  });
});
