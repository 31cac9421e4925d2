import { type Image, LARGEST_CODE } from '../../src/image/image.ts';

/** The value of a half, from its bits by the definition of the format. */
function halfValue(bits: number): number {
  const sign = bits & 0x8000 ? -1 : 1;
  const exponent = (bits >> 10) & 31;
  const fraction = (bits & 1023) / 1024;
  return sign * (exponent === 0 ? fraction * 2 ** -14 : (1 + fraction) * 2 ** (exponent - 15));
}

/** What a reader recovers from one channel, in file order: stored * scale + offset, codes divided by the largest. */
export function decodedPlane({ sample, channels, planes }: Image, c: number): Float64Array {
  const { scale, offset } = channels[c].decode;
  return Float64Array.from(planes[c], (sampled) => {
    const stored =
      sample === 'float' ? sampled : sample === 'half' ? halfValue(sampled) : sampled / LARGEST_CODE[sample];
    return stored * scale + offset;
  });
}
