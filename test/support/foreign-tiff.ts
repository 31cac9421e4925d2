/** Pixels of an uncompressed TIFF: interleaved samples, row 0 first. */
export interface TiffPixels {
  readonly width: number;
  readonly height: number;
  readonly channelCount: number;
  readonly bitsPerSample: number;
  /** The samples' bytes, little-endian. */
  readonly bytes: Uint8Array;
}

/** Field types SHORT and LONG; others are not needed here. */
const FIELD_BYTES: Readonly<Record<number, number>> = { 3: 2, 4: 4 };

/**
 * Reads an uncompressed, interleaved, little-endian TIFF in strips: what oiiotool writes with `--compression none`, the
 * plainest way to have pixels from it to the bit. Source: TIFF 6.0, sections 2 and 8.
 */
export function tiffPixels(file: Uint8Array): TiffPixels {
  const view = new DataView(file.buffer, file.byteOffset, file.byteLength);
  if (view.getUint32(0, true) !== 0x002a4949) throw new Error('not a little-endian TIFF');
  const directory = view.getUint32(4, true);
  const fields = new Map<number, number[]>();
  for (let i = 0; i < view.getUint16(directory, true); i++) {
    const entry = directory + 2 + 12 * i;
    const size = FIELD_BYTES[view.getUint16(entry + 2, true)];
    if (size === undefined) continue;
    const count = view.getUint32(entry + 4, true);
    const at = count * size <= 4 ? entry + 8 : view.getUint32(entry + 8, true);
    const values = Array.from({ length: count }, (_, k) =>
      size === 2 ? view.getUint16(at + 2 * k, true) : view.getUint32(at + 4 * k, true),
    );
    fields.set(view.getUint16(entry, true), values);
  }
  const field = (tag: number): number[] => {
    const values = fields.get(tag);
    if (values === undefined) throw new Error(`TIFF without tag ${tag}`);
    return values;
  };
  if (field(259)[0] !== 1) throw new Error('compressed TIFF');
  const counts = field(279);
  const strips = field(273).map((offset, s) => file.subarray(offset, offset + counts[s]));
  return {
    width: field(256)[0],
    height: field(257)[0],
    channelCount: field(277)[0],
    bitsPerSample: field(258)[0],
    bytes: Uint8Array.from(Buffer.concat(strips)),
  };
}
