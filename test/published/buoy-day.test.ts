import { describe, expect, it } from 'vitest';
import { planBake } from '../../src/plan/plan-bake.ts';
import { resolvedSystems } from '../../src/plan/systems.ts';
import { significantHeight, spectralMoment } from '../../src/spectrum/moments.ts';
import { directionalSpreading, frequencySpectrum } from '../../src/spectrum/registry.ts';
import { buoySea, buoyText, measuredSystem, printedHours } from '../support/buoy-day.ts';
import { expectRelative } from '../support/tolerances.ts';

// A day of NDBC station 41010, real-time files and what the station printed beside them. Status: verified (public data).

const HOURS = printedHours();
const degrees = (rad: number): number => (rad * 180) / Math.PI;

/** Angle from one direction to another, degrees in (-180, 180]. */
const turn = (from: number, to: number): number => ((to - from + 540) % 360) - 180;

/** 4 sqrt(sum C11 df) of a row, read here a second time in the simplest way. */
function heightOfFile(time: string): number {
  const stamp = time.replace(/[-T:Z]/g, ' ').trim();
  const row = buoyText('41010.data_spec')
    .split('\n')
    .find((line) => line.startsWith(stamp)) as string;
  const words = row.replace(/[()]/g, '').trim().split(/\s+/).slice(6).map(Number);
  let m0 = 0;
  for (let i = 0; i < words.length; i += 2) {
    const [C11, f] = [words[i], words[i + 1]];
    m0 += C11 * (f < 0.095 ? 0.005 : f < 0.36 ? 0.01 : 0.02);
  }
  return 4 * Math.sqrt(m0);
}

it('has 24 hours', () => {
  expect(HOURS).toHaveLength(24);
  expect(HOURS[0]).toEqual({ time: '2020-06-08T03:50Z', heightM: '1.1', meanDirectionDeg: 196 });
});

describe.each(HOURS)('$time', ({ time, heightM, meanDirectionDeg }) => {
  const sea = buoySea(time);
  const { spectrum } = measuredSystem(sea);
  const [system] = resolvedSystems(sea);
  const S = frequencySpectrum(system.spectrum, sea.water);

  it(`is ${heightM} m high, as printed`, () => {
    // Printed to .1 m, and from bands the file prints to three decimals only: .065 m.
    expect(Math.abs(spectrum.significantHeightM - Number(heightM))).toBeLessThanOrEqual(0.065);
    expectRelative(spectrum.significantHeightM, heightOfFile(time), 1e-12, 'height of the file');
  });

  it('keeps the height of the file as a spectrum', () => {
    expectRelative(significantHeight(S), spectrum.significantHeightM, 1e-8, 'Hs');
    // The lines between the bands differ from the sum by this factor, where bands change their width.
    expect(Math.abs(Math.sqrt(system.spectrum.energyFactor) - 1)).toBeLessThan(0.005);
  });

  it(`comes from ${meanDirectionDeg} degrees at its peak, as printed`, () => {
    // Directions are printed in steps of 4 degrees in the spectral files, the mean to 1.
    expect(Math.abs(turn(degrees(spectrum.peakFromRad), meanDirectionDeg))).toBeLessThanOrEqual(2);
  });

  it('has no negative direction, and keeps r1 and the mean direction of every band', () => {
    const spreading = directionalSpreading(system.spreading);
    spectrum.frequencyHz.forEach((f, i) => {
      const p = spreading.parameter(2 * Math.PI * f);
      let [sum, cos1, sin1, least] = [0, 0, 0, Infinity];
      for (let a = 0; a < 720; a++) {
        const theta = ((a + 0.5) / 720) * 2 * Math.PI - Math.PI;
        const D = spreading.normaliser(p) * spreading.shape(theta, p);
        sum += D;
        cos1 += D * Math.cos(theta);
        sin1 += D * Math.sin(theta);
        least = Math.min(least, D);
      }
      const step = (2 * Math.PI) / 720;
      expect(least).toBeGreaterThanOrEqual(0);
      expect(sum * step).toBeCloseTo(1, 9);
      expect(cos1 * step).toBeCloseTo(spectrum.cos1[i], 9);
      expect(sin1 * step).toBeCloseTo(spectrum.sin1[i], 9);
    });
  });
});

describe('between two hours', () => {
  it('energy and its direction are blended', () => {
    const [before, after, between] = ['02:50', '03:50', '03:05'].map(
      (clock) => measuredSystem(buoySea(`2020-06-08T${clock}Z`)).spectrum,
    );
    between.densityM2PerHz.forEach((S, i) => {
      expect(S).toBeCloseTo(0.75 * before.densityM2PerHz[i] + 0.25 * after.densityM2PerHz[i], 12);
    });
    const m0 = (height: number): number => (height / 4) ** 2;
    expectRelative(
      m0(between.significantHeightM),
      0.75 * m0(before.significantHeightM) + 0.25 * m0(after.significantHeightM),
      1e-12,
      'm0',
    );
    expect(measuredSystem(buoySea('2020-06-08T03:05Z')).source).toBe(
      '41010.data_spec, 2020-06-08 03:05 UTC, between the records of 2020-06-08 02:50 UTC and 2020-06-08 03:50 UTC',
    );
  });
});

describe('on the tiles', () => {
  const sea = buoySea('2020-06-08T03:50Z', {
    cascades: { count: 2, resolution: 128, shortestWavelength: 4 },
    loop: { seconds: 30, frameRate: 4 },
  });
  const { plan } = planBake(sea);
  const [report] = plan.report.systems;
  const spectrum = measuredSystem(sea).spectrum;

  it('the lattice keeps the height of the file', () => {
    expectRelative(plan.systems[0].significantHeightM, spectrum.significantHeightM, 1e-4, 'table');
    expectRelative(plan.report.sea.expectedHeightM, spectrum.significantHeightM, 5e-3, 'lattice');
  });

  it('the lattice keeps its mean direction and frequency', () => {
    // A quarter of the step of 4 degrees in which the files print directions.
    expect(Math.abs(degrees(report.meanDirectionShiftRad))).toBeLessThan(1);
    expect(Math.abs(report.meanFrequencyShift)).toBeLessThan(0.005);
    const S = frequencySpectrum(plan.systems[0].spectrum, sea.water);
    const m2 = spectralMoment(S, 2);
    const Tz = 2 * Math.PI * Math.sqrt(spectralMoment(S, 0) / m2);
    expectRelative(plan.report.sea.meanZeroCrossingPeriodS, Tz, 1e-3, 'Tz');
    // APD as the station prints it, by processing of its own, is 4.9 s: its own bands give up to .2 s more.
    expect(Math.abs(Tz - 4.9)).toBeLessThan(0.2);
  });

  it('the basis says what it is', () => {
    expect(plan.systems[0].kind).toBe('measured');
    expect(plan.systems[0].basis).toMatch(
      /^from 41010\.data_spec, record of 2020-06-08 03:50 UTC: height 1\.12 m, peak 5\.56 s from 196 deg, 46 bands from 0\.0325 to 0\.485 Hz/,
    );
  });
});
