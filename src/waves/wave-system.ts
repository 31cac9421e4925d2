import type { SpectrumParameters, SpreadingParameters } from '../spectrum/registry.ts';

/** One wave system with every number resolved: one spectrum, one spreading, one direction. Plain and cloneable. */
export interface WaveSystem {
  /** Unique in the sea; keys the system's random numbers. */
  readonly name: string;
  /** Mean direction of travel: radians counter-clockwise from east, (-pi, pi]. */
  readonly towardRad: number;
  readonly spectrum: SpectrumParameters;
  readonly spreading: SpreadingParameters;
  /** Share of the energy moving against `towardRad` that stays, 0..1, before normalisation; 1 leaves all. */
  readonly againstShare: number;
}

/** A gain on the amplitude of a band of wavelengths, applied after everything else. */
export interface WavelengthGain {
  readonly shortestWavelengthM: number;
  readonly longestWavelengthM: number;
  readonly gain: number;
}
