import { float32Engine } from '../../src/field/float32-engine.ts';
import type { FieldName } from '../../src/field/frame-fields.ts';
import type { ChannelSpec, Image, Quantity, SampleType } from '../../src/image/image.ts';
import { sampledMaps } from '../../src/maps/sampled-map.ts';
import { planBake } from '../../src/plan/plan-bake.ts';
import { tinySea } from './tiny-seas.ts';

/*
 * Images of a sea as a bake makes them, for benches of the encoders and tests of their sizes.
 */

const FIELDS: ReadonlySet<FieldName> = new Set<FieldName>([
  'displacementEast',
  'displacementNorth',
  'height',
  'strainEastNorth',
  'slopeEast',
  'slopeNorth',
  'strainEastEast',
  'strainNorthNorth',
]);

/** Share of texels with foam. */
const FOAM_SHARE = 0.05;

/**
 * Images by what they hold: displacement in 16 bits, half and float, normals in 8 bits, foam in 8 bits; of a wind of
 * 12 m/s, on the tile of a second cascade: 53 m, with waves from 6 m down to four texels.
 */
export function seaImages(N: number): Readonly<Record<string, Image>> {
  const sea = tinySea({
    systems: [{ kind: 'wind-sea', from: 250, windSpeed: 12, fetch: 100_000 }],
    loop: { frames: 192, frameRate: 24 },
    cascades: [
      { patch: 250, resolution: N },
      { patch: 53, resolution: N },
    ],
  });
  const waves = planBake(sea).waves[1].amplitudes;
  const surface = float32Engine().synthesis(waves, { depthM: Infinity, horizontalScale: 1, fields: FIELDS });
  surface.turnTo(0);
  const [rough] = images(N, ['height'], 'float', { scale: 1, offset: 0 });
  const heights = Float64Array.from(rough().planes[0]);
  const sigma = Math.sqrt(heights.reduce((sum, h) => sum + h * h, 0) / heights.length);
  const moved = ['displacement-east', 'displacement-north', 'displacement-up'] as const;
  const centred = { scale: 12 * sigma, offset: -6 * sigma };
  const plain = { scale: 1, offset: 0 };
  const [codes] = images(N, ['jacobian'], 'uint16', { scale: 4, offset: -1 });
  return {
    'displacement, 16 bits': images(N, moved, 'uint16', centred)[0](),
    'normals, 8 bits': images(N, ['normal-east', 'normal-north', 'normal-up'], 'uint8', {
      scale: 2,
      offset: -1,
    })[0](),
    'foam, 8 bits': foamOf(codes()),
    'displacement, half': images(N, moved, 'half', plain)[0](),
    'displacement, float': images(N, moved, 'float', plain)[0](),
  };

  function images(
    resolution: number,
    quantities: readonly Quantity[],
    sample: SampleType,
    decode: ChannelSpec['decode'],
  ): [() => Image] {
    const names = quantities.length === 1 ? ['Y'] : ['R', 'G', 'B'];
    const channels = quantities.map((quantity, c) => ({
      name: names[c],
      quantity,
      unit: '1' as const,
      decode,
    }));
    return [
      () => sampledMaps(surface, [{ resolution, sample, channels, rowZero: 'north', dither: null }])[0].image,
    ];
  }
}

/** Foam where the surface is pressed together most: a share of all texels, the stronger the more it is pressed. */
function foamOf({ width, height, planes: [codes] }: Image): Image {
  const level = codes.slice().sort()[Math.floor(FOAM_SHARE * codes.length)];
  const least = Float64Array.from(codes).reduce((a, b) => Math.min(a, b), 65_535);
  const foam = Uint8Array.from(codes, (code) => Math.max(0, (255 * (level - code)) / (level - least + 1)));
  const channel = {
    name: 'Y',
    quantity: 'foam' as const,
    unit: '1' as const,
    decode: { scale: 1, offset: 0 },
  };
  return { width, height, sample: 'uint8', channels: [channel], planes: [foam] };
}
