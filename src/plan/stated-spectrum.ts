import { inverseWaveAge } from '../physics/growth.ts';
import type { Water } from '../physics/water.ts';
import type { StatedHeight, SwellRequest, WindSeaRequest } from '../sea/sea.ts';
import { ochiHubbleMember } from '../spectrum/ochi-hubble.ts';
import { steepnessEnhancement } from '../spectrum/peak-enhancement.ts';
import { frequencySpectrum, type SpectrumParameters } from '../spectrum/registry.ts';
import { withSignificantHeight } from '../spectrum/stated-height.ts';
import { inShort, seaStateWords } from './system-words.ts';
import type { ResolvedSpectrum } from './systems.ts';

/**
 * Peak enhancement of a swell for which none is given. The rule by steepness is not for swell: it makes every long low
 * sea a Pierson-Moskowitz one, while waves that left their short companions behind are narrower than that, not wider.
 * Source: Hasselmann et al. 1973 (the mean).
 */
const SWELL_PEAK_ENHANCEMENT = 3.3;

type FormedRequest = WindSeaRequest | SwellRequest;

/** Spectrum of a stated height and peak period: both are met in this depth. */
export function statedSpectrum(request: FormedRequest, stated: StatedHeight, water: Water): ResolvedSpectrum {
  const { significantHeightM } = stated;
  const omegaPeak = (2 * Math.PI) / stated.peakPeriodS;
  const unscaled = statedForm(request, stated, water);
  const spectrum = withSignificantHeight(peakedAt(unscaled, omegaPeak, water), water, significantHeightM);
  return { spectrum, basis: `${statedWords(request, stated)}${formWords(request, spectrum)}` };
}

/** A peak enhancement that nobody gave: by the steepness of a wind sea, else the mean. */
export function statedPeakEnhancement(request: FormedRequest, stated: StatedHeight): number {
  if (request.peakEnhancement !== null) return request.peakEnhancement;
  return request.kind === 'wind-sea'
    ? steepnessEnhancement(stated.significantHeightM, stated.peakPeriodS)
    : SWELL_PEAK_ENHANCEMENT;
}

function statedForm(request: FormedRequest, stated: StatedHeight, water: Water): SpectrumParameters {
  const { significantHeightM } = stated;
  const omegaPeakRadPerS = (2 * Math.PI) / stated.peakPeriodS;
  switch (request.spectrum) {
    // A Pierson-Moskowitz sea of any height and period is the two-parameter form.
    case 'pierson-moskowitz':
    case 'bretschneider':
      return { form: 'bretschneider', significantHeightM, omegaPeakRadPerS, energyFactor: 1 };
    case 'torsethaugen':
      return { form: 'torsethaugen', significantHeightM, omegaPeakRadPerS, energyFactor: 1 };
    case 'ochi-hubble':
      return { ...ochiHubbleMember(request.spectrumRow ?? 0, significantHeightM), energyFactor: 1 };
    case 'donelan-hamilton-hui': {
      const wind = request.kind === 'wind-sea' ? request.windSpeedMps : null;
      const age = inverseWaveAge(wind as number, omegaPeakRadPerS, water.gravityMps2);
      return { form: 'donelan-hamilton-hui', omegaPeakRadPerS, inverseWaveAge: age, energyFactor: 1 };
    }
    case 'elfouhaily':
      throw new RangeError('elfouhaily follows from wind and fetch, not from a height');
    default: {
      const peakEnhancement = statedPeakEnhancement(request, stated);
      return { form: request.spectrum, alpha: 0.01, omegaPeakRadPerS, peakEnhancement, energyFactor: 1 };
    }
  }
}

/** The depth factor moves a spectrum's peak: shifts the parent's until the peak is where it was asked for. */
export function peakedAt(
  parameters: SpectrumParameters,
  omegaPeak: number,
  water: Water,
): SpectrumParameters {
  if (parameters.form !== 'tma') return parameters;
  let shifted = parameters;
  // The shift is at most 14 % and nearly proportional: each step gains two digits or more.
  for (let step = 0; step < 8; step++) {
    const found = frequencySpectrum(shifted, water).omegaPeak;
    shifted = { ...shifted, omegaPeakRadPerS: shifted.omegaPeakRadPerS * (omegaPeak / found) };
  }
  return shifted;
}

function statedWords(request: FormedRequest, { significantHeightM, peakPeriodS }: StatedHeight): string {
  const height = inShort(significantHeightM, 6);
  if (request.kind === 'swell')
    return `stated height ${height} m and peak period ${peakPeriodS} s in this depth`;
  const state = seaStateWords(request.seaState);
  switch (request.periodBy) {
    case 'full-development':
      return (
        `${state}height ${height} m in this depth, peak period ${inShort(peakPeriodS)} s as in a fully developed sea ` +
        '(Pierson & Moskowitz 1964)'
      );
    case 'spectrum':
      return `${state}stated height ${height} m in this depth`;
    default:
      return `${state}stated height ${height} m and peak period ${peakPeriodS} s in this depth`;
  }
}

function formWords(request: FormedRequest, spectrum: SpectrumParameters): string {
  switch (spectrum.form) {
    case 'jonswap':
    case 'tma': {
      const rule = request.kind === 'wind-sea' && request.peakEnhancement === null ? ' (DNV-RP-C205)' : '';
      return `, peak enhancement ${inShort(spectrum.peakEnhancement)}${rule}`;
    }
    case 'ochi-hubble': {
      const row = request.spectrumRow ?? 0;
      const member = row === 0 ? 'the most probable sea' : `row ${row} of the seas`;
      return `, ${member} of this height in the North Atlantic (Ochi & Hubble 1976)`;
    }
    case 'torsethaugen':
      return ', wind sea and swell as on average off Norway (Torsethaugen & Haver 2004)';
    case 'donelan-hamilton-hui':
      return `, inverse wave age ${inShort(spectrum.inverseWaveAge)} (Donelan, Hamilton & Hui 1985)`;
    default:
      return '';
  }
}
