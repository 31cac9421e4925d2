import type { Water } from '../physics/water.ts';
import type { MeasuredRequest } from '../sea/sea.ts';
import type { SpectrumParameters, SpreadingParameters } from '../spectrum/registry.ts';
import { withSignificantHeight } from '../spectrum/stated-height.ts';
import { inShort } from './system-words.ts';
import type { ResolvedSpectrum } from './systems.ts';

/**
 * Spectrum of a record: its densities joined by straight lines, and brought to the height of the file, the sum of
 * densities times bandwidths, from which the lines differ where bands change their width.
 */
export function measuredSpectrum(request: MeasuredRequest, water: Water): ResolvedSpectrum {
  const { frequencyHz, densityM2PerHz, significantHeightM, peakFromRad } = request.spectrum;
  const table: SpectrumParameters = { form: 'tabulated', frequencyHz, densityM2PerHz, energyFactor: 1 };
  const last = frequencyHz.length - 1;
  const peakHz = frequencyHz[densityM2PerHz.indexOf(Math.max(...densityM2PerHz))];
  return {
    spectrum: withSignificantHeight(table, water, significantHeightM),
    basis:
      `from ${request.source}: height ${inShort(significantHeightM)} m, peak ${inShort(1 / peakHz)} s from ` +
      `${inShort((peakFromRad * 180) / Math.PI)} deg, ${last + 1} bands from ${inShort(frequencyHz[0])} to ` +
      `${inShort(frequencyHz[last])} Hz; directions of largest entropy (Kobune & Hashimoto 1986)`,
  };
}

/** Directions of a record, by the moments of each band. */
export function measuredSpreading({ spectrum }: MeasuredRequest): SpreadingParameters {
  const { frequencyHz, cos1, sin1, cos2, sin2 } = spectrum;
  return { form: 'tabulated', frequencyHz, cos1, sin1, cos2, sin2 };
}
