import type { ChannelSpec, SampleType } from '../image/image.ts';
import type { Current, Water } from '../physics/water.ts';
import type { Loop, MapName, OutputConventions, RangePolicy, Shaping } from '../sea/sea.ts';
import type { Band } from '../waves/band.ts';
import type { FieldDeviations } from '../waves/field-deviations.ts';
import type { WaveSystem } from '../waves/wave-system.ts';

/**
 * Transform engines. Part of the plan: two engines round differently, so they write different bytes. `float32` is
 * WebAssembly SIMD; `float64` is the reference, slower, and runs everywhere.
 */
export const ENGINE_NAMES = ['float32', 'float64'] as const;
export type EngineName = (typeof ENGINE_NAMES)[number];

/**
 * Every decision made before a frame. Plain, frozen and JSON-able through `planText`/`parsePlan`. `hash` covers all
 * fields but `report` and itself: everything that can change an output byte.
 */
export interface Plan {
  readonly format: 'loopswell-plan';
  readonly version: 1;
  readonly generator: {
    readonly name: 'loopswell';
    readonly version: string;
    readonly outputVersion: number;
  };
  readonly engine: EngineName;
  readonly title: string;
  readonly seed: number;
  readonly water: Water;
  readonly current: Current;
  readonly systems: readonly PlannedSystem[];
  readonly shaping: Shaping;
  /** The whole loop; a cascade's own may be a whole fraction of it. */
  readonly loop: Loop;
  readonly cascades: readonly PlannedCascade[];
  readonly foam: PlannedFoam | null;
  readonly output: OutputConventions;
  readonly report: PlanReport;
  readonly hash: string;
}

/** A wave system and how its numbers were reached. */
export interface PlannedSystem extends WaveSystem {
  readonly kind: 'wind-sea' | 'swell' | 'measured';
  /** Direction the waves come from, rad clockwise from north. */
  readonly fromRad: number;
  /** Wind at 10 m, m/s, where the system has one. */
  readonly windSpeedMps: number | null;
  /** One sentence: what was given and which law made the rest. */
  readonly basis: string;
  /** 4 sqrt(m0) of the continuous spectrum, after wavelength gains, m. */
  readonly significantHeightM: number;
  readonly peakPeriodS: number;
  /** Wavelength at the peak period in this depth, m. */
  readonly peakWavelengthM: number;
}

/** One square tile of the sea. */
export interface PlannedCascade {
  /** `c0` is the longest. */
  readonly id: string;
  readonly patchLengthM: number;
  readonly resolution: number;
  readonly band: Band;
  readonly loop: Loop;
  /** m0 of each system within the band, m^2, in the order of the plan's systems. */
  readonly bandVariancesM2: readonly number[];
  /** SHA-256 of the wave amplitudes and turns: a process whose own differ must not add to the bake. */
  readonly amplitudesHash: string;
  /** Expected height deviation of the band before any random draw, after the fade of too fast waves, m. */
  readonly expectedHeightDeviationM: number;
  /** Standard deviations over the tile and the loop, exact from the wave amplitudes. */
  readonly deviations: FieldDeviations;
  readonly maps: readonly PlannedMap[];
  readonly foam: CascadeFoam | null;
}

/** How the cascades' maps of one kind add up to the sea's. */
export type Combine = 'sum' | 'one-minus-product' | 'rebuild';

/** One kind of file of one cascade. */
export interface PlannedMap {
  readonly map: MapName;
  /** Path below the bake folder with a printf frame number, e.g. `c0/displacement.%04d.exr`. */
  readonly pattern: string;
  readonly format: 'exr' | 'png';
  readonly sample: SampleType;
  readonly combine: Combine;
  readonly dither: boolean;
  readonly range: RangePolicy;
  readonly channels: readonly PlannedChannel[];
}

/** A channel whose decode rule is known, or (null) will be found by a survey of the loop before the first frame. */
export interface PlannedChannel extends Omit<ChannelSpec, 'decode'> {
  readonly decode: ChannelSpec['decode'] | null;
}

export interface PlannedFoam {
  /** What sets the amount of foam. */
  readonly by: 'wind' | 'coverage' | 'breaking-level';
  /** Composite coverage 0..1; null when the breaking level is given. */
  readonly coverage: number | null;
  readonly residue: 'remove' | 'keep';
}

export interface CascadeFoam {
  /** Share of compression variance in waves of at least 1 m, or the user's. */
  readonly share: number;
  /** Mean of the written map over texels and frames; null when the breaking level is given. */
  readonly coverage: number | null;
  /** Breaking level of J when given; null when it is solved from the coverage. */
  readonly breakingJ: number | null;
  /** Drop of J below the breaking level at which foam is full. */
  readonly rampJ: number;
  readonly decayTimeS: number;
  /** What is left of foam after one loop: exp(-T / decayTime). */
  readonly loopResidue: number;
  /** J of code 0 and of one step of the 16-bit scratch codes. */
  readonly jacobianCodes: JacobianCodes;
}

