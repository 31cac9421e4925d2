import { describe, expect, it } from 'vitest';
import { ATTRIBUTE_PREFIX, type Codec, type DecodedImage } from '../../src/codec/codec.ts';
import { CODECS, codecFor } from '../../src/codec/registry.ts';
import { InputError, InternalError, LoopswellError } from '../../src/errors.ts';
import type { Image } from '../../src/image/image.ts';
import { channelSetsOf, FRAME_METADATA, samePlane, sceneImage, scenesOf } from '../support/image-scenes.ts';

/** What differs between an image and its decoded file; empty where nothing does. */
function differences(image: Image, decoded: DecodedImage): string[] {
  const found: string[] = [];
  if (decoded.width !== image.width || decoded.height !== image.height) found.push('size');
  if (decoded.sample !== image.sample) found.push('sample type');
  if (decoded.channels.length !== image.channels.length) found.push('number of channels');
  for (const [c, { name }] of image.channels.entries()) {
    const at = decoded.channels.indexOf(name);
    if (at < 0 || !samePlane(decoded.planes[at], image.planes[c])) found.push(`channel ${name}`);
  }
  return found;
}

/** The error a decoder raises, or undefined where it accepts the bytes. */
function refusal(codec: Codec, bytes: Uint8Array): unknown {
  try {
    codec.decode(bytes);
    return undefined;
  } catch (error) {
    return error;
  }
}

describe.each(CODECS)('codec $format', (codec) => {
  const scenes = scenesOf(codec);
  const small = sceneImage(codec.samples[0], channelSetsOf(codec)[1], [16, 24], 'waves');
  const bytes = codec.encode(small, FRAME_METADATA);

  it('is found by its name', () => {
    expect(codecFor(codec.format)).toBe(codec);
  });

  it('gives back every scene to the bit', () => {
    expect(scenes.length).toBeGreaterThan(100);
    const wrong = scenes.flatMap(({ name, image }) =>
      differences(image, codec.decode(codec.encode(image, FRAME_METADATA))).map((what) => `${name}: ${what}`),
    );
    expect(wrong).toEqual([]);
  });

  it('writes the same bytes for the same image, whatever the order of attributes', () => {
    const attributes = Object.fromEntries(Object.entries(FRAME_METADATA.attributes).reverse());
    for (const { name, image } of scenes) {
      const once = codec.encode(image, FRAME_METADATA);
      const again = codec.encode(structuredClone(image), { ...FRAME_METADATA, attributes });
      expect(Buffer.compare(once, again), name).toBe(0);
    }
  });

  it('changes neither image nor metadata', () => {
    const before = structuredClone(small);
    codec.encode(small, Object.freeze(FRAME_METADATA));
    expect(small).toEqual(before);
  });

  it('reads a file that does not begin at the start of its buffer, and keeps no view of it', () => {
    const wide = new Uint8Array(bytes.length + 20).fill(0xaa);
    wide.set(bytes, 7);
    const decoded = codec.decode(wide.subarray(7, 7 + bytes.length));
    wide.fill(0x55);
    expect(differences(small, decoded)).toEqual([]);
  });

  it('writes planes that are views inside a larger buffer', () => {
    const planes = small.planes.map((plane) => {
      const wide = new (plane.constructor as Uint16ArrayConstructor)(plane.length + 9);
      wide.set(plane, 5);
      return wide.subarray(5, 5 + plane.length);
    });
    expect(Buffer.compare(codec.encode({ ...small, planes }, FRAME_METADATA), bytes)).toBe(0);
  });

  it('carries every attribute and the decode rule of each channel', () => {
    const { attributes } = codec.decode(bytes);
    for (const [key, value] of Object.entries(FRAME_METADATA.attributes)) {
      const found = attributes.get(ATTRIBUTE_PREFIX + key);
      // PNG knows texts only; OpenEXR's `float` keeps 24 bits.
      const exact =
        typeof found === 'number' && typeof value === 'number' ? Math.fround(value) : String(value);
      expect(found, key).toBe(exact);
    }
    for (const { name } of small.channels) {
      expect(attributes.get(`${ATTRIBUTE_PREFIX}decode.${name}`)).toMatch(
        /^height in m = .+ \* 12\.5 - 6\.25$/,
      );
    }
    const texts = [...attributes.values()];
    expect(texts).toContain(FRAME_METADATA.software);
    expect(texts).toContain(FRAME_METADATA.comments);
  });

  it('refuses to write what it cannot hold', () => {
    const [plane, ...others] = small.planes;
    const impossible: Image[] = [
      { ...small, planes: others },
      { ...small, planes: [plane.subarray(1), ...others] },
      { ...small, width: 0 },
      { ...small, channels: [], planes: [] },
      { ...small, channels: small.channels.map((channel) => ({ ...channel, name: 'R' })) },
      { ...small, channels: small.channels.map((channel, c) => ({ ...channel, name: `R\0${c}` })) },
      { ...small, sample: small.sample === 'half' ? 'uint8' : 'half' },
    ];
    for (const image of impossible) expect(() => codec.encode(image, FRAME_METADATA)).toThrow(InternalError);
  });

  it('refuses metadata that no file could carry', () => {
    const wrong = [
      { attributes: { 'two words': 1 } },
      { attributes: { 'decode.R': 'mine' } },
      { attributes: { ['k'.repeat(80)]: 1 } },
      { attributes: { scale: Number.NaN } },
      { attributes: { text: 'a\0b' } },
      { frameNumber: 1.5 },
      { frameRate: [24, 0] as const },
      { comments: 'a\0b' },
    ];
    for (const part of wrong) {
      expect(() => codec.encode(small, { ...FRAME_METADATA, ...part }), JSON.stringify(part)).toThrow(
        InternalError,
      );
    }
  });

  it('refuses a file cut at any 64th byte, and one a byte short', () => {
    for (const length of [...Array(Math.ceil(bytes.length / 64)).keys()]
      .map((i) => 64 * i)
      .concat(bytes.length - 1)) {
      expect(refusal(codec, bytes.subarray(0, length)), `cut at ${length}`).toBeInstanceOf(InputError);
    }
  });

  it('meets every changed byte with its own kind of error or an image of bounded size, never a crash', () => {
    let refused = 0;
    for (let at = 0; at < bytes.length; at++) {
      for (const change of [0x01, 0x80, 0xff]) {
        const changed = bytes.slice();
        changed[at] ^= change;
        const error = refusal(codec, changed);
        if (error === undefined) continue;
        refused++;
        expect(error, `byte ${at} changed by ${change}`).toBeInstanceOf(LoopswellError);
      }
    }
    // Compressed pixels carry a checksum in both formats, and they are most of the file.
    expect(refused).toBeGreaterThan(0.4 * 3 * bytes.length);
  });

  it('refuses nothing at all and random bytes', () => {
    expect(refusal(codec, new Uint8Array(0))).toBeInstanceOf(InputError);
    const junk = Uint8Array.from({ length: 500 }, (_, i) => (i * 7919) >>> 3);
    expect(refusal(codec, junk)).toBeInstanceOf(InputError);
  });
});

describe('codecFor', () => {
  it('refuses a name that no codec has', () => {
    expect(() => codecFor('tiff')).toThrow(InternalError);
  });

  it('finds no two codecs with one name or extension', () => {
    expect(new Set(CODECS.map(({ format }) => format)).size).toBe(CODECS.length);
    expect(new Set(CODECS.map(({ extension }) => extension)).size).toBe(CODECS.length);
  });
});
