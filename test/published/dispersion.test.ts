import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import {
  absoluteAngularFrequency,
  angularFrequency,
  cothKh,
  groupVelocity,
  phaseSpeed,
  wavelengthM,
  wavelengthWavenumber,
  wavenumber,
} from '../../src/physics/dispersion.ts';
import { STANDARD_GRAVITY_MPS2, type Water } from '../../src/physics/water.ts';
import { expectPrinted, expectRelative, FEW_ULP, POWERS } from '../support/tolerances.ts';

interface CheckValues {
  readonly 'finite_depth_g9.80665': readonly {
    h: number;
    T: number;
    L: number;
    k: number;
    c: number;
    cg: number;
  }[];
  readonly spm_c1_style: readonly { d_L0: number; kd: number; tanh: number; H_H0p: number; n: number }[];
  readonly kh_vs_k0h: Readonly<Record<string, { exact: number }>>;
}

const checkValues: CheckValues = json('check-dispersion.json');
const toolboxPairs: Readonly<Record<string, { k: number[]; w: number[]; h: number }>> =
  json('mhkit-wavenumbers.json');

function json<T>(name: string): T {
  return JSON.parse(readFileSync(new URL(`data/${name}`, import.meta.url), 'utf8'));
}

/** Water without surface tension, as the gravity-wave tables assume. */
function gravityWater(depthM: number, gravityMps2: number = STANDARD_GRAVITY_MPS2): Water {
  return { depthM, gravityMps2, densityKgpm3: 1000, surfaceTensionNpm: 0 };
}

describe('gravity waves, printed by others', () => {
  // pywafo at c831ec8e, doctests of its wave theory module; g = 9.81. Status: verified.
  it.each([
    ['0.01', '.3132092', '.13914927'],
    ['0.21', '1.43530485', '1.43498213'],
    ['0.41', '2.00551739', '2.00551724'],
  ])('frequency of k = %s rad/m, deep and 20 m', (k, deep, shallow) => {
    expectPrinted(angularFrequency(Number(k), gravityWater(Infinity, 9.81)), deep, 'deep');
    expectPrinted(angularFrequency(Number(k), gravityWater(20, 9.81)), shallow, '20 m');
  });

  it.each([
    ['1', '.1019368', '.10503601'],
    ['2', '.4077472', '.40774726'],
    ['3', '.91743119', '.91743119'],
  ])('wavenumber of omega = %s rad/s, deep and 20 m', (omega, deep, shallow) => {
    expectPrinted(wavenumber(Number(omega), gravityWater(Infinity, 9.81)), deep, 'deep');
    expectPrinted(wavenumber(Number(omega), gravityWater(20, 9.81)), shallow, '20 m');
  });

  // MHKiT-Python at 9fa9f9c9, data/mhkit-wavenumbers.json; g = 9.81. Its own solver stops at 4e-8. Status: verified.
  it.each(Object.keys(toolboxPairs))('30 pairs of %s', (name) => {
    const { k, w, h } = toolboxPairs[name];
    const water = gravityWater(h, 9.81);
    expect(k).toHaveLength(30);
    for (let i = 0; i < k.length; i += 1) {
      expectRelative(angularFrequency(k[i], water), w[i], 5e-8, `omega(${k[i]})`);
      expectRelative(wavenumber(w[i], water), k[i], 1e-7, `k(${w[i]})`);
    }
  });

  // US Army Corps of Engineers EM 1110-2-1100 Part II ch. 1, Example II-1-1: T 10 s in 3 m. Status: verified; the
  // printed lengths (53.2 and 53.3 m) disagree among themselves, hence .3 %.
  it('worked example, 10 s in 3 m', () => {
    const water = gravityWater(3);
    const k = wavenumber((2 * Math.PI) / 10, water);
    expectRelative(wavelengthM(k), 53.2, 3e-3, 'wavelength');
    expectRelative(phaseSpeed(k, water), 5.32, 3e-3, 'speed');
  });

  // Shore Protection Manual 1984, Table C-1. Status: from memory.
  it.each([
    ['0.01', '.04032'],
    ['0.1', '.1410'],
    ['0.2', '.2251'],
  ])('relative depth at d/L0 = %s', (depthOverDeepLength, printed) => {
    const k0 = (2 * Math.PI * Number(depthOverDeepLength)) / 1;
    const k = wavenumber(Math.sqrt(STANDARD_GRAVITY_MPS2 * k0), gravityWater(1));
    expectPrinted(1 / wavelengthM(k), printed, 'd/L');
  });
});

