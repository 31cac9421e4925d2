import { describe, it } from 'vitest';
import { float64Engine } from '../../../src/field/float64-engine.ts';
import { FIELD_NAMES } from '../../../src/field/frame-fields.ts';
import { synthesis } from '../../../src/field/synthesis.ts';
import { SEA_WATER_DEFAULTS } from '../../../src/physics/water.ts';
import { seaWaves } from '../../../src/waves/cascade-waves.ts';
import { type FieldDeviations, fieldDeviations } from '../../../src/waves/field-deviations.ts';
import { loopVariance, type WaveAmplitudes } from '../../../src/waves/wave-amplitudes.ts';
import { handWaves, loneCascade, scatteredWaves, seaRequest } from '../../support/tiny-waves.ts';
import { expectRelative, PARSEVAL } from '../../support/tolerances.ts';

/** Root mean squares over all texels of all frames. */
function measuredDeviations(waves: WaveAmplitudes, depthM: number, horizontalScale: number): FieldDeviations {
  const engine = float64Engine(waves.lattice.resolution);
  const surface = synthesis(waves, engine, { depthM, horizontalScale, fields: new Set(FIELD_NAMES) });
  const sums = new Map<string, number>();
  const add = (name: string, squares: number): void => void sums.set(name, (sums.get(name) ?? 0) + squares);
  for (let n = 0; n < waves.frameCount; n++) {
    const fields = surface.frame(n);
    for (const name of FIELD_NAMES) {
      let squares = 0;
      for (const value of fields[name] ?? []) squares += value * value;
      add(name, squares);
    }
    const { strainEastEast: Exx = [], strainNorthNorth: Eyy = [] } = fields;
    let squares = 0;
    for (let i = 0; i < Exx.length; i++) squares += (Exx[i] + Eyy[i]) ** 2;
    add('compression', squares);
  }
  const samples = waves.frameCount * waves.lattice.resolution ** 2;
  return Object.fromEntries([...sums].map(([name, sum]) => [name, Math.sqrt(sum / samples)])) as never;
}

const LATTICE = { patchLengthM: 30, resolution: 16 };
const drawn = (changes: Parameters<typeof seaRequest>[0]): WaveAmplitudes => {
  const cascades = [loneCascade({ patchLengthM: 30, resolution: 32, frameCount: 24, periodS: 4 })];
  return seaWaves(seaRequest({ cascades, ...changes }))[0].amplitudes;
};
const current = { eastMps: -1.9, northMps: 0.6 };
const pair = (turns: number, opposite: number, frameCount: number): WaveAmplitudes =>
  handWaves(LATTICE, { frameCount, periodS: 4 }, [
    { nx: 3, ny: -1, amplitudeM: 0.3, turns },
    { nx: -3, ny: 1, amplitudeM: 0.2, phaseRad: 0.8, turns: opposite },
  ]);

const cases: [string, WaveAmplitudes, number, number][] = [
  ['a sea on deep, still water', drawn({}), Infinity, 1],
  ['a sea against a current on 4 m', drawn({ current, water: { ...SEA_WATER_DEFAULTS, depthM: 4 } }), 4, 0.8],
  [
    'waves in no order, many turns shared',
    scatteredWaves(LATTICE, { frameCount: 10, periodS: 4 }, 2),
    2,
    1.2,
  ],
  ['an odd number of frames', scatteredWaves(LATTICE, { frameCount: 9, periodS: 4 }, 3), 2, 1.2],
  ['a pair that both stand', pair(0, 0, 12), Infinity, 1],
  ['a pair turning against each other', pair(3, -3, 12), Infinity, 1],
  ['a pair whose turns make up the frames', pair(2, 3, 5), Infinity, 1],
  ['a pair turning alike', pair(3, 3, 12), Infinity, 1],
];

describe.each(cases)('fieldDeviations: %s', (_, waves, depthM, scale) => {
  it('are those of the whole loop', () => {
    const predicted = fieldDeviations(waves, depthM, scale);
    const measured = measuredDeviations(waves, depthM, scale);
    for (const name of [...FIELD_NAMES, 'compression'] as const) {
      expectRelative(predicted[name], measured[name], PARSEVAL, name);
    }
    expectRelative(loopVariance(waves), measured.height ** 2, PARSEVAL, 'loopVariance');
  });
});

describe('a pair of opposite waves', () => {
  it('adds its heights where its phases stay opposite, its energies where they do not', () => {
    // Heights in phase at one place stay so: (0.3^2 + 0.2^2 + 2 * 0.3 * 0.2 * cos 0.8) / 2.
    const standing = (0.09 + 0.04 + 0.12 * Math.cos(0.8)) / 2;
    expectRelative(loopVariance(pair(3, -3, 12)), standing, 1e-14, 'opposite turns');
    expectRelative(loopVariance(pair(3, 3, 12)), 0.065, 1e-14, 'equal turns');
  });
});
