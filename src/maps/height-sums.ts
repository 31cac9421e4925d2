import { type Image, LARGEST_CODE } from '../image/image.ts';
import { numberFromHalf } from '../math/half.ts';
import { type PowerSums, powerSums } from '../math/statistics.ts';

/** From this resolution on every second texel each way is taken: a quarter of the work, the same statistics. */
const THINNED_FROM = 128;

/**
 * Power sums of the heights that a map holds as it will be read, m, for skewness and kurtosis; null for a map without
 * heights.
 *
 * @param image displacement or height map
 */
export function heightSums({ width, height, sample, channels, planes }: Image): PowerSums | null {
  const c = channels.findIndex(({ quantity }) => quantity === 'displacement-up' || quantity === 'height');
  if (c < 0) return null;
  const { decode, unit } = channels[c];
  const metres = unit === 'cm' ? 0.01 : 1;
  const largest = sample === 'uint8' || sample === 'uint16' ? LARGEST_CODE[sample] : 1;
  const [scale, offset] = [(decode.scale * metres) / largest, decode.offset * metres];
  const step = width >= THINNED_FROM ? 2 : 1;
  const values = new Float64Array(Math.ceil(width / step) * Math.ceil(height / step));
  const plane = planes[c];
  let o = 0;
  for (let y = 0; y < height; y += step) {
    for (let i = y * width; i < (y + 1) * width; i += step) {
      values[o++] = (sample === 'half' ? numberFromHalf(plane[i]) : plane[i]) * scale + offset;
    }
  }
  return powerSums(values);
}
