import { afterAll, describe, expect, it } from 'vitest';
import { amplitudesHash } from '../../../src/plan/plan-bake.ts';
import { directSum } from '../../../src/verify/direct-sum.ts';
import { waveProjection } from '../../../src/verify/measured-waves.ts';
import { planeTransform } from '../../../src/verify/plane-transform.ts';
import { targetWaves } from '../../../src/verify/target-waves.ts';
import { velocityMaker } from '../../../src/verify/velocity.ts';
import { peakPeriodS, waveMoments } from '../../../src/verify/wave-moments.ts';
import { wavesOfCascade, wavesOfManifest } from '../../../src/verify/waves-of-manifest.ts';
import { bandVariances, systemTables } from '../../../src/waves/cascade-waves.ts';
import { cellVariances } from '../../../src/waves/cell-variance.ts';
import { loopVariance } from '../../../src/waves/wave-amplitudes.ts';
import { directFields } from '../../support/direct-sum.ts';
import { bakeFacts, firstCascade, frameOf } from '../../support/facts.ts';
import { bakeShelf, type SMALL_SEAS } from '../../support/small-bakes.ts';
import { handWaves } from '../../support/tiny-waves.ts';

const shelf = bakeShelf();
afterAll(shelf.remove);

describe('the waves of a manifest', () => {
  it.each([
    'plain',
    'current',
    'shallow',
    'deterministic',
    'gains and little against the wind',
  ] as (keyof typeof SMALL_SEAS)[])(
    'are those of the plan to the bit, all at once or one cascade at a time: %s',
    async (name) => {
      const { manifest } = bakeFacts(await shelf.bake(name));
      wavesOfManifest(manifest).forEach(({ amplitudes }, c) => {
        expect(amplitudesHash(amplitudes)).toBe(manifest.cascades[c].amplitudesHash);
        expect(amplitudesHash(wavesOfCascade(manifest, c).amplitudes)).toBe(
          manifest.cascades[c].amplitudesHash,
        );
      });
    },
  );
});

describe('the direct sum', () => {
  it('is that of another direct sum, in every field', async () => {
    const facts = firstCascade(await shelf.bake('current'));
    const { amplitudes } = facts.waves();
    const fields = directFields(amplitudes, 5, facts.water.depthM, 1);
    const at = directSum(facts, 5)(7, 22);
    const texel = 22 * facts.cascade.resolution + 7;
    const pairs = [
      [at.height, fields.height],
      [at.east, fields.displacementEast],
      [at.north, fields.displacementNorth],
      [at.heightRate, fields.velocityUp],
      [at.eastRate, fields.velocityEast],
      [at.northRate, fields.velocityNorth],
      [at.Sx, fields.slopeEast],
      [at.Sy, fields.slopeNorth],
      [at.Dxx, fields.strainEastEast],
      [at.Dyy, fields.strainNorthNorth],
      [at.Dxy, fields.strainEastNorth],
    ] as const;
    for (const [value, field] of pairs) expect(value).toBeCloseTo(field[texel], 12);
  });
});

describe('waves measured from frames', () => {
  it('are the waves that the frames were made from: their amplitudes, their variance, nothing off the shell', async () => {
    const facts = firstCascade(await shelf.bake('current'));
    const { amplitudes } = facts.waves();
    const { frameCount, periodS, lattice } = amplitudes;
    const projection = waveProjection(lattice, frameCount, periodS, facts.turns(), facts.transform());
    for (let n = 0; n < frameCount; n++) {
      const { height } = directFields(amplitudes, n, Infinity, 1);
      const field = frameOf({ height }, facts).field('height');
      if (field !== null) projection.add(n, field);
    }
    const waves = projection.waves();
    const variance = loopVariance(amplitudes);
    amplitudes.amplitude.forEach((part, i) => {
      // Waves that stand keep their sum; there is none in this sea that the frames show.
      expect(Math.abs(waves.amplitude[i] - part)).toBeLessThan(1e-12 * Math.sqrt(variance));
    });
    expect(waves.onShell / variance).toBeCloseTo(1, 12);
    expect(waves.meanSquare / variance).toBeCloseTo(1, 12);
    expect(1 - waves.onShell / waves.meanSquare).toBeLessThan(1e-12);
  }, 60_000);

  it.each([
    ['the speed of its length', 0, 1],
    ['a turn more', 1, 0],
    ['a turn less', -1, 0],
  ])('of one wave that moves at %s', async (_, more, share) => {
    const facts = firstCascade(await shelf.bake('tiny'));
    const { resolution: N, patchLengthM } = facts.cascade;
    const [nx, ny] = [3, -2];
    const m = facts.turns()[((ny + N) % N) * N + nx] + more;
    const loop = { frameCount: facts.request.frameCount, periodS: facts.request.periodS };
    const hand = handWaves({ resolution: N, patchLengthM }, loop, [{ nx, ny, amplitudeM: 0.3, turns: m }]);
    const projection = waveProjection(
      hand.lattice,
      loop.frameCount,
      loop.periodS,
      facts.turns(),
      planeTransform(N),
    );
    for (let n = 0; n < loop.frameCount; n++) {
      const field = frameOf({ height: directFields(hand, n, Infinity, 1).height }, facts).field('height');
      if (field !== null) projection.add(n, field);
    }
    const waves = projection.waves();
    expect(waves.meanSquare).toBeCloseTo(0.045, 12);
    expect(waves.onShell / waves.meanSquare).toBeCloseTo(share, 10);
  });
});

