import { describe, expect, it } from 'vitest';
import { shownShare, turnsPerLoop } from '../../../src/waves/turns.ts';

const TURN = (2 * Math.PI) / 10;

describe('turnsPerLoop, in a loop of 10 s', () => {
  // Turns by the absolute frequency, turns by the intrinsic one: what becomes of the wave.
  it.each([
    [5.587087, 5.587087, 6, 'nearest, not next below'],
    [5.4, 5.4, 5, 'nearest'],
    [0.3, 0.3, 1, 'longer than the loop: turns once'],
    [0.01, 0.01, 1, 'much longer than the loop: turns once'],
    [0.49, 0.8, 0, 'held by the current: stays'],
    [-0.3, 3.2, 0, 'held by the current: stays'],
    [0.2, 0.4, 1, 'longer than the loop, slowed by the current: turns once'],
    [-0.2, 0.4, -1, 'longer than the loop, carried backwards: turns once backwards'],
    [-2.6, 1.3, -3, 'carried backwards'],
    [-0.7, 1.3, -1, 'carried backwards'],
  ])('%f turns of its own %f: %i (%s)', (absolute, intrinsic, m) => {
    expect(turnsPerLoop(absolute * TURN, intrinsic * TURN, 10)).toBe(m);
  });
});

describe('shownShare, of 100 frames', () => {
  it('is all up to 45 turns, nothing from 50, either way round', () => {
    expect([0, 1, 45, -45].map((m) => shownShare(m, 100))).toEqual([1, 1, 1, 1]);
    expect([50, -50, 51, 99].map((m) => shownShare(m, 100))).toEqual([0, 0, 0, 0]);
  });

  it('falls smoothly in between', () => {
    const shares = [46, 47, 48, 49].map((m) => shownShare(m, 100));
    for (const [i, share] of [0.896, 0.648, 0.352, 0.104].entries()) expect(shares[i]).toBeCloseTo(share, 12);
    expect(shownShare(-47, 100)).toBe(shares[1]);
  });
});
