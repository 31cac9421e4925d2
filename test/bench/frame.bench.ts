import { bench, describe } from 'vitest';
import { float32Engine } from '../../src/field/float32-engine.ts';
import type { SampledValue, SamplesRequest } from '../../src/field/float32-requests.ts';
import { float64Engine } from '../../src/field/float64-engine.ts';
import type { FieldName } from '../../src/field/frame-fields.ts';
import { synthesis } from '../../src/field/synthesis.ts';
import type { ChannelSpec, Quantity } from '../../src/image/image.ts';
import { encodedMap } from '../../src/maps/encoded-map.ts';
import { FRAME_MAPS } from '../../src/maps/quantity-values.ts';
import { centredDecode } from '../../src/plan/encodings.ts';
import { describeKernel } from '../support/kernels.ts';
import { randomWaves } from '../support/random-waves.ts';

/*
 * A frame of one cascade, from its wave amplitudes to the samples of a 16-bit displacement and an 8-bit normal map, by
 * both engines; and its parts by the fast one. Waves fill the disc of half the Nyquist radius, as planned cascades do.
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
const OPTIONS = { depthM: Infinity, horizontalScale: 1, fields: FIELDS };

function channels(names: readonly Quantity[], sample: 'uint8' | 'uint16'): ChannelSpec[] {
  const decode = sample === 'uint8' ? { scale: 2, offset: -1 } : centredDecode(2, sample, 1);
  return names.map((quantity, c) => ({ name: 'RGB'[c], quantity, unit: '1', decode }));
}

describeKernel('wave', 'a frame', () => {
  for (const N of [256, 512, 1024]) {
    describe(`${N} x ${N}`, () => {
      const waves = randomWaves({ resolution: N, frameCount: 96 });
      const reference = synthesis(waves, float64Engine(N), OPTIONS);
      const surface = float32Engine().synthesis(waves, OPTIONS);
      const texels = (bytes: number) => ({ texels: new Uint8Array(bytes * N * N) });
      const request = (
        sample: 'uint8' | 'uint16',
        values: readonly SampledValue[],
        gain: number,
        shift: number,
      ): SamplesRequest => ({
        sample,
        channels: values.map((value) => ({ value, gain, shift, dither: null })),
        rowZero: 'north',
        target: texels(sample === 'uint8' ? 3 : 6),
      });
      const displacement = request(
        'uint16',
        ['displacementEast', 'displacementNorth', 'height'],
        16000,
        32768,
      );
      const normal = request('uint8', ['normalEast', 'normalNorth', 'normalUp'], 127.5, 127.5);
      const planes: Float64Array[] = [];
      const plane = (i: number) => {
        planes[i] ??= new Float64Array(N * N);
        return planes[i];
      };
      let n = 0;
      if (N < 1024) {
        bench('float64: whole frame', () => {
          const fields = reference.frame(n++);
          const storage = { resolution: N, rowZero: 'north', dither: null } as const;
          const moved = ['displacement-east', 'displacement-north', 'displacement-up'] as const;
          encodedMap(FRAME_MAPS.displacement.values(fields, plane), {
            ...storage,
            sample: 'uint16',
            channels: channels(moved, 'uint16'),
          });
          encodedMap(FRAME_MAPS.normal.values(fields, plane), {
            ...storage,
            sample: 'uint8',
            channels: channels(['normal-east', 'normal-north', 'normal-up'], 'uint8'),
          });
        });
      }
      bench('float32: whole frame', () => {
        surface.turnTo(n++);
        surface.samples([displacement, normal]);
      });
      bench('float32: turning the waves', () => surface.turnTo(n++));
      bench('float32: samples again', () => void surface.samples([displacement, normal]), {
        setup: () => {
          surface.turnTo(0);
          surface.samples([displacement, normal]);
        },
      });
    });
  }
});
