import { deflateSync, inflateSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import { PNG } from '../../../src/codec/png.ts';
import {
  chunk,
  chunks,
  chunkText,
  headerChunk,
  SIGNATURE,
  textChunk,
} from '../../../src/codec/png-chunks.ts';
import { filteredRows } from '../../../src/codec/png-filter.ts';
import { InputError } from '../../../src/errors.ts';
import { FRAME_METADATA, sceneImage } from '../../support/image-scenes.ts';

const END = chunk('IEND', new Uint8Array(0));

/** A file of grey 8-bit pixels with the given header size and IDAT. */
function greyFile(width: number, height: number, idat: Uint8Array): Uint8Array {
  const header = headerChunk({ width, height, bitDepth: 8, channels: ['Y'] });
  return Uint8Array.from(Buffer.concat([SIGNATURE, header, chunk('IDAT', idat), END]));
}

describe('chunks', () => {
  it('of no data end with the published check sum', () => {
    // IEND is the same 12 bytes in every PNG file; its CRC is ae 42 60 82. Status: from memory, confirmed by pngcheck.
    expect([...END]).toEqual([0, 0, 0, 0, 0x49, 0x45, 0x4e, 0x44, 0xae, 0x42, 0x60, 0x82]);
  });

  it('stand in the order IHDR, texts, pixels, IEND, and none of them speaks of colour', () => {
    const file = PNG.encode(sceneImage('uint16', ['R', 'G', 'B'], [16, 16], 'waves'), FRAME_METADATA);
    const types = chunks(file, 'frame.png').map(({ type }) => type);
    expect(types[0]).toBe('IHDR');
    expect(types.slice(-2)).toEqual(['IDAT', 'IEND']);
    expect(new Set(types.slice(1, -2))).toEqual(new Set(['tEXt', 'iTXt']));
  });

  it.each([
    ['plain', 'tEXt'],
    ['Größe ÿ', 'tEXt'],
    ['λ', 'iTXt'],
    ['1 €', 'iTXt'],
    ['', 'tEXt'],
  ])('carry the text "%s" as %s', (text, type) => {
    const file = Uint8Array.from(Buffer.concat([SIGNATURE, textChunk('Comment', text), END]));
    const [found] = chunks(file, 'frame.png');
    expect(found.type).toBe(type);
    expect(chunkText(found)).toEqual(['Comment', text]);
  });

  it('say what a frame needs', () => {
    const file = PNG.encode(sceneImage('uint8', ['Y'], [3, 5], 'ramp'), FRAME_METADATA);
    const { attributes } = PNG.decode(file);
    expect(Object.fromEntries(attributes)).toMatchObject({
      Software: 'loopswell 9.9.9',
      Comment: 'One frame of a scene for tests.',
      'loopswell.colorSpace': 'data',
      'loopswell.frameNumber': '1007',
      'loopswell.framesPerSecond': '24000/1001',
      'loopswell.decode.Y': 'height in m = code / 255 * 12.5 - 6.25',
    });
  });
});

describe('filteredRows', () => {
  it('keeps rows of mostly zeros as they are and predicts rows of waves', () => {
    const width = 8;
    const sparse = [0, 0, 0, 0, 0, 9, 0, 0];
    const smooth = [100, 104, 109, 113, 116, 118, 119, 119];
    const filtered = filteredRows([Uint8Array.from([...sparse, ...smooth, ...smooth])], width, 3);
    expect([...filtered.subarray(0, 9)]).toEqual([0, ...sparse]);
    // Second row by hand: above is 0 but for the 9 over pixel 5. There a + b - c = 116 + 9 - 0 and behind it
    // 118 + 0 - 9, both nearest to a, so every predictor is the left pixel.
    expect([...filtered.subarray(9, 18)]).toEqual([4, 100, 4, 5, 4, 3, 2, 1, 0]);
    // Third row: equal to the second, so only 0 is left where the predictor can see it.
    expect([...filtered.subarray(18)]).toEqual([4, 0, 0, 0, 0, 0, 0, 0, 0]);
  });

  it('puts the high byte of 16 bits first', () => {
    const filtered = filteredRows([Uint16Array.of(0x0102)], 1, 1);
    expect([...filtered.subarray(1)]).toEqual([1, 2]);
  });
});

describe('headers that lie', () => {
  const pixels = deflateSync(new Uint8Array(16 * 17));

  it.each([
    [
      'a size that no file holds',
      greyFile(2 ** 31 - 1, 2 ** 31 - 1, pixels),
      /size: expected at most 1073741824 bytes/,
    ],
    [
      'a size that this file cannot hold',
      greyFile(16_000, 16_000, pixels),
      /what a file of \d+ bytes can hold/,
    ],
    ['no pixels', greyFile(0, 16, pixels), /at least one pixel/],
    [
      'fewer pixels than there are',
      greyFile(8, 8, deflateSync(new Uint8Array(10_000_000))),
      /IDAT: expected 72 bytes/,
    ],
    ['more pixels than there are', greyFile(17, 16, pixels), /IDAT: expected 288 bytes of rows, found 272/],
    ['no compressed data', greyFile(16, 16, new Uint8Array(0)), /IDAT/],
    ['an unknown filter type', greyFile(1, 1, deflateSync(Uint8Array.of(9, 0))), /pixels/],
    ['bytes behind the end', Uint8Array.from([...greyFile(16, 16, pixels), 0]), /nothing after IEND/],
    [
      'no header',
      Uint8Array.from(Buffer.concat([SIGNATURE, chunk('IDAT', pixels), END])),
      /IHDR: expected one header/,
    ],
  ])('%s are refused', (_, bytes, message) => {
    expect(() => PNG.decode(bytes, 'frame.png')).toThrow(InputError);
    expect(() => PNG.decode(bytes, 'frame.png')).toThrow(message);
  });

  it('are refused where a check sum does not fit, in a chunk of any kind', () => {
    const file = PNG.encode(sceneImage('uint8', ['Y'], [4, 4], 'waves'), FRAME_METADATA);
    let at = SIGNATURE.length;
    for (const { type, data } of chunks(file, 'frame.png')) {
      at += 12 + data.length;
      const changed = file.slice();
      changed[at - 1] ^= 1;
      expect(() => PNG.decode(changed), type).toThrow(/CRC mismatch/);
    }
  });

  it('are told from honest ones', () => {
    expect(PNG.decode(greyFile(16, 16, pixels)).planes[0]).toEqual(new Uint8Array(256));
  });

  it('are refused for palettes, low depths and interlacing', () => {
    const header = headerChunk({ width: 16, height: 16, bitDepth: 8, channels: ['Y'] });
    for (const [at, value] of [
      [8, 4],
      [9, 3],
      [12, 1],
    ]) {
      const data = header.slice(8, 21);
      data[at] = value;
      const file = Buffer.concat([SIGNATURE, chunk('IHDR', data), chunk('IDAT', pixels), END]);
      expect(() => PNG.decode(file)).toThrow(/IHDR: expected (grey|compression)/);
    }
  });

  it('are refused where the sum behind the compressed data is wrong, though the chunk’s own is right', () => {
    const wrong = Uint8Array.from(pixels);
    wrong[wrong.length - 1] ^= 1;
    expect(() => inflateSync(wrong)).toThrow();
    expect(() => PNG.decode(greyFile(16, 16, wrong))).toThrow(/IDAT.*incorrect data check/);
  });
});