// Below: computed from the published relations by an independent program, see data/README.md.

describe('gravity waves, computed elsewhere', () => {
  it('49 depths and periods: k, L, c, cg', () => {
    const rows = checkValues['finite_depth_g9.80665'];
    expect(rows).toHaveLength(49);
    for (const { h, T, k, L, c, cg } of rows) {
      const water = gravityWater(h);
      const found = wavenumber((2 * Math.PI) / T, water);
      const what = `h ${h}, T ${T}`;
      expectRelative(found, k, POWERS, `k, ${what}`);
      expectRelative(wavelengthM(found), L, POWERS, `L, ${what}`);
      expectRelative(phaseSpeed(found, water), c, POWERS, `c, ${what}`);
      expectRelative(groupVelocity(found, water), cg, POWERS, `cg, ${what}`);
    }
  });

  it('20 rows of the table of wave functions', () => {
    const rows = checkValues.spm_c1_style;
    expect(rows).toHaveLength(20);
    for (const { d_L0, kd, tanh, n, H_H0p } of rows) {
      const water = gravityWater(1);
      const k0 = 2 * Math.PI * d_L0;
      const omega = Math.sqrt(STANDARD_GRAVITY_MPS2 * k0);
      const k = wavenumber(omega, water);
      expectRelative(k, kd, POWERS, `kd at ${d_L0}`);
      expectRelative(
        1 / cothKh(Math.max(k, 0.05), 1),
        Math.max(tanh, Math.tanh(0.05)),
        POWERS,
        `tanh at ${d_L0}`,
      );
      const cg = groupVelocity(k, water);
      expectRelative(cg / phaseSpeed(k, water), n, POWERS, `n at ${d_L0}`);
      const deepCg = groupVelocity(k0, gravityWater(Infinity));
      expectRelative(Math.sqrt(deepCg / cg), H_H0p, POWERS, `shoaling at ${d_L0}`);
    }
  });

  it('kh of omega^2 h / g', () => {
    for (const [k0h, { exact }] of Object.entries(checkValues.kh_vs_k0h)) {
      const k = wavenumber(Math.sqrt(Number(k0h) * STANDARD_GRAVITY_MPS2), gravityWater(1));
      expectRelative(k, exact, POWERS, `kh at ${k0h}`);
    }
  });

  it.each([
    ['4', '24.9724'],
    ['6', '56.1880'],
    ['8', '99.8897'],
    ['10', '156.0777'],
    ['15', '351.1748'],
    ['20', '624.3107'],
  ])('deep-water length of T = %s s', (T, printed) => {
    expectPrinted(wavelengthM(wavenumber((2 * Math.PI) / Number(T), gravityWater(Infinity))), printed, 'L0');
  });

  it.each([
    ['.1', '10.033311'],
    ['.5', '2.1639534'],
    ['1', '1.3130353'],
    ['2', '1.0373147'],
    ['3', '1.0049698'],
  ])('coth kh at kh = %s', (kh, printed) => {
    expectPrinted(cothKh(Number(kh) / 7, 7), printed, 'coth kh');
  });
});