describe('the velocity', () => {
  it('of measured waves is that of a direct sum', async () => {
    const facts = firstCascade(await shelf.bake('current'));
    const { amplitudes } = facts.waves();
    const measured = {
      ...amplitudes,
      variance: new Float64Array(0),
      onShell: 0,
      meanSquare: 0,
      mean: 0,
      rounding: 0,
      turns: facts.turns(),
    };
    const [east, north, up] = velocityMaker(facts, measured)(7);
    const fields = directFields(amplitudes, 7, facts.water.depthM, 1);
    for (const [made, direct] of [
      [east, fields.velocityEast],
      [north, fields.velocityNorth],
      [up, fields.velocityUp],
    ] as const) {
      made.values.forEach((value, i) => {
        expect(Math.abs(value - direct[i])).toBeLessThan(1e-12);
      });
    }
  });
});

describe('target waves', () => {
  it.each(['plain', 'current', 'shallow', 'many waves'] as (keyof typeof SMALL_SEAS)[])(
    'have the variance of the waves that are drawn, band by band: %s',
    async (name) => {
      const { request, manifest } = bakeFacts(await shelf.bake(name));
      manifest.cascades.forEach((_, c) => {
        const cascade = request.cascades[c];
        const tables = systemTables(request, [cascade]);
        const variances = bandVariances(tables, cascade.band);
        const N = cascade.resolution;
        const none = new Int32Array(N * N);
        const target = targetWaves(request, cascade, none);
        const drawn = tables.map(
          (table, s) => cellVariances(table, cascade, cascade.band, variances[s]).variance,
        );
        // Bands of an octave in cells, from the origin outward.
        const sums = new Map<number, { target: number; drawn: number }>();
        for (let i = 0; i < N * N; i++) {
          const [nx, ny] = [i % N, Math.floor(i / N)].map((n) => (n < N / 2 ? n : n - N));
          const band = Math.floor(Math.log2(Math.max(1, Math.hypot(nx, ny))));
          const sum = sums.get(band) ?? { target: 0, drawn: 0 };
          sum.target += target.variance[i];
          for (const variance of drawn) sum.drawn += variance[i];
          sums.set(band, sum);
        }
        for (const sum of sums.values()) {
          if (sum.target < target.m0 / 20) continue;
          expect(Math.abs(sum.target / sum.drawn - 1)).toBeLessThan(0.005);
        }
      });
    },
  );
});

describe('moments of measured waves', () => {
  it('of one wave along the wind are a^2/2, its period, and its slope variance', () => {
    const lattice = { resolution: 16, patchLengthM: 32 };
    const variance = new Float64Array(256);
    const turns = new Int32Array(256);
    variance[3] = 0.02;
    turns[3] = 5;
    const measured = {
      lattice,
      frameCount: 16,
      periodS: 10,
      amplitude: new Float64Array(512),
      turns,
      variance,
      onShell: 0.02,
      meanSquare: 0.02,
      mean: 0,
      rounding: 0,
    };
    const moments = waveMoments(measured, 0);
    const k = (2 * Math.PI * 3) / 32;
    expect(moments.alongWind).toBeCloseTo(0.02 * k * k, 14);
    expect(moments.acrossWind).toBeCloseTo(0, 14);
    expect(waveMoments(measured, Math.PI / 2).acrossWind).toBeCloseTo(0.02 * k * k, 14);
    expect(2 * Math.PI * Math.sqrt(moments.m0 / moments.m2)).toBeCloseTo(2, 12);
    expect(peakPeriodS([moments])).toBeCloseTo(2, 12);
    // A second cascade with a shorter loop, a tenth of the energy at half the period: hardly moves the peak.
    const finer = { ...moments, byTurns: new Map([[5, 0.002]]), periodS: 5 };
    expect(peakPeriodS([moments, finer])).toBeCloseTo(2, 3);
    expect(peakPeriodS([{ ...moments, byTurns: new Map() }])).toBeNull();
  });
});
