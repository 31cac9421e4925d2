import { jonswapGrowth } from '../physics/growth.ts';
import { windSpeedAtHeight } from '../physics/wind.ts';
import type { Water } from '../physics/water.ts';
import {
  frequencySpectrum,
  type SpectrumParameters,
  type SpreadingParameters,
} from '../spectrum/registry.ts';
import { significantHeight } from '../spectrum/moments.ts';
import { withSignificantHeight } from '../spectrum/stated-height.ts';
import type {
  Sea,
  SpreadingRequest,
  StatedHeight,
  SwellRequest,
  WaveSystemRequest,
  WindGrowth,
  WindSeaRequest,
} from '../sea/sea.ts';
import type { WaveSystem } from '../waves/wave-system.ts';

/** Peak enhancement where neither the user nor a growth law gives one. Source: Hasselmann et al. 1973 (the mean). */
const MEAN_PEAK_ENHANCEMENT = 3.3;

/**
 * Inverse wave age U10/cp assumed by a spreading law that needs it where no wind is given: that of the sea for which
 * Hasselmann et al. 1980 fitted their exponents.
 */
const ASSUMED_INVERSE_WAVE_AGE = 1.17;

/** A wave system with all its numbers, and how they were reached. */
export interface ResolvedSystem extends WaveSystem {
  readonly kind: 'wind-sea' | 'swell';
  readonly fromRad: number;
  readonly windSpeedMps: number | null;
  readonly basis: string;
}

/** Applies the growth laws and normalisations to every system of a sea. */
export function resolvedSystems(sea: Sea): readonly ResolvedSystem[] {
  return sea.systems.map((request) => {
    const { spectrum, basis } = resolvedSpectrum(request, sea.water);
    const windSpeedMps = request.kind === 'wind-sea' ? windSpeed(request) : null;
    return {
      name: request.name,
      kind: request.kind,
      fromRad: request.fromRad,
      towardRad: travelDirection(request.fromRad),
      windSpeedMps,
      spectrum,
      spreading: resolvedSpreading(request.spreading, spectrum, windSpeedMps, sea.water),
      againstShare: request.kind === 'wind-sea' ? sea.shaping.againstWind : 1,
      basis,
    };
  });
}

/**
 * Direction of travel, rad counter-clockwise from east in (-pi, pi], of waves that come from a nautical bearing, rad
 * clockwise from north.
 */
export function travelDirection(fromRad: number): number {
  const toward = -Math.PI / 2 - fromRad;
  return toward - 2 * Math.PI * Math.ceil((toward - Math.PI) / (2 * Math.PI));
}

/** The wind at 10 m a wind sea knows of, m/s, or null. */
export function windSpeed(request: WindSeaRequest): number | null {
  return request.growth?.windSpeedMps ?? request.windSpeedMps;
}

interface ResolvedSpectrum {
  readonly spectrum: SpectrumParameters;
  readonly basis: string;
}

function resolvedSpectrum(request: WaveSystemRequest, water: Water): ResolvedSpectrum {
  if (request.kind === 'wind-sea' && request.growth !== null) return grownSpectrum(request, request.growth, water);
  const { stated } = request as SwellRequest;
  return statedSpectrum(request, stated, water);
}

