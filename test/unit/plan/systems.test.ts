import { describe, expect, test } from 'vitest';
import { type ResolvedSystem, resolvedSystems } from '../../../src/plan/systems.ts';
import { parseSea } from '../../../src/sea/parse.ts';
import { significantHeight } from '../../../src/spectrum/moments.ts';
import { frequencySpectrum } from '../../../src/spectrum/registry.ts';
import { expectRelative, MOMENT } from '../../support/tolerances.ts';

function system(keys: string, water = '{}'): ResolvedSystem & { readonly heightM: number } {
  const sea = parseSea(
    `seaFile: 1\ntitle: Test\nwater: ${water}\nsystems: [{ from: 250, ${keys} }]\nfoam: off`,
  );
  const [resolved] = resolvedSystems(sea);
  return { ...resolved, heightM: significantHeight(frequencySpectrum(resolved.spectrum, sea.water)) };
}

describe('what limits a sea', () => {
  const wind = 'kind: wind-sea, windSpeed: 20';
  test.each([
    [`${wind}, fetch: 20 km`, '{}', /^20\.0 m\/s wind, limited by a fetch of 20\.0 km \(JONSWAP 1973/],
    [`${wind}, fetch: unlimited`, '{}', /, fully developed \(/],
    [
      `${wind}, duration: 3 h`,
      '{}',
      /, limited by a duration of 3 h, which makes use of 22\.4 km of fetch \(/,
    ],
    [`${wind}, fetch: 20 km, duration: 3 h`, '{}', /, limited by a fetch of 20\.0 km/],
    [`${wind}, fetch: 30 km, duration: 3 h`, '{}', /, limited by a duration of 3 h/],
    [`${wind}, duration: 300 h`, '{}', /, fully developed/],
    [`${wind}, fetch: 100 km`, '{ depth: 6 m }', /, limited by a depth of 6 m/],
    [`${wind}, fetch: 5 km`, '{ depth: 30 m }', /, limited by a fetch of 5\.0 km/],
    [`${wind}, fetch: unlimited`, '{ depth: 4000 m }', /, fully developed/],
    [`${wind}, fetch: 20 km, growth: wilson`, '{}', /fetch of 20\.0 km \(Wilson 1965\)/],
    [`${wind}, fetch: 20 km, spectrum: elfouhaily`, '{}', /fetch of 20\.0 km \(Elfouhaily et al\. 1997\)/],
    [`${wind}, fetch: unlimited, growth: young-verhagen`, '{ depth: 8 m }', /depth of 8 m \(Young/],
    [`${wind}, spectrum: pierson-moskowitz`, '{}', /^fully developed sea of a 20\.0 m\/s wind/],
  ])('%s on %s', (keys, water, words) => {
    expect(system(keys, water).basis).toMatch(words);
  });

  test('a duration is as the fetch it makes use of', () => {
    const byTime = system(`${wind}, duration: 3 h`);
    const metres = ((10800 * 20 ** 0.34 * 9.80665 ** 0.33) / 77.23) ** (1 / 0.67);
    const byFetch = system(`${wind}, fetch: ${metres}`);
    expectRelative(byTime.heightM, byFetch.heightM, 1e-12, 'height');
  });
});

describe('the words a sea was asked for in', () => {
  test.each([
    [
      'kind: wind-sea, beaufort: 6',
      /^Beaufort 6, strong breeze \(10\.8 to 13\.8 m\/s\): 12\.3 m\/s wind, fully/,
    ],
    ['kind: wind-sea, beaufort: 12', /^Beaufort 12, hurricane \(from 32\.7 m\/s\): 34\.8 m\/s wind/],
    [
      'kind: wind-sea, windSpeed: 12, windHeight: 19.5 m, fetch: 9 km',
      /^12\.0 m\/s wind at 19\.5 m, 11\.3 m\/s at 10 m \(log law/,
    ],
    [
      'kind: wind-sea, seaState: 5',
      /^sea state 5, rough \(2\.5 to 4 m\): height 3\.25 m .* 8\.81 s as in a fully/,
    ],
    [
      'kind: wind-sea, seaState: 9, peakPeriod: 15',
      /^sea state 9, phenomenal \(over 14 m\): stated height 14 m/,
    ],
    ['kind: wind-sea, significantHeight: 1, peakPeriod: 4', /, peak enhancement 3\.16 \(DNV-RP-C205\)$/],
    ['kind: wind-sea, significantHeight: 1, peakPeriod: 4, peakEnhancement: 2', /, peak enhancement 2$/],
    ['kind: swell, significantHeight: 1, peakPeriod: 10', /, peak enhancement 3\.3$/],
    ['kind: wind-sea, significantHeight: 3, spectrum: ochi-hubble', /, the most probable sea of this height/],
    ['kind: wind-sea, significantHeight: 3, spectrum: { form: ochi-hubble, row: 7 }', /, row 7 of the seas/],
    ['kind: wind-sea, significantHeight: 3, peakPeriod: 9, spectrum: torsethaugen', /off Norway/],
    ['kind: swell, significantHeight: 1, peakPeriod: 10, scaleTo: 2.5 m', /; scaled to .* 2\.5 m$/],
  ])('%s', (keys, words) => {
    expect(system(keys).basis).toMatch(words);
  });
});

describe('heights asked for are met in the depth they are asked for', () => {
  test.each(['{}', '{ depth: 9 m }'])('in %s', (water) => {
    for (const spectrum of ['jonswap', 'tma', 'bretschneider', 'torsethaugen']) {
      const keys = `kind: wind-sea, significantHeight: 1.5, peakPeriod: 6, spectrum: ${spectrum}`;
      expectRelative(system(keys, water).heightM, 1.5, MOMENT, spectrum);
    }
    const age =
      'kind: wind-sea, significantHeight: 1.5, peakPeriod: 6, windSpeed: 11, spectrum: donelan-hamilton-hui';
    expectRelative(system(age, water).heightM, 1.5, MOMENT, 'donelan-hamilton-hui');
    const family = 'kind: wind-sea, significantHeight: 1.5, spectrum: { form: ochi-hubble, row: 8 }';
    expectRelative(system(family, water).heightM, 1.5, MOMENT, 'ochi-hubble');
  });

  test.each([
    'kind: wind-sea, windSpeed: 10, fetch: 20 km',
    'kind: wind-sea, windSpeed: 10, fetch: 20 km, spectrum: elfouhaily',
    'kind: wind-sea, windSpeed: 10, spectrum: pierson-moskowitz',
    'kind: wind-sea, seaState: 3',
    'kind: swell, significantHeight: 0.5, peakPeriod: 10',
  ])('scaleTo: %s', (keys) => {
    const [plain, scaled] = [system(keys), system(`${keys}, scaleTo: 2.5 m`)];
    expectRelative(scaled.heightM, 2.5, MOMENT, 'height');
    // Nothing but the level changes.
    const { energyFactor: one, ...before } = plain.spectrum;
    const { energyFactor: other, ...after } = scaled.spectrum;
    expect(after).toEqual(before);
    expectRelative(Math.sqrt(other / one), 2.5 / plain.heightM, MOMENT, 'factor');
    expect(scaled.spreading).toEqual(plain.spreading);
  });
});

describe('spreadings', () => {
  const wind = 'kind: wind-sea, windSpeed: 10, fetch: 20 km';
  test('take their numbers from spectrum and wind', () => {
    const own = system(`${wind}, spectrum: elfouhaily`);
    expect(own.spreading).toMatchObject({ form: 'elfouhaily', windSpeedMps: 10, gravityMps2: 9.80665 });
    expect(own.spreading).toHaveProperty(
      'inverseWaveAge',
      'inverseWaveAge' in own.spectrum ? own.spectrum.inverseWaveAge : NaN,
    );
    const beside = system(`${wind}, spreading: elfouhaily`);
    const omegaPeak = 'omegaPeakRadPerS' in beside.spectrum ? beside.spectrum.omegaPeakRadPerS : NaN;
    expect(beside.spreading).toHaveProperty('inverseWaveAge', (10 * omegaPeak) / 9.80665);
    expect(system(`${wind}, spreading: donelan-banner`).spreading).toEqual({
      form: 'donelan-banner',
      omegaPeakRadPerS: omegaPeak,
    });
    expect(system(`${wind}, spreading: { width: 20 deg }`).spreading).toEqual({
      form: 'wrapped-normal',
      standardDeviationRad: (20 * Math.PI) / 180,
    });
  });
});
