import type { ChannelSpec, SampleType } from '../image/image.ts';
import type { Combine } from '../plan/plan.ts';
import type { FrameRate, MapName, OutputConventions, RangePolicy, Shaping } from '../sea/sea.ts';
import type { SpectrumParameters, SpreadingParameters } from '../spectrum/registry.ts';

/**
 * `manifest.json`: the contract with the reader of the files. Deterministic (no clock, no host), keys in fixed order.
 * Names here are promises; what is about the run goes to `run.json`.
 */
export interface Manifest {
  readonly format: 'loopswell-manifest';
  readonly version: 1;
  readonly generator: {
    readonly name: 'loopswell';
    readonly version: string;
    readonly outputVersion: number;
    readonly engine: string;
  };
  readonly planHash: string;
  readonly title: string;
  readonly caution: string;
  readonly sea: ManifestSea;
  readonly conventions: ManifestConventions;
  /** How cascades add up and what a reader computes from the maps, in words and formulas. */
  readonly reading: Readonly<Record<string, string>>;
  readonly loop: ManifestLoop;
  readonly cascades: readonly ManifestCascade[];
  readonly statistics: ManifestSeaStatistics;
  readonly losses: ManifestLosses;
  readonly files: readonly ManifestFile[];
}

export interface ManifestSea {
  readonly seed: number;
  readonly water: {
    /** Metres, or `deep`. */
    readonly depthM: number | 'deep';
    readonly gravityMps2: number;
    readonly densityKgpm3: number;
    readonly surfaceTensionNpm: number;
    readonly currentEastMps: number;
    readonly currentNorthMps: number;
  };
  readonly horizontalScale: number;
  readonly shaping: Omit<Shaping, 'horizontalScale'>;
  readonly foam: { readonly by: string; readonly coverage: number | null; readonly residue: string } | null;
  readonly systems: readonly ManifestSystem[];
}

export interface ManifestSystem {
  readonly name: string;
  readonly kind: string;
  readonly basis: string;
  readonly fromDeg: number;
  /** Direction of travel, rad counter-clockwise from east. */
  readonly towardRad: number;
  readonly windSpeedMps: number | null;
  readonly significantHeightM: number;
  readonly peakPeriodS: number;
  readonly peakWavelengthM: number;
  readonly againstShare: number;
  readonly spectrum: SpectrumParameters;
  readonly spreading: SpreadingParameters;
}

export interface ManifestConventions {
  readonly axes: OutputConventions['axes'];
  readonly rowZero: OutputConventions['rowZero'];
  readonly uvOrigin: 'south-west';
  readonly sampleLocation: 'texel-centre';
  readonly uv: 'position / patchLength';
  readonly normalGreen: OutputConventions['normalGreen'];
  readonly lengthUnit: OutputConventions['lengthUnit'];
  readonly colorSpace: 'data';
}

export interface ManifestLoop {
  readonly seconds: number;
  readonly frameRate: FrameRate;
  readonly frameCount: number;
  readonly firstFrame: number;
}

/** Expected is before any random draw; measured on what was written, or null where no map holds it. */
export interface HeightFigures {
  readonly target: number;
  readonly expected: number;
  readonly measured: number | null;
}

/** Of the sum of the cascades; figures of what was written are null where no map holds it. */
export interface ManifestSeaStatistics {
  readonly significantHeightM: HeightFigures;
  /** Of the sea that was asked for. */
  readonly peakPeriodS: number;
  readonly meanZeroCrossingPeriodS: number;
  /** As written, from the cumulants of the cascades, which are independent. A Gaussian sea has 0 and 3. */
  readonly skewness: number | null;
  readonly kurtosis: number | null;
  /** No crest of the sum is higher, no trough deeper: the sums of the cascades' own, m. */
  readonly largestCrestBoundM: number | null;
  readonly deepestTroughBoundM: number | null;
  /** Slope variance the cascades hold together, and Cox & Munk 1954 for the strongest wind, which counts all ripples. */
  readonly slopeVariance: SlopeFigures & { readonly coxMunk: SlopeFigures | null };
  /** Mean of the written foam, screened together, and the whitecap formula for the strongest wind. */
  readonly foamCoverage: { readonly measured: number | null; readonly whitecapFormula: number | null };
}

/** Along and across the strongest wind, or where there is none the direction of the highest system. */
export interface SlopeFigures {
  readonly alongWind: number;
  readonly acrossWind: number;
}

export interface ManifestCascadeStatistics {
  readonly significantHeightM: Omit<HeightFigures, 'target'>;
  /** Of the heights as written; every second texel each way from 128 on. */
  readonly skewness: number | null;
  readonly kurtosis: number | null;
  readonly largestCrestM: number | null;
  readonly deepestTroughM: number | null;
  /** Slope variance of the waves this cascade holds, exact from its wave amplitudes. */
  readonly slopeVariance: SlopeFigures;
  /** Standard deviation of J - 1 to first order. */
  readonly jacobianDeviation: number;
  /** Share of the surface that is folded over, J < 0; null where no J was made. */
  readonly foldedShare: number | null;
  /** One step of the height's codes, or the distance of halves at the largest height, mm; null for float32 files. */
  readonly heightStepMm: number | null;
}

export interface ManifestCascade {
  readonly id: string;
  readonly patchLengthM: number;
  readonly resolution: number;
  /** Wavenumbers the cascade holds, rad/m; the borders fade as `band` says. */
  readonly wavenumberRadPerM: readonly [number, number];
  readonly band: {
    readonly low: { readonly kRadPerM: number; readonly fade: number } | null;
    readonly high: { readonly kRadPerM: number; readonly fade: number };
  };
  readonly loop: ManifestLoop;
  readonly amplitudesHash: string;
  readonly statistics: ManifestCascadeStatistics;
  readonly foam: ManifestFoam | null;
  readonly maps: Readonly<Partial<Record<MapName, ManifestMap>>>;
}

export interface ManifestFoam {
  readonly share: number;
  readonly coverage: { readonly target: number | null; readonly measured: number };
  /** Whether the target was met within 2 %; if not, `note` says why. */
  readonly note: string | null;
  readonly breakingJ: number;
  readonly rampJ: number;
  readonly decayTimeS: number;
  readonly loopResidue: number;
}

export interface ManifestMap {
  readonly pattern: string;
  readonly format: 'exr' | 'png';
  readonly sample: SampleType;
  readonly combine: Combine;
  readonly dither: boolean;
  readonly range: RangePolicy['policy'];
  readonly channels: readonly ManifestChannel[];
}

/** A channel and the extremes and mean of what was written, in its unit, over the loop. */
export interface ManifestChannel extends ChannelSpec {
  readonly written: {
    readonly min: number;
    readonly max: number;
    readonly mean: number;
    readonly deviation: number;
    /** Texels beyond the range over the whole loop. */
    readonly clipped: number;
  };
}

export interface ManifestLosses {
  readonly notInAnyCascade: number;
  readonly zeroCells: number;
  readonly tooFastForFrames: number;
  readonly slopeVarianceLeftOut: number;
  readonly frequencyError: number;
}

export interface ManifestFile {
  readonly path: string;
  readonly bytes: number;
  readonly sha256: string;
}