/** Spectrum of a wind and a fetch, as the fetch laws were published; on finite depth TMA takes its share of energy. */
function grownSpectrum(request: WindSeaRequest, growth: WindGrowth, water: Water): ResolvedSpectrum {
  const { windSpeedMps: U10, fetchM } = growth;
  if (request.spectrum === 'pierson-moskowitz') {
    const windSpeed19p5Mps = windSpeedAtHeight(U10, 19.5);
    return {
      spectrum: { form: 'pierson-moskowitz', windSpeed19p5Mps, energyFactor: 1 },
      basis: `fully developed sea of a ${U10.toFixed(1)} m/s wind (Pierson & Moskowitz 1964, wind taken to 19.5 m by the log law)`,
    };
  }
  const law = jonswapGrowth(U10, fetchM, water.gravityMps2);
  const peakEnhancement = request.peakEnhancement ?? law.peakEnhancement;
  const shape = { alpha: law.alpha, omegaPeakRadPerS: law.omegaPeakRadPerS, peakEnhancement, energyFactor: 1 };
  const state = law.fullyDeveloped
    ? 'fully developed (fetch law held at its limit)'
    : `limited by a fetch of ${(fetchM / 1000).toFixed(1)} km`;
  const basis = `${U10.toFixed(1)} m/s wind, ${state} (JONSWAP 1973 fetch law)`;
  if (request.spectrum === 'bretschneider') {
    const significantHeightM = significantHeight(frequencySpectrum({ form: 'jonswap', ...shape }, water));
    return {
      spectrum: {
        form: 'bretschneider',
        significantHeightM,
        omegaPeakRadPerS: law.omegaPeakRadPerS,
        energyFactor: 1,
      },
      basis,
    };
  }
  return { spectrum: { form: request.spectrum, ...shape }, basis };
}

/** Spectrum of a stated height and peak period: both are met in this depth. */
function statedSpectrum(request: WaveSystemRequest, stated: StatedHeight, water: Water): ResolvedSpectrum {
  const { significantHeightM, peakPeriodS } = stated;
  const omegaPeak = (2 * Math.PI) / peakPeriodS;
  const peakEnhancement = request.peakEnhancement ?? MEAN_PEAK_ENHANCEMENT;
  const unscaled = statedShape(request, omegaPeak, peakEnhancement);
  const spectrum = withSignificantHeight(peakedAt(unscaled, omegaPeak, water), water, significantHeightM);
  const gamma = 'peakEnhancement' in spectrum ? `, peak enhancement ${peakEnhancement}` : '';
  return {
    spectrum,
    basis: `stated height ${significantHeightM} m and peak period ${peakPeriodS} s in this depth${gamma}`,
  };
}

function statedShape(
  request: WaveSystemRequest,
  omegaPeakRadPerS: number,
  peakEnhancement: number,
): SpectrumParameters {
  switch (request.spectrum) {
    // A Pierson-Moskowitz sea of any height and period is the two-parameter form.
    case 'pierson-moskowitz':
    case 'bretschneider':
      return { form: 'bretschneider', significantHeightM: 1, omegaPeakRadPerS, energyFactor: 1 };
    default:
      return { form: request.spectrum, alpha: 0.01, omegaPeakRadPerS, peakEnhancement, energyFactor: 1 };
  }
}

/** The depth factor moves a spectrum's peak: shifts the parent's until the peak is where it was asked for. */
function peakedAt(parameters: SpectrumParameters, omegaPeak: number, water: Water): SpectrumParameters {
  if (parameters.form !== 'tma') return parameters;
  let shifted = parameters;
  // The shift is at most 14 % and nearly proportional: each step gains two digits or more.
  for (let step = 0; step < 8; step++) {
    const found = frequencySpectrum(shifted, water).omegaPeak;
    shifted = { ...shifted, omegaPeakRadPerS: shifted.omegaPeakRadPerS * (omegaPeak / found) };
  }
  return shifted;
}

function resolvedSpreading(
  request: SpreadingRequest,
  spectrum: SpectrumParameters,
  windSpeedMps: number | null,
  water: Water,
): SpreadingParameters {
  const omegaPeakRadPerS = frequencySpectrum(spectrum, water).omegaPeak;
  const { swellNarrowing } = request;
  if (request.form === 'cos-2s') return { form: 'cos-2s', s: request.s ?? 10, omegaPeakRadPerS, swellNarrowing };
  const inverseWaveAge =
    windSpeedMps === null ? ASSUMED_INVERSE_WAVE_AGE : (windSpeedMps * omegaPeakRadPerS) / water.gravityMps2;
  return { form: request.form, omegaPeakRadPerS, inverseWaveAge, swellNarrowing };
}
