import { describe, expect, it } from 'vitest';
import {
  BEAUFORT_FORCES,
  beaufortForce,
  beaufortWindSpeed,
  SEA_STATES,
  seaState,
} from '../../src/physics/sea-states.ts';
import { expectPrinted } from '../support/tolerances.ts';

describe('WMO code table 3700', () => {
  // Verified in the WMO code pages; a height on a border belongs to the lower class.
  it.each([
    [0, 0],
    [0.05, 1],
    [0.1, 1],
    [0.11, 2],
    [0.5, 2],
    [1.25, 3],
    [2.5, 4],
    [4, 5],
    [6, 6],
    [9, 7],
    [14, 8],
    [14.1, 9],
    [40, 9],
  ])('%f m is sea state %d', (height, code) => {
    expect(seaState(height).code).toBe(code);
  });

  it('has the ten words of the table', () => {
    const words = SEA_STATES.map(({ word }) => word);
    expect(words).toEqual([
      'calm (glassy)',
      'calm (rippled)',
      'smooth',
      'slight',
      'moderate',
      'rough',
      'very rough',
      'high',
      'very high',
      'phenomenal',
    ]);
    SEA_STATES.forEach(({ code }, index) => {
      expect(code).toBe(index);
    });
  });

  it('has neither gap nor overlap', () => {
    for (let i = 1; i < SEA_STATES.length; i += 1) expect(SEA_STATES[i].overM).toBe(SEA_STATES[i - 1].upToM);
  });

  it('refuses what is not a height', () => {
    expect(() => seaState(-0.1)).toThrow(RangeError);
    expect(() => seaState(Number.NaN)).toThrow(RangeError);
  });
});

describe('Beaufort scale', () => {
  // Heights as printed by the Met Office (verified), speed limits from memory.
  it.each([
    [0.2, 0, 0, 0],
    [1.5, 1, 0.1, 0.1],
    [2, 2, 0.2, 0.3],
    [4.4, 3, 0.6, 1],
    [5.5, 4, 1, 1.5],
    [10.7, 5, 2, 2.5],
    [10.8, 6, 3, 4],
    [15.5, 7, 4, 5.5],
    [19, 8, 5.5, 7.5],
    [24.4, 9, 7, 10],
    [28, 10, 9, 12.5],
    [30.5, 11, 11.5, 16],
    [60, 12, 14, Infinity],
  ])('%f m/s is force %d with %f m, at most %f m', (speed, force, probable, maximum) => {
    expect(beaufortForce(speed)).toMatchObject({ force, probableHeightM: probable, maximumHeightM: maximum });
  });

  // Stewart 2008, ch. 4: U10 = .836 B^1.5 (verified); values computed elsewhere.
  it.each([
    [1, '.836'],
    [2, '2.365'],
    [3, '4.344'],
    [6, '12.287'],
    [9, '22.572'],
    [12, '34.752'],
  ])('wind of force %d', (force, printed) => {
    expectPrinted(beaufortWindSpeed(force), printed, 'U10');
  });

  it('puts the wind of each force into that force', () => {
    for (const { force } of BEAUFORT_FORCES)
      expect(beaufortForce(beaufortWindSpeed(force)).force).toBe(force);
    expect(() => beaufortForce(-1)).toThrow(RangeError);
    expect(() => beaufortForce(Number.NaN)).toThrow(RangeError);
  });
});
