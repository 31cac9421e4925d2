import { blankPlane, type Image, SAMPLE_BYTES } from '../image/image.ts';
import { concatenation } from './bytes.ts';
import type { Codec, DecodedImage, FrameMetadata } from './codec.ts';
import { damage, refuseLyingSize } from './damage.ts';
import { fillFromBlock, packedBlock } from './exr-block.ts';
import { exrReader, int32LE, uint64LE, utf8 } from './exr-bytes.ts';
import { exrPreamble, LINES_PER_BLOCK, ZIP_COMPRESSION } from './exr-header.ts';
import { exrHeaderFields } from './exr-header-fields.ts';
import { ownAttributes, requireEncodable } from './labels.ts';

/**
 * OpenEXR 2.0, single part, scan lines, ZIP. Written here because the packages at hand write R,G,B,A only or clip
 * negative values.
 * Source: "OpenEXR File Layout", the published document of the format.
 */
export const EXR: Codec = {
  format: 'exr',
  extension: 'exr',
  samples: ['half', 'float'],
  channelSets: 'any',
  encode: encodeExr,
  decode: decodeExr,
};

function encodeExr(image: Image, metadata: FrameMetadata): Uint8Array {
  requireEncodable(EXR, image, metadata);
  const { width, height, sample } = image;

  // Channels, in byte order of their names ------------------------------------------------------------
  const order = image.channels
    .map(({ name }, c) => ({ name, c, bytes: utf8(name) }))
    .sort((a, b) => Buffer.compare(a.bytes, b.bytes));
  const channels = order.map(({ name }) => name);
  const planes = order.map(({ c }) => image.planes[c]);

  // Header --------------------------------------------------------------------------------------------
  const attributes = ownAttributes(image, metadata);
  const preamble = exrPreamble({ width, height, sample, channels, metadata, attributes });

  // Blocks of scan lines: y of the first line, size, pixels -------------------------------------------
  const linesPerBlock = LINES_PER_BLOCK[ZIP_COMPRESSION];
  const blocks: Uint8Array[][] = [];
  for (let y = 0; y < height; y += linesPerBlock) {
    const pixels = packedBlock(planes, width, y * width, Math.min(linesPerBlock, height - y));
    blocks.push([int32LE(y), int32LE(pixels.length), pixels]);
  }

  // Offset table: where in the file each block begins -------------------------------------------------
  const offsets: Uint8Array[] = [];
  let offset = preamble.length + 8 * blocks.length;
  for (const [y, size, pixels] of blocks) {
    offsets.push(uint64LE(offset));
    offset += y.length + size.length + pixels.length;
  }

  return concatenation([preamble, ...offsets, ...blocks.flat()]);
}

function decodeExr(bytes: Uint8Array, source = 'EXR image'): DecodedImage {
  const reader = exrReader(bytes, source);
  const header = exrHeaderFields(reader, source);
  const { width, height, top, sample, channels, attributes } = header;
  refuseLyingSize(source, width, height, channels.length * SAMPLE_BYTES[sample], bytes.length);

  const linesPerBlock = LINES_PER_BLOCK[header.compression];
  const blockCount = Math.ceil(height / linesPerBlock);
  const table = reader.offset();
  // Stepping over the table at once shows a cut file before any memory is taken for its pixels.
  reader.view(8 * blockCount);
  const planes = channels.map(() => blankPlane(sample, width * height));

  for (let b = 0; b < blockCount; b++) {
    const y = b * linesPerBlock;
    const place = `block ${b}`;
    reader.seek(table + 8 * b);
    reader.seek(reader.uint64());
    const firstLine = reader.int32();
    if (firstLine !== top + y) throw damage(source, place, `scan line ${top + y}`, `${firstLine}`);
    const stored = reader.view(reader.int32());
    const fault = fillFromBlock(planes, stored, width, y * width, Math.min(linesPerBlock, height - y));
    if (fault !== null) throw damage(source, place, 'pixels compressed by ZIP', fault);
  }
  return { width, height, sample, channels, planes, attributes };
}
