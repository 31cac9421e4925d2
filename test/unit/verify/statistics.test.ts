import { afterAll, expect, it } from 'vitest';
import { foldedShareOfSum, foldWatch } from '../../../src/verify/folding.ts';
import { soundManifest } from '../../../src/verify/manifest-file.ts';
import { verifyBake } from '../../../src/verify/verify-bake.ts';
import { firstCascade } from '../../support/facts.ts';
import { bakeShelf } from '../../support/small-bakes.ts';

const shelf = bakeShelf();
afterAll(shelf.remove);

it('what is measured is what the manifest says of the files, and fits the waves', async () => {
  const folder = await shelf.bake('plain');
  const manifest = soundManifest(folder);
  const { statistics } = await verifyBake(folder);
  if (statistics === null) throw new Error('no statistics');
  manifest.cascades.forEach((cascade, c) => {
    const measured = statistics.cascades[c];
    const [, , up] = cascade.maps.displacement?.channels ?? [];
    expect(measured.id).toBe(cascade.id);
    expect(measured.significantHeightM.measured).toBeCloseTo(
      cascade.statistics.significantHeightM.measured ?? 0,
      10,
    );
    expect([measured.deepestTroughM, measured.largestCrestM]).toEqual([up.written.min, up.written.max]);
    expect(measured.foamCoverage).toBeCloseTo(cascade.foam?.coverage.measured ?? 0, 10);
    const { alongWind, acrossWind } = measured.slopeVariance ?? { alongWind: 0, acrossWind: 0 };
    // White rounding noise counts most in the shortest waves, but is small.
    const stated = cascade.statistics;
    expect(alongWind / stated.slopeVariance.alongWind).toBeCloseTo(1, 4);
    expect(acrossWind / stated.slopeVariance.acrossWind).toBeCloseTo(1, 4);
    expect(stated.skewness).toBeCloseTo(measured.skewness ?? Number.NaN, 10);
    expect(stated.kurtosis).toBeCloseTo(measured.kurtosis ?? Number.NaN, 10);
    expect([stated.deepestTroughM, stated.largestCrestM]).toEqual([
      measured.deepestTroughM,
      measured.largestCrestM,
    ]);
    expect(stated.foldedShare).toBe(0);
    expect(stated.heightStepMm).toBe(measured.halfStepAtLargestMm);
    // Halves between 2^-1 and 1 lie 2^-11 apart, and so on down.
    const largest = Math.max(up.written.max, -up.written.min);
    expect(measured.halfStepAtLargestMm).toBe(1000 * 2 ** (Math.floor(Math.log2(largest)) - 10));
    expect(measured.heightStepMm).toBeNull();
  });
  const { sea } = statistics;
  expect(sea.significantHeightM.measured).toBeCloseTo(
    manifest.statistics.significantHeightM.measured ?? 0,
    10,
  );
  expect(sea.largestCrestBoundM).toBeCloseTo(
    statistics.cascades.reduce((sum, one) => sum + (one.largestCrestM ?? 0), 0),
    12,
  );
  const whole = manifest.statistics;
  expect(whole.skewness).toBeCloseTo(sea.skewness ?? Number.NaN, 10);
  expect(whole.kurtosis).toBeCloseTo(sea.kurtosis ?? Number.NaN, 10);
  expect(whole.largestCrestBoundM).toBeCloseTo(sea.largestCrestBoundM ?? Number.NaN, 12);
  expect(whole.foamCoverage.measured).toBeCloseTo(sea.foamCoverage ?? Number.NaN, 10);
  expect(whole.foamCoverage.whitecapFormula).toBe(sea.whitecapCoverage);
  expect(whole.slopeVariance.coxMunk?.alongWind).toBe(sea.slopeVariance?.clean?.upwind);
  // Two tiles of 0.03 together, screened.
  expect(sea.foamCoverage).toBeCloseTo(0.03, 3);
  // Peak of the one system at 2.4 s, turned to a whole number of turns of 6 s and thrown about by few waves.
  expect(sea.peakPeriodS).toBeGreaterThan(1.9);
  expect(sea.peakPeriodS).toBeLessThan(3.1);
  expect(sea.slopeVariance?.clean?.total).toBeGreaterThan(0.03);
});

it('steps of codes are in mm, clipped texels are counted', async () => {
  const folder = await shelf.bake('clipped');
  const { statistics } = await verifyBake(folder);
  const [c0] = statistics?.cascades ?? [];
  const manifest = soundManifest(folder);
  const channels = Object.values(manifest.cascades[0].maps).flatMap((map) => map.channels);
  expect(c0.clippedValues).toBe(channels.reduce((sum, { written }) => sum + written.clipped, 0));
  expect(c0.clippedValues).toBeGreaterThan(0);
  // 0.25 m over 32767 codes.
  expect(c0.heightStepMm).toBeCloseTo(250 / 32767, 6);
  expect(c0.halfStepAtLargestMm).toBeNull();
});

it('the folded share counts texels of J below 0, of one cascade and of the sum', async () => {
  const facts = firstCascade(await shelf.bake('tiny'));
  const count = facts.cascade.resolution ** 2;
  const none = new Float64Array(count);
  const noise = { Sx: 0, Sy: 0, Dxx: 0, Dyy: 0, Dxy: 0, DxxDyy: 0, east: 0, north: 0 };
  const surface = { Sx: none, Sy: none, Dxx: none, Dyy: none, Dxy: none, east: none, north: none, noise };
  // A quarter of the tile squeezed by 0.7: not folded alone, but with another of its kind where they meet.
  const squeezed = {
    ...surface,
    Dxx: Float64Array.from({ length: count }, (_, i) => (i % 4 === 0 ? -0.7 : 0)),
  };
  const watches = [foldWatch(facts), foldWatch({ ...facts, cascade: { ...facts.cascade, id: 'another' } })];
  for (const watch of watches) watch.add(squeezed, 3);
  expect(watches[0].share()).toBe(0);
  // 20 000 pairs, of which a sixteenth meet: one deviation is 0.0017.
  expect(foldedShareOfSum(watches)).toBeCloseTo(1 / 16, 2);
  const folded = foldWatch(facts);
  folded.add({ ...surface, Dxx: squeezed.Dxx.map((value) => 2 * value) }, 3);
  expect(folded.share()).toBe(0.25);
  expect(foldWatch(facts).share()).toBeNull();
  expect(foldedShareOfSum([])).toBeNull();
});
