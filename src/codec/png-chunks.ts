import { crc32 } from 'node:zlib';
import { damage } from './damage.ts';

/*
 * The chunks of a PNG file: length, type, data, CRC-32 over type and data, numbers big-endian.
 * Source: PNG (Third Edition), W3C, sections 5 and 11.
 */

/** The first eight bytes of every PNG file. */
export const SIGNATURE: Uint8Array = Uint8Array.of(0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a);

/** The colour types we use and what we call their channels, in the order of the file. Indexed colour (3) is not ours. */
export const PIXEL_LAYOUTS: readonly { readonly colourType: number; readonly channels: readonly string[] }[] =
  [
    { colourType: 0, channels: ['Y'] },
    { colourType: 2, channels: ['R', 'G', 'B'] },
    { colourType: 4, channels: ['Y', 'A'] },
    { colourType: 6, channels: ['R', 'G', 'B', 'A'] },
  ];

/** What IHDR says: bit depth as in the specification, colour type as the channels it stands for. */
export interface ImageHeader {
  readonly width: number;
  readonly height: number;
  readonly bitDepth: 8 | 16;
  readonly channels: readonly string[];
}

/** One chunk as found in a file; `data` is a view of the file. */
export interface Chunk {
  readonly type: string;
  readonly data: Uint8Array;
}

const encoder = new TextEncoder();
const utf8Decoder = new TextDecoder();
const latin1Decoder = new TextDecoder('latin1');

/** One chunk, ready for the file. */
export function chunk(type: string, data: Uint8Array): Uint8Array {
  const bytes = new Uint8Array(12 + data.length);
  const numbers = new DataView(bytes.buffer);
  numbers.setUint32(0, data.length);
  for (let i = 0; i < 4; i++) bytes[4 + i] = type.charCodeAt(i);
  bytes.set(data, 8);
  numbers.setUint32(8 + data.length, crc32(bytes.subarray(4, 8 + data.length)));
  return bytes;
}

/** IHDR: compression, filter and interlace method are 0, as in nearly all PNG files. */
export function headerChunk(header: ImageHeader): Uint8Array {
  const data = new Uint8Array(13);
  const numbers = new DataView(data.buffer);
  numbers.setUint32(0, header.width);
  numbers.setUint32(4, header.height);
  data[8] = header.bitDepth;
  data[9] = PIXEL_LAYOUTS.find(({ channels }) => channels.length === header.channels.length)?.colourType ?? 0;
  return chunk('IHDR', data);
}

/** A text under a keyword: tEXt where Latin-1 can say it, else iTXt (uncompressed, language and translation empty). */
export function textChunk(keyword: string, text: string): Uint8Array {
  if (isLatin1(text)) return chunk('tEXt', Buffer.from(`${keyword}\0${text}`, 'latin1'));
  return chunk('iTXt', encoder.encode(`${keyword}\0\0\0\0\0${text}`));
}

function isLatin1(text: string): boolean {
  for (let i = 0; i < text.length; i++) if (text.charCodeAt(i) > 0xff) return false;
  return true;
}

/** Keyword and text of a tEXt or uncompressed iTXt chunk; null for any other. */
export function chunkText(found: Chunk): readonly [keyword: string, text: string] | null {
  const { type, data } = found;
  const end = data.indexOf(0);
  if (end < 1) return null;
  const keyword = latin1Decoder.decode(data.subarray(0, end));
  if (type === 'tEXt') return [keyword, latin1Decoder.decode(data.subarray(end + 1))];
  if (type !== 'iTXt' || data[end + 1] !== 0) return null;
  const languageEnd = data.indexOf(0, end + 3);
  const translationEnd = data.indexOf(0, languageEnd + 1);
  if (languageEnd < 0 || translationEnd < 0) return null;
  return [keyword, utf8Decoder.decode(data.subarray(translationEnd + 1))];
}

/**
 * Every chunk from IHDR to IEND, by their lengths; the check sums are left to fast-png.
 * @param source what to call the file in messages
 * @throws InputError
 */
export function chunks(bytes: Uint8Array, source: string): Chunk[] {
  if (!SIGNATURE.every((byte, i) => bytes[i] === byte)) {
    throw damage(source, 'signature', 'the eight bytes of a PNG file', 'others');
  }
  const numbers = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const found: Chunk[] = [];
  let at = SIGNATURE.length;
  while (found.at(-1)?.type !== 'IEND') {
    const place = `byte ${at}`;
    const left = bytes.length - at;
    const length = left < 12 ? 0 : numbers.getUint32(at);
    if (left < 12 + length) throw damage(source, place, `a chunk of ${12 + length} bytes`, `${left} bytes`);
    const type = latin1Decoder.decode(bytes.subarray(at + 4, at + 8));
    found.push({ type, data: bytes.subarray(at + 8, at + 8 + length) });
    at += 12 + length;
  }
  if (at !== bytes.length) throw damage(source, 'end', 'nothing after IEND', `${bytes.length - at} bytes`);
  return found;
}

/**
 * The fields of IHDR, where it is one that we write.
 * @throws InputError
 */
export function imageHeader(found: readonly Chunk[], source: string): ImageHeader {
  const [{ type, data }] = found;
  const headers = found.filter((one) => one.type === 'IHDR').length;
  if (type !== 'IHDR' || data.length !== 13 || headers !== 1) {
    throw damage(source, 'IHDR', 'one header of 13 bytes, first', `${headers}, first ${type}`);
  }
  const numbers = new DataView(data.buffer, data.byteOffset, data.byteLength);
  const [bitDepth, colourType, compression, filter, interlace] = data.subarray(8);
  const layout = PIXEL_LAYOUTS.find((one) => one.colourType === colourType);
  if ((bitDepth !== 8 && bitDepth !== 16) || layout === undefined) {
    const pair = `bit depth ${bitDepth}, colour type ${colourType}`;
    throw damage(source, 'IHDR', 'grey or RGB, with or without alpha, at 8 or 16 bits', pair);
  }
  if (compression !== 0 || filter !== 0 || interlace !== 0) {
    const methods = [compression, filter, interlace].join(', ');
    throw damage(source, 'IHDR', 'compression, filter and interlace methods 0', methods);
  }
  return { width: numbers.getUint32(0), height: numbers.getUint32(4), bitDepth, channels: layout.channels };
}
