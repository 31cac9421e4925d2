import { inverseWaveAge } from '../physics/growth.ts';
import type { Water } from '../physics/water.ts';
import { frictionVelocity } from '../physics/wind.ts';
import type { SpreadingRequest } from '../sea/sea.ts';
import {
  frequencySpectrum,
  type SpectrumParameters,
  type SpreadingParameters,
} from '../spectrum/registry.ts';

/**
 * Inverse wave age U10/cp assumed by a spreading law that needs it where no wind is given: that of the sea for which
 * Hasselmann et al. 1980 fitted their exponents.
 */
const ASSUMED_INVERSE_WAVE_AGE = 1.17;

/** A spreading with the numbers it takes from its spectrum and wind. */
export function resolvedSpreading(
  request: SpreadingRequest,
  spectrum: SpectrumParameters,
  windSpeedMps: number | null,
  water: Water,
): SpreadingParameters {
  const omegaPeakRadPerS = frequencySpectrum(spectrum, water).omegaPeak;
  const { swellNarrowing } = request;
  const waveAge =
    windSpeedMps === null
      ? ASSUMED_INVERSE_WAVE_AGE
      : inverseWaveAge(windSpeedMps, omegaPeakRadPerS, water.gravityMps2);
  switch (request.form) {
    case 'cos-2s':
      return { form: 'cos-2s', s: request.s as number, omegaPeakRadPerS, swellNarrowing };
    case 'wrapped-normal':
      return { form: 'wrapped-normal', standardDeviationRad: request.widthRad as number };
    case 'donelan-banner':
      return { form: 'donelan-banner', omegaPeakRadPerS };
    case 'elfouhaily': {
      const wind = windSpeedMps as number;
      return {
        form: 'elfouhaily',
        windSpeedMps: wind,
        // Its own spectrum says how old the sea is; beside another one the peak does.
        inverseWaveAge: spectrum.form === 'elfouhaily' ? spectrum.inverseWaveAge : waveAge,
        frictionVelocityMps: frictionVelocity(wind),
        gravityMps2: water.gravityMps2,
      };
    }
    default:
      return { form: request.form, omegaPeakRadPerS, inverseWaveAge: waveAge, swellNarrowing };
  }
}
