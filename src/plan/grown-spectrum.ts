import { inverseWaveAge, jonswapGrowth } from '../physics/growth.ts';
import { fetchOfDuration } from '../physics/growth-laws/duration.ts';
import { waveGrowth } from '../physics/growth-laws/registry.ts';
import { shoreProtectionManualFetch } from '../physics/growth-laws/shore-protection-manual.ts';
import type { Water } from '../physics/water.ts';
import { frictionVelocity, windSpeedAtHeight } from '../physics/wind.ts';
import type { GrowthName, WindGrowth, WindSeaRequest } from '../sea/sea.ts';
import { elfouhailyInverseWaveAge } from '../spectrum/elfouhaily.ts';
import { jonswapAlpha } from '../spectrum/jonswap.ts';
import { significantHeight } from '../spectrum/moments.ts';
import { frequencySpectrum, type SpectrumParameters } from '../spectrum/registry.ts';
import { withSignificantHeight } from '../spectrum/stated-height.ts';
import { peakedAt, statedPeakEnhancement } from './stated-spectrum.ts';
import { GROWTH_WORDS, inShort, windWords } from './system-words.ts';
import type { ResolvedSpectrum } from './systems.ts';

/** What lifts the height by less than this share does not limit a sea. */
const LIMITS = 0.01;

/**
 * Spectrum of a wind, a fetch and a duration. A sea that has had too little time is as if its fetch were the one that
 * the wind makes use of in this time; on finite depth TMA takes its share of energy.
 */
export function grownSpectrum(request: WindSeaRequest, growth: WindGrowth, water: Water): ResolvedSpectrum {
  if (request.spectrum === 'pierson-moskowitz') {
    const windSpeed19p5Mps = windSpeedAtHeight(growth.windSpeedMps, 19.5);
    return {
      spectrum: { form: 'pierson-moskowitz', windSpeed19p5Mps, energyFactor: 1 },
      basis: `fully developed sea of a ${windWords(request)} (Pierson & Moskowitz 1964, wind taken to 19.5 m by the log law)`,
    };
  }
  const fetchM = usedFetch(growth, water);
  const law = growth.law === null ? 'Elfouhaily et al. 1997' : GROWTH_WORDS[growth.law];
  return {
    spectrum: grownForm(request, growth, fetchM, water),
    basis: `${windWords(request)}, ${limitWords(request, growth, water)} (${law})`,
  };
}

/** The fetch that counts, m: the real one, or what the duration makes use of where that is shorter. */
export function usedFetch({ windSpeedMps, fetchM, durationS, law }: WindGrowth, water: Water): number {
  const g = water.gravityMps2;
  const ofDuration =
    law === 'shore-protection-manual'
      ? shoreProtectionManualFetch(windSpeedMps, durationS, g)
      : fetchOfDuration(windSpeedMps, durationS, g);
  return Math.min(fetchM, ofDuration);
}

function grownForm(
  request: WindSeaRequest,
  { windSpeedMps: U10, law }: WindGrowth,
  fetchM: number,
  water: Water,
): SpectrumParameters {
  const g = water.gravityMps2;
  switch (request.spectrum) {
    case 'elfouhaily': {
      const age = elfouhailyInverseWaveAge(U10, fetchM, g);
      const frictionVelocityMps = frictionVelocity(U10);
      return {
        form: 'elfouhaily',
        windSpeedMps: U10,
        inverseWaveAge: age,
        frictionVelocityMps,
        energyFactor: 1,
      };
    }
    case 'donelan-hamilton-hui': {
      const omegaPeakRadPerS = grownPeak(law, U10, fetchM, water);
      const age = inverseWaveAge(U10, omegaPeakRadPerS, g);
      return { form: 'donelan-hamilton-hui', omegaPeakRadPerS, inverseWaveAge: age, energyFactor: 1 };
    }
    case 'jonswap':
    case 'tma':
      return jonswapForm(request, request.spectrum, law ?? 'jonswap', fetchM, water);
    default:
      throw new RangeError(`${request.spectrum} does not follow from wind and fetch`);
  }
}

function grownPeak(law: GrowthName | null, windSpeedMps: number, fetchM: number, water: Water): number {
  const { depthM, gravityMps2 } = water;
  if (law === null || law === 'jonswap')
    return jonswapGrowth(windSpeedMps, fetchM, gravityMps2).omegaPeakRadPerS;
  return (2 * Math.PI) / waveGrowth(law, { windSpeedMps, fetchM, depthM, gravityMps2 }).peakPeriodS;
}

function jonswapForm(
  request: WindSeaRequest,
  form: 'jonswap' | 'tma',
  law: GrowthName,
  fetchM: number,
  water: Water,
): SpectrumParameters {
  const { depthM, gravityMps2 } = water;
  const windSpeedMps = request.windSpeedMps as number;
  if (law === 'jonswap') {
    const { alpha, omegaPeakRadPerS, peakEnhancement } = jonswapGrowth(windSpeedMps, fetchM, gravityMps2);
    const gamma = request.peakEnhancement ?? peakEnhancement;
    return { form, alpha, omegaPeakRadPerS, peakEnhancement: gamma, energyFactor: 1 };
  }
  const grown = waveGrowth(law, { windSpeedMps, fetchM, depthM, gravityMps2 });
  const { significantHeightM, peakPeriodS } = grown;
  const omegaPeakRadPerS = (2 * Math.PI) / peakPeriodS;
  const peakEnhancement = statedPeakEnhancement(request, grown);
  const alpha = jonswapAlpha(significantHeightM, omegaPeakRadPerS, peakEnhancement, gravityMps2);
  const deep: SpectrumParameters = { form, alpha, omegaPeakRadPerS, peakEnhancement, energyFactor: 1 };
  if (law !== 'young-verhagen') return deep;
  // The one law that speaks of this depth: its height and period are those in it.
  return withSignificantHeight(peakedAt(deep, omegaPeakRadPerS, water), water, significantHeightM);
}

/** What keeps the sea from growing: whichever of fetch (or duration) and depth costs it more of its height. */
function limitWords(request: WindSeaRequest, growth: WindGrowth, water: Water): string {
  const height = (fetchM: number, depthM: number): number => {
    const there: Water = { ...water, depthM };
    return significantHeight(frequencySpectrum(grownForm(request, growth, fetchM, there), there));
  };
  const fetchM = usedFetch(growth, water);
  const own = height(fetchM, water.depthM);
  const byFetch = fetchM === Infinity ? 0 : height(Infinity, water.depthM) / own - 1;
  const byDepth = water.depthM === Infinity ? 0 : height(fetchM, Infinity) / own - 1;
  if (byFetch < LIMITS && byDepth < LIMITS) return 'fully developed';
  if (byDepth > byFetch) return `limited by a depth of ${inShort(water.depthM)} m`;
  const kilometres = `${(fetchM / 1000).toFixed(1)} km`;
  if (fetchM === growth.fetchM) return `limited by a fetch of ${kilometres}`;
  return `limited by a duration of ${inShort(growth.durationS / 3600)} h, which makes use of ${kilometres} of fetch`;
}
