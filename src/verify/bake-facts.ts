import type { Manifest } from '../manifest/manifest.ts';
import type { SeaWavesRequest } from '../waves/cascade-waves.ts';

/** A bake under inspection. */
export interface BakeFacts {
  readonly folder: string;
  readonly manifest: Manifest;
  /** What its waves were drawn from. */
  readonly request: SeaWavesRequest;
  /** Frame numbers, as in file names, that were asked for; null for all. */
  readonly range: { readonly first: number; readonly last: number } | null;
  /** Whether every frame in that range is read, or only a few. */
  readonly everyFrame: boolean;
}
