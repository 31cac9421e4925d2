import { expect, it } from 'vitest';
import { blankPlane, type Image, imageFault, SAMPLE_BYTES } from '../../../src/image/image.ts';
import { sceneImage } from '../../support/image-scenes.ts';

const image = sceneImage('uint16', ['R', 'G'], [3, 2], 'ramp');

it('finds no fault in a whole image', () => {
  for (const sample of ['uint8', 'uint16', 'half', 'float'] as const) {
    expect(imageFault(sceneImage(sample, ['R', 'G'], [3, 2], 'ramp'))).toBeNull();
  }
});

it.each<[string, Partial<Image>, RegExp]>([
  ['a fractional size', { width: 2.5 }, /size is 2\.5 x 2/],
  ['no rows', { height: 0 }, /size is 3 x 0/],
  ['no channel', { channels: [], planes: [] }, /no channel/],
  ['a missing plane', { planes: image.planes.slice(1) }, /2 channels but 1 planes/],
  ['a plane of another type', { sample: 'float' }, /channel R is not of type float/],
  ['a plane of bytes', { sample: 'uint8' }, /channel R is not of type uint8/],
  ['a short plane', { planes: [image.planes[0], new Uint16Array(5)] }, /channel G has 5 samples, not 6/],
  ['one name twice', { channels: [image.channels[0], image.channels[0]] }, /share a name/],
])('finds %s', (_, part, fault) => {
  expect(imageFault({ ...image, ...part })).toMatch(fault);
});

it('makes planes whose elements have the stored size', () => {
  for (const sample of ['uint8', 'uint16', 'half', 'float'] as const) {
    expect(blankPlane(sample, 4).byteLength).toBe(4 * SAMPLE_BYTES[sample]);
  }
});
