import type { Water } from '../physics/water.ts';
import type { Sea, WaveSystemRequest } from '../sea/sea.ts';
import type { SpectrumParameters } from '../spectrum/registry.ts';
import { withSignificantHeight } from '../spectrum/stated-height.ts';
import type { WaveSystem } from '../waves/wave-system.ts';
import { grownSpectrum } from './grown-spectrum.ts';
import { measuredSpectrum, measuredSpreading } from './measured-spectrum.ts';
import { statedSpectrum } from './stated-spectrum.ts';
import { resolvedSpreading } from './system-spreading.ts';
import { inShort } from './system-words.ts';

/** A wave system with all its numbers, and how they were reached. */
export interface ResolvedSystem extends WaveSystem {
  readonly kind: 'wind-sea' | 'swell' | 'measured';
  readonly fromRad: number;
  readonly windSpeedMps: number | null;
  readonly basis: string;
}

/** A spectrum and, in one sentence, what it was made from. */
export interface ResolvedSpectrum {
  readonly spectrum: SpectrumParameters;
  readonly basis: string;
}

/** Applies the growth laws and normalisations to every system of a sea. */
export function resolvedSystems(sea: Sea): readonly ResolvedSystem[] {
  return sea.systems.map((request) => {
    const { spectrum, basis } = scaledSpectrum(request, sea.water);
    const windSpeedMps = request.kind === 'swell' ? null : request.windSpeedMps;
    return {
      name: request.name,
      kind: request.kind,
      fromRad: request.fromRad,
      towardRad: travelDirection(request.fromRad),
      windSpeedMps,
      spectrum,
      spreading:
        request.kind === 'measured'
          ? measuredSpreading(request)
          : resolvedSpreading(request.spreading, spectrum, windSpeedMps, sea.water),
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

function scaledSpectrum(request: WaveSystemRequest, water: Water): ResolvedSpectrum {
  const resolved = resolvedSpectrum(request, water);
  const { scaleToM } = request;
  if (scaleToM === null) return resolved;
  return {
    spectrum: withSignificantHeight(resolved.spectrum, water, scaleToM),
    basis: `${resolved.basis}; scaled to a significant height of ${inShort(scaleToM, 6)} m`,
  };
}

function resolvedSpectrum(request: WaveSystemRequest, water: Water): ResolvedSpectrum {
  if (request.kind === 'measured') return measuredSpectrum(request, water);
  if (request.stated !== null) return statedSpectrum(request, request.stated, water);
  if (request.kind !== 'wind-sea' || request.growth === null)
    throw new RangeError(`${request.name} has neither a wind nor a height`);
  return grownSpectrum(request, request.growth, water);
}
