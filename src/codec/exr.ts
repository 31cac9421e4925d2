import { blankPlane, SAMPLE_BYTES } from '../image/image.ts';
import type { Codec, DecodedImage } from './codec.ts';
import type { PixelCoder } from './coder.ts';
import { damage, refuseLyingSize } from './damage.ts';
import { fillFromBlock } from './exr-block.ts';
import { exrReader, utf8 } from './exr-bytes.ts';
import { exrPreamble, LINES_PER_BLOCK } from './exr-header.ts';
import { exrHeaderFields } from './exr-header-fields.ts';
import { exrByKernel } from './exr-kernel-coder.ts';
import { exrByZlib } from './exr-zlib-coder.ts';
import { ownAttributes, requireEncodable } from './labels.ts';

/**
 * OpenEXR 2.0, single part, scan lines, ZIP. Written here because the packages at hand write R,G,B,A only or clip
 * negative values.
 * Source: "OpenEXR File Layout", the published document of the format.
 */
export const EXR: Codec = codecBy(exrByKernel);

/** The same format by Node's zlib. */
export const EXR_BY_ZLIB: Codec = codecBy(exrByZlib);

function codecBy(coder: PixelCoder): Codec {
  const codec: Codec = {
    format: 'exr',
    extension: 'exr',
    samples: ['half', 'float'],
    channelSets: 'any',
    encode(image, metadata) {
      requireEncodable(codec, image, metadata);
      const { width, height, sample } = image;
      // Channels go in byte order of their names.
      const order = image.channels
        .map(({ name }, c) => ({ name, c, bytes: utf8(name) }))
        .sort((a, b) => Buffer.compare(a.bytes, b.bytes));
      const channels = order.map(({ name }) => name);
      const attributes = ownAttributes(image, metadata);
      const head = exrPreamble({ width, height, sample, channels, metadata, attributes });
      const planes = order.map(({ c }) => image.planes[c]);
      return coder(head, planes, width, height);
    },
    decode: decodeExr,
  };
  return codec;
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
