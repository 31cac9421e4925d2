import type { GrowthName, MapName, SpectrumName, SpreadingName } from './sea.ts';

// A sea file after the schema: keys as the user wrote them, values in SI and radians, nothing filled in yet.

export interface SeaDocument {
  readonly seaFile: 1;
  readonly $schema?: string | undefined;
  readonly title: string;
  readonly seed?: number | undefined;
  readonly water?: WaterDocument | undefined;
  readonly systems: readonly SystemDocument[];
  readonly shaping?: ShapingDocument | undefined;
  readonly loop?: LoopDocument | undefined;
  readonly cascades?: CascadesDocument | undefined;
  readonly foam?: FoamDocument | undefined;
  readonly maps?: MapsDocument | undefined;
  readonly output?: OutputDocument | undefined;
}

export interface WaterDocument {
  readonly depth?: number | undefined;
  readonly density?: number | undefined;
  readonly surfaceTension?: number | undefined;
  readonly gravity?: number | undefined;
  readonly current?: { readonly speed: number; readonly toward?: number | undefined } | undefined;
}

interface SystemCommonDocument {
  readonly name?: string | undefined;
  readonly from: number;
  readonly spectrum?: SpectrumDocument | undefined;
  readonly peakEnhancement?: number | undefined;
  readonly spreading?: SpreadingDocument | undefined;
  readonly scaleTo?: number | undefined;
}

/** The keys of a wind, wherever one can be given. */
export interface WindDocument {
  readonly windSpeed?: number | undefined;
  readonly windHeight?: number | undefined;
  readonly beaufort?: number | undefined;
}

export interface WindSeaDocument extends SystemCommonDocument, WindDocument {
  readonly kind: 'wind-sea';
  readonly fetch?: number | undefined;
  readonly duration?: number | undefined;
  readonly growth?: GrowthName | undefined;
  readonly significantHeight?: number | undefined;
  readonly seaState?: number | undefined;
  readonly peakPeriod?: number | undefined;
}

export interface SwellDocument extends SystemCommonDocument {
  readonly kind: 'swell';
  readonly significantHeight: number;
  readonly peakPeriod: number;
}

/** A measured sea: a table, or the files of a buoy and a time. */
export interface MeasuredDocument extends WindDocument {
  readonly kind: 'measured';
  readonly name?: string | undefined;
  readonly file?: string | undefined;
  readonly ndbc?: NdbcDocument | undefined;
  readonly time?: string | undefined;
  readonly from?: number | undefined;
  readonly spread?: number | undefined;
  readonly scaleTo?: number | undefined;
}

export interface NdbcDocument {
  readonly density: string;
  readonly direction1?: string | undefined;
  readonly direction2?: string | undefined;
  readonly r1?: string | undefined;
  readonly r2?: string | undefined;
}

export type SystemDocument = WindSeaDocument | SwellDocument | MeasuredDocument;

export interface SpectrumDocument {
  readonly form: SpectrumName;
  /** Member of the Ochi-Hubble family; 0 is the most probable. */
  readonly row?: number | undefined;
}

export interface SpreadingDocument {
  readonly form?: SpreadingName | undefined;
  readonly s?: number | undefined;
  readonly width?: number | undefined;
  readonly swellNarrowing?: number | undefined;
}

export interface ShapingDocument {
  readonly bandGains?:
    | readonly { readonly longest: number; readonly shortest: number; readonly gain: number }[]
    | undefined;
  readonly againstWind?: number | undefined;
  readonly horizontalScale?: number | undefined;
  readonly matchHeight?: boolean | undefined;
  readonly amplitudes?: 'gaussian' | 'deterministic' | undefined;
}

export interface CascadeLoopDocument {
  readonly seconds?: number | undefined;
  /** Still as written: `24000/1001` is exact, its quotient is not. */
  readonly frameRate?: number | string | undefined;
  readonly frames?: number | undefined;
}

export interface LoopDocument extends CascadeLoopDocument {
  readonly firstFrame?: number | undefined;
}

export type CascadesDocument = 'auto' | AutoCascadesDocument | readonly CascadeDocument[];

export interface AutoCascadesDocument {
  readonly count?: number | undefined;
  readonly resolution?: number | undefined;
  readonly shortestWavelength?: number | undefined;
  readonly longestPatch?: number | undefined;
  readonly headRoom?: number | undefined;
  readonly loops?: readonly ('whole' | CascadeLoopDocument)[] | undefined;
}

export interface CascadeDocument {
  readonly patch: number;
  readonly resolution?: number | undefined;
  readonly band?:
    | { readonly longest?: number | undefined; readonly shortest?: number | undefined }
    | undefined;
  readonly loop?: CascadeLoopDocument | undefined;
}

export type FoamDocument = 'off' | FoamGroupDocument;

export interface FoamGroupDocument {
  readonly coverage?: number | 'wind' | undefined;
  readonly breakingLevel?: number | undefined;
  readonly decayTime?: number | undefined;
  readonly residue?: 'remove' | 'keep' | undefined;
  readonly shares?: readonly number[] | undefined;
}

export type MapsDocument = { readonly [M in MapName]?: MapDocument | undefined };

export type MapDocument = 'exr' | 'png' | MapGroupDocument;

export interface MapGroupDocument {
  readonly format: 'exr' | 'png';
  readonly sample?: 'half' | 'float' | undefined;
  readonly bits?: 8 | 16 | undefined;
  /** Still as written: its unit depends on the map. */
  readonly range?: number | string | undefined;
  readonly dither?: boolean | undefined;
}

export interface OutputDocument {
  readonly axes?: 'z-up' | 'y-up' | undefined;
  readonly rowZero?: 'north' | 'south' | undefined;
  readonly normalGreen?: 'north' | 'south' | undefined;
  readonly lengthUnit?: 'm' | 'cm' | undefined;
  readonly exrChannels?: 'plain' | 'layered' | undefined;
  readonly padding?: number | undefined;
}
