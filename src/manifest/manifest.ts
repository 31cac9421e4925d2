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
  readonly statistics: { readonly significantHeightM: HeightFigures };
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
  readonly statistics: {
    readonly significantHeightM: Omit<HeightFigures, 'target'>;
    /** Slope variance, both axes together, of the waves this cascade holds. */
    readonly slopeVariance: number;
    /** Standard deviation of J - 1 to first order. */
    readonly compression: number;
  };
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