describe('capillary-gravity waves', () => {
  const clean20: Water = {
    depthM: Infinity,
    gravityMps2: 9.80665,
    densityKgpm3: 998.207,
    surfaceTensionNpm: 0.07275,
  };

  // Encyclopaedia Britannica: the slowest ripples run 23.1 cm/s at 1.73 cm. Status: verified; c is flat there, so the
  // length is only good to 1 %.
  it('slowest ripple', () => {
    const km = Math.sqrt((clean20.densityKgpm3 * clean20.gravityMps2) / clean20.surfaceTensionNpm);
    expectPrinted(phaseSpeed(km, clean20), '.231', 'least speed');
    expectRelative(wavelengthM(km), 0.0173, 0.011, 'its wavelength');
    expectRelative(groupVelocity(km, clean20), phaseSpeed(km, clean20), FEW_ULP, 'cg = c there');
  });

  it.each([
    [0.07275, 998.207, 9.80665, '366.821', '.231232', '13.4997'],
    [0.072, 1000, 9.81, '369.121', '.230550', '13.5442'],
    [0.07453, 1026, 9.80665, '367.425', '.231042', '13.5108'],
    [0.074, 1025, 9.81, '368.621', '.230706', '13.5351'],
  ])('slowest wave of tension %f, density %f, gravity %f', (tension, density, g, km, cmin, f) => {
    const water: Water = {
      depthM: Infinity,
      gravityMps2: g,
      densityKgpm3: density,
      surfaceTensionNpm: tension,
    };
    const k = Math.sqrt((density * g) / tension);
    expectPrinted(k, km, 'km');
    expectPrinted(phaseSpeed(k, water), cmin, 'c');
    expectPrinted(angularFrequency(k, water) / (2 * Math.PI), f, 'f');
    expect(phaseSpeed(0.99 * k, water)).toBeGreaterThan(phaseSpeed(k, water));
    expect(phaseSpeed(1.01 * k, water)).toBeGreaterThan(phaseSpeed(k, water));
  });

  it.each([
    [1, '7.850801', '1.249494', '.625113'],
    [0.1, '25.184282', '.400820', '.211835'],
    [0.05, '37.107473', '.295292', '.178661'],
    [0.02, '73.079466', '.232619', '.214737'],
    [0.01, '155.691255', '.247790', '.308698'],
    [0.005, '396.166551', '.315259', '.448135'],
  ])('clean water at 20 degC, %f m', (lambda, omega, c, cg) => {
    const k = wavelengthWavenumber(lambda);
    expectPrinted(angularFrequency(k, clean20), omega, 'omega');
    expectPrinted(phaseSpeed(k, clean20), c, 'c');
    expectPrinted(groupVelocity(k, clean20), cg, 'cg');
    expectRelative(wavenumber(Number(omega), clean20), k, 1e-7, 'k');
  });

  it.each([
    [0.05, 0.01, '34.214102'],
    [0.02, 0.005, '69.986795'],
  ])('clean water at 20 degC, %f m over %f m', (lambda, depthM, omega) => {
    expectPrinted(angularFrequency(wavelengthWavenumber(lambda), { ...clean20, depthM }), omega, 'omega');
  });
});

describe('waves on a current', () => {
  it.each([
    [10, 1, 0, '3.110596'],
    [10, 1, 180, '1.853959'],
    [50, 1, 0, '1.235772'],
    [50, 2, 60, '1.235772'],
    [100, 1, 180, '.722133'],
  ])('%d m waves, %d m/s at %d degrees', (lambda, speed, degrees, printed) => {
    const angle = (degrees * Math.PI) / 180;
    // Waves toward north-east, so that both components count.
    const k = wavelengthWavenumber(lambda) * Math.SQRT1_2;
    const current = {
      eastMps: speed * Math.cos(Math.PI / 4 + angle),
      northMps: speed * Math.sin(Math.PI / 4 + angle),
    };
    expectPrinted(absoluteAngularFrequency(k, k, gravityWater(Infinity), current), printed, 'omega');
  });
});
