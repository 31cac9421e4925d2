import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { FIELD_NAMES } from '../../src/field/frame-fields.ts';
import { fillJacobian } from '../../src/maps/surface.ts';
import { seaWaves } from '../../src/waves/cascade-waves.ts';
import { directFields } from '../support/direct-sum.ts';
import { anyWater, between, spread } from '../support/form-arbitraries.ts';
import {
  frameFields,
  jonswapSystem,
  largestDifference,
  loneCascade,
  rms,
  scatteredWaves,
  seaRequest,
} from '../support/tiny-waves.ts';
import { TRANSFORM } from '../support/tolerances.ts';

const anyTile = fc.record({
  lattice: fc.record({ patchLengthM: spread(1, 1000), resolution: fc.constantFrom(4, 8, 16) }),
  loop: fc.record({ frameCount: fc.integer({ min: 1, max: 400 }), periodS: spread(0.5, 60) }),
  seed: fc.nat(1000),
  frame: fc.integer({ min: -1000, max: 1000 }),
  relativeDepth: fc.oneof(spread(0.02, 3), fc.constant(Infinity)),
  scale: between(0.2, 2),
});

describe('fields of any tile, loop and depth', () => {
  it('are the sum of its waves', () => {
    fc.assert(
      fc.property(anyTile, ({ lattice, loop, seed, frame, relativeDepth, scale }) => {
        const waves = scatteredWaves(lattice, loop, seed);
        const depthM = relativeDepth * lattice.patchLengthM;
        const made = frameFields(waves, frame, depthM, scale);
        const direct = directFields(waves, frame, depthM, scale);
        for (const name of FIELD_NAMES) {
          // Height and shear share a transform: each gets the rounding of the other.
          const partner = { height: direct.strainEastNorth, strainEastNorth: direct.height }[
            name as 'height'
          ];
          const size = rms(direct[name]) + (partner === undefined ? 0 : rms(partner));
          expect(largestDifference(made[name], direct[name]), name).toBeLessThanOrEqual(
            10 * TRANSFORM * size,
          );
        }
      }),
      { numRuns: 150 },
    );
  });

  it('make a Jacobian of mean 1', () => {
    fc.assert(
      fc.property(anyTile, ({ lattice, loop, seed, frame, relativeDepth, scale }) => {
        const waves = scatteredWaves(lattice, loop, seed);
        const J = new Float64Array(lattice.resolution ** 2);
        fillJacobian(J, frameFields(waves, frame, relativeDepth * lattice.patchLengthM, scale));
        const mean = J.reduce((sum, value) => sum + value, 0) / J.length;
        // Shear carries the rounding of the height, in metres.
        expect(Math.abs(mean - 1)).toBeLessThan(1e-12 * Math.max(1, rms(J) ** 2));
      }),
      { numRuns: 150 },
    );
  });
});

describe('fields of a drawn sea', () => {
  it('are the sum of its waves in any water and current', () => {
    const anySea = fc.record({
      water: anyWater,
      eastMps: between(-3, 3),
      northMps: between(-3, 3),
      towardRad: between(-Math.PI, Math.PI),
      seed: fc.nat(2 ** 32 - 1),
    });
    fc.assert(
      fc.property(anySea, ({ water, eastMps, northMps, towardRad, seed }) => {
        const [{ amplitudes }] = seaWaves(
          seaRequest({
            water,
            seed,
            current: { eastMps, northMps },
            systems: [jonswapSystem('sea', 0.5, 3, { towardRad })],
            cascades: [loneCascade({ patchLengthM: 30, resolution: 16 })],
          }),
        );
        // Below kh = .05 the stretch of the orbits is bounded, which the plain sum does not know.
        const depthM = Math.max(water.depthM, 1);
        const made = frameFields(amplitudes, 5, depthM);
        const direct = directFields(amplitudes, 5, depthM, 1);
        for (const name of FIELD_NAMES) {
          const size = rms(direct[name]) + (name === 'strainEastNorth' ? rms(direct.height) : 0);
          expect(largestDifference(made[name], direct[name]), name).toBeLessThanOrEqual(
            10 * TRANSFORM * size,
          );
        }
      }),
      { numRuns: 15 },
    );
  });
});
