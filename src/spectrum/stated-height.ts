import type { Water } from '../physics/water.ts';
import { spectralMoment } from './moments.ts';
import { frequencySpectrum, type SpectrumParameters } from './registry.ts';

/**
 * The same spectrum with another energy factor, such that its significant height on this water is the stated one.
 *
 * @param significantHeightM Hs = 4 sqrt(m0), m, >= 0
 */
export function withSignificantHeight(
  parameters: SpectrumParameters,
  water: Water,
  significantHeightM: number,
): SpectrumParameters {
  const unscaled = frequencySpectrum({ ...parameters, energyFactor: 1 }, water);
  return { ...parameters, energyFactor: significantHeightM ** 2 / 16 / spectralMoment(unscaled, 0) };
}
