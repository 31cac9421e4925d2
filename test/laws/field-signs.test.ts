import { describe, expect, it } from 'vitest';
import { fillJacobian } from '../../src/maps/surface.ts';
import { absoluteAngularFrequency, angularFrequency } from '../../src/physics/dispersion.ts';
import { SEA_WATER_DEFAULTS } from '../../src/physics/water.ts';
import { travelDirection } from '../../src/plan/systems.ts';
import { seaWaves } from '../../src/waves/cascade-waves.ts';
import { turnsPerLoop } from '../../src/waves/turns.ts';
import type { WaveAmplitudes } from '../../src/waves/wave-amplitudes.ts';
import {
  frameFields,
  handWaves,
  jonswapSystem,
  loneCascade,
  rms,
  seaRequest,
} from '../support/tiny-waves.ts';

/** A narrow swell from a nautical bearing, drawn from its spectrum. */
function swellFrom(bearingDeg: number): WaveAmplitudes {
  const towardRad = travelDirection((bearingDeg * Math.PI) / 180);
  const systems = [jonswapSystem('swell', 1.5, 3.5, { towardRad, gamma: 6, s: 120 })];
  return seaWaves(seaRequest({ systems, cascades: [loneCascade({ frameCount: 240, periodS: 30 })] }))[0]
    .amplitudes;
}

/** Mean of the product of two fields, as a share of their root mean squares. */
function correlation(a: Float64Array, b: Float64Array): number {
  return a.reduce((sum, value, i) => sum + value * b[i], 0) / (a.length * rms(a) * rms(b));
}

/** The field one texel further east and north. */
function shifted(field: Float64Array, east: number, north: number): Float64Array {
  const N = Math.sqrt(field.length);
  return field.map((_, i) => {
    const [x, y] = [((i % N) - east + N) % N, (Math.floor(i / N) - north + N) % N];
    return field[y * N + x];
  });
}

describe('waves from a bearing', () => {
  // From the west they run east, and so on; in two frames, a quarter of a second, by a texel and a half.
  it.each([
    ['west', 270, 1, 0],
    ['east', 90, -1, 0],
    ['south', 180, 0, 1],
    ['north', 0, 0, -1],
    ['south-west', 225, 1, 1],
  ])('the %s move away from it, crests first', (_, bearing, east, north) => {
    const waves = swellFrom(bearing);
    const [now, later] = [frameFields(waves, 10).height, frameFields(waves, 12).height];
    const ahead = correlation(shifted(now, east, north), later);
    const behind = correlation(shifted(now, -east, -north), later);
    expect(ahead).toBeGreaterThan(0.97);
    expect(behind).toBeLessThan(0.9);
  });

  it.each([
    ['west', 270, 1, 0],
    ['north', 0, 0, -1],
    ['south-west', 225, 1, 1],
  ])('the %s: the water under a crest moves along, under a trough back', (_, bearing, east, north) => {
    const { height, velocityEast, velocityNorth } = frameFields(swellFrom(bearing), 3);
    const along = velocityEast.map((u, i) => (u * east + velocityNorth[i] * north) / Math.hypot(east, north));
    expect(correlation(height, along)).toBeGreaterThan(0.9);
    expect(
      height.every((eta, i) => Math.abs(eta) < rms(height) || Math.sign(along[i]) === Math.sign(eta)),
    ).toBe(true);
  });
});

describe('crests gather the surface', () => {
  it.each([
    ['in deep water', Infinity],
    ['on 2 m', 2],
  ])('%s: J is least where the surface is highest', (_, depthM) => {
    const waves = swellFrom(250);
    const fields = frameFields(waves, 3, depthM);
    const J = new Float64Array(fields.height.length);
    fillJacobian(J, fields);
    expect(
      correlation(
        fields.height,
        J.map((value) => value - 1),
      ),
    ).toBeLessThan(-0.8);
    expect(J[fields.height.indexOf(Math.max(...fields.height))]).toBeLessThan(0.75);
  });

  it('displacement points to the crest from both sides', () => {
    const lattice = { patchLengthM: 16, resolution: 16 };
    const waves = handWaves(lattice, { frameCount: 4, periodS: 3 }, [
      { nx: 1, ny: 0, amplitudeM: 0.3, turns: 1 },
    ]);
    const { height, displacementEast } = frameFields(waves, 0);
    expect(height[0]).toBeCloseTo(0.3, 12);
    expect(displacementEast[4]).toBeCloseTo(-0.3, 12);
    expect(displacementEast[12]).toBeCloseTo(0.3, 12);
  });
});

describe('a current', () => {
  const lattice = { patchLengthM: 40, resolution: 16 };
  const [periodS, frameCount] = [12, 48];

  /** Eastward wave 3 across, with turns as the current makes them; how far east its crests move in a frame, texels. */
  function crestSpeed(eastMps: number): number {
    const k = (3 * 2 * Math.PI) / lattice.patchLengthM;
    const sigma = angularFrequency(k, SEA_WATER_DEFAULTS);
    const omega = absoluteAngularFrequency(k, 0, SEA_WATER_DEFAULTS, { eastMps, northMps: 0 });
    const turns = turnsPerLoop(omega, sigma, periodS);
    const waves = handWaves(lattice, { frameCount, periodS }, [{ nx: 3, ny: 0, amplitudeM: 0.2, turns }]);
    // Phase of the third harmonic of the first row, before and after a frame.
    const phase = (n: number): number => {
      const { height } = frameFields(waves, n);
      let [re, im] = [0, 0];
      for (let ix = 0; ix < 16; ix++) {
        re += height[ix] * Math.cos((2 * Math.PI * 3 * ix) / 16);
        im += height[ix] * Math.sin((2 * Math.PI * 3 * ix) / 16);
      }
      return Math.atan2(im, re);
    };
    const turned = phase(1) - phase(0);
    return (turned - 2 * Math.PI * Math.round(turned / (2 * Math.PI))) * (16 / (2 * Math.PI * 3));
  }

  // The wave's own speed is 4.56 m/s.
  it('along speeds the pattern up, against slows it, beyond its speed turns it round', () => {
    const metresPerTexelFrame = (lattice.patchLengthM / 16) * (frameCount / periodS);
    expect(crestSpeed(0) * metresPerTexelFrame).toBeCloseTo(4.56, 0);
    expect(crestSpeed(2)).toBeGreaterThan(1.3 * crestSpeed(0));
    expect(crestSpeed(-2)).toBeLessThan(0.7 * crestSpeed(0));
    expect(crestSpeed(-2)).toBeGreaterThan(0);
    expect(crestSpeed(-7) * metresPerTexelFrame).toBeCloseTo(4.56 - 7, 0);
  });

  it('as fast as the wave holds the pattern in place', () => {
    expect(crestSpeed(-4.56)).toBeCloseTo(0, 12);
  });

  it('against short waves makes them run back in a drawn sea, and leaves the long ones', () => {
    const cascades = [loneCascade({ patchLengthM: 30 })];
    const current = { eastMps: -2.5, northMps: 0 };
    const [{ amplitudes }] = seaWaves(seaRequest({ current, cascades }));
    const east = amplitudes.turns.subarray(1, 16);
    expect(east[1]).toBeGreaterThan(0);
    expect(east[14]).toBeLessThan(0);
  });
});
