import { describe, expect, it } from 'vitest';
import { SEA_WATER_DEFAULTS, STANDARD_GRAVITY_MPS2 } from '../../src/physics/water.ts';
import {
  donelanHamiltonHui,
  waveAgeEnhancement,
  waveAgeWidth,
} from '../../src/spectrum/donelan-hamilton-hui.ts';
import { significantHeight } from '../../src/spectrum/moments.ts';
import { expectPrinted, expectRelative, FEW_ULP } from '../support/tolerances.ts';

const g = STANDARD_GRAVITY_MPS2;

describe('Donelan, Hamilton & Hui 1985', () => {
  // Law verified in ScientiMate at baa75db3; values computed elsewhere.
  it.each([
    [10, 0.83, '.813952', '1.7', '.639649', '.911688', '.100075', '2.973219', '.291573'],
    [10, 1, '.980665', '1.7', '.4', '.397872', '.0382341', '2.097164', '.205662'],
    [10, 2, '1.961330', '3.506180', '.12', '.0375444', '.00170900', '.686336', '.0673065'],
    [10, 3, '2.941995', '4.562728', '.0918519', '.00804136', '.000281278', '.346842', '.0340136'],
    [15, 1.2, '.784532', '2.175087', '.265185', '1.717399', '.126096', '3.622227', '.157875'],
  ])('%d m/s, U / cp = %f', (U10, age, peak, gamma, sigma, atPeak, atTwice, height, dimensionless) => {
    const omegaPeakRadPerS = (age * g) / U10;
    const sea = donelanHamiltonHui(
      { form: 'donelan-hamilton-hui', omegaPeakRadPerS, inverseWaveAge: age },
      SEA_WATER_DEFAULTS,
    );
    expectPrinted(sea.omegaPeak, peak, 'omega_p');
    expectPrinted(waveAgeEnhancement(age), gamma, 'gamma');
    expectPrinted(waveAgeWidth(age), sigma, 'sigma');
    expectPrinted(sea.density(omegaPeakRadPerS), atPeak, 'S(omega_p)');
    expectPrinted(sea.density(2 * omegaPeakRadPerS), atTwice, 'S(2 omega_p)');
    expectPrinted(significantHeight(sea), height, 'Hs');
    expectPrinted((significantHeight(sea) * g) / U10 ** 2, dimensionless, 'g Hs / U^2');
  });

  it('has an omega^-4 tail', () => {
    const sea = donelanHamiltonHui(
      { form: 'donelan-hamilton-hui', omegaPeakRadPerS: 1, inverseWaveAge: 3 },
      SEA_WATER_DEFAULTS,
    );
    expectRelative(sea.density(1e4) / sea.density(2e4), 16, FEW_ULP, 'ratio an octave apart');
    expect(sea.density(10) / sea.density(20)).toBeGreaterThan(15.9);
  });
});