/** J = zeroJ + code * stepJ, code 0 .. 65535. */
export interface JacobianCodes {
  readonly zeroJ: number;
  readonly stepJ: number;
}

/** What a person wants to know before paying for a bake. Changes no output byte. */
export interface PlanReport {
  readonly sea: SeaReport;
  readonly systems: readonly SystemReport[];
  readonly cascades: readonly CascadeReport[];
  readonly losses: LossReport;
  readonly loop: LoopReport;
  readonly cost: CostReport;
  /** Plain sentences. */
  readonly warnings: readonly string[];
}

export interface SeaReport {
  /** 4 sqrt(m0) of the asked-for sea: all systems, all wavelengths. */
  readonly significantHeightM: number;
  /** Of the cascades together, before any random draw. */
  readonly expectedHeightM: number;
  readonly peakPeriodS: number;
  readonly peakWavelengthM: number;
  readonly meanZeroCrossingPeriodS: number;
}

/** What the lattice does to one system, over all cascades. */
export interface SystemReport {
  readonly name: string;
  /** Share of the sea's m0. */
  readonly heightVarianceShare: number;
  /** Shift of the energy-weighted mean frequency, relative. */
  readonly meanFrequencyShift: number;
  /** Shift of the energy-weighted mean direction, rad. */
  readonly meanDirectionShiftRad: number;
  /** m0^2 / sum of squares: how many waves carry the system. */
  readonly effectiveWaves: number;
  /** Share of the system's variance lost in cells round k = 0. */
  readonly zeroCellShare: number;
}

export interface CascadeReport {
  readonly id: string;
  /** Longest and shortest wave of the band, m; the longest of c0 is the patch itself. */
  readonly longestWavelengthM: number;
  readonly shortestWavelengthM: number;
  readonly heightVarianceShare: number;
  /** Share of the slope variance of all waves longer than 0.1 m. */
  readonly slopeVarianceShare: number;
  /** Waves across the patch at the long end of the band; for c0, of the sea's peak. */
  readonly wavesAcross: number;
  /** Mesh spacing that resolves the shortest wave with four vertices, m. */
  readonly vertexSpacingM: number;
  readonly effectiveWaves: number;
  /** Sum of the cells, k = 0 included, against the integral of the band, relative: what the quadrature missed. */
  readonly cellSumError: number;
  /**
   * Share of what is seen at the size of the tile's large features that repeats with the tile; null for c0, which
   * repeats every patch length as a whole.
   */
  readonly repetition: number | null;
}

export interface LossReport {
  /** Shares of the sea's m0. */
  readonly notInAnyCascade: number;
  readonly zeroCells: number;
  readonly tooFastForFrames: number;
  /** Slope variance (both axes) of waves longer than 0.1 m that no cascade carries: roughness for the shader. */
  readonly slopeVarianceLeftOut: number;
  /** Gap between neighbouring bands, if any, as wavelengths, m. */
  readonly gaps: readonly { readonly longestWavelengthM: number; readonly shortestWavelengthM: number }[];
}

export interface LoopReport {
  readonly seconds: number;
  readonly askedSeconds: number | null;
  /** Energy-weighted rms relative error of frequency over all cascades, and weighted by slope. */
  readonly frequencyError: number;
  readonly slopeFrequencyError: number;
  readonly longerThanLoop: number;
  readonly aboveHalfFrames: number;
  /** Share of height and slope variance that linear blending between frames loses. */
  readonly blendingLoss: number;
  readonly slopeBlendingLoss: number;
  /** Main waves: relative speed error of the wave that carries the peak. Positive is too fast. */
  readonly peakSpeedError: number;
  readonly suggestions: readonly LoopSuggestion[];
  readonly cascades: readonly CascadeLoopReport[];
}

export interface LoopSuggestion {
  readonly seconds: number;
  readonly frameCount: number;
  readonly frequencyError: number;
}

export interface CascadeLoopReport {
  readonly id: string;
  readonly seconds: number;
  readonly frameCount: number;
  readonly frequencyError: number;
  readonly slopeFrequencyError: number;
  readonly longerThanLoop: number;
  readonly aboveHalfFrames: number;
  readonly blendingLoss: number;
  readonly slopeBlendingLoss: number;
}

export interface CostReport {
  readonly files: number;
  /** Estimated from typical compression. */
  readonly outputBytes: number;
  readonly scratchBytes: number;
  /** Memory for the wave amplitudes, and for one thread's buffers. */
  readonly sharedBytes: number;
  readonly bytesPerThread: number;
  /** Estimated work in seconds of one core. */
  readonly coreSeconds: number;
}
