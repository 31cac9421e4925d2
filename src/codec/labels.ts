import { InternalError } from '../errors.ts';
import { type ChannelSpec, type Image, imageFault, LARGEST_CODE, type SampleType } from '../image/image.ts';
import { ATTRIBUTE_PREFIX, type Codec, type FrameMetadata } from './codec.ts';

/** Short enough for a PNG keyword (79 bytes) after the prefix. */
const KEY = /^[A-Za-z][A-Za-z0-9._-]{0,68}$/;

/** Keys that codecs write themselves where the format has no standard place for the fact. */
const RESERVED_KEY = /^(decode\..*|colorSpace|frameNumber|framesPerSecond|wrapModes)$/;

/**
 * What every format writes about a frame under our own prefix: the caller's attributes and one line for each channel
 * that says how to read it. Sorted by key, so that the order in which they were set does not reach the file.
 */
export function ownAttributes(
  image: Image,
  metadata: FrameMetadata,
): [key: string, value: string | number][] {
  const entries: [string, string | number][] = Object.entries(metadata.attributes);
  for (const channel of image.channels) {
    entries.push([`decode.${channel.name}`, readingRule(channel, image.sample)]);
  }
  const prefixed = entries.map(([key, value]): [string, string | number] => [ATTRIBUTE_PREFIX + key, value]);
  return prefixed.sort(([a], [b]) => (a < b ? -1 : 1));
}

/** How to read one channel, for a person: `displacement-up in m = code / 65535 * 12 - 6`. */
function readingRule(channel: ChannelSpec, sample: SampleType): string {
  const { quantity, unit, decode } = channel;
  const stored = sample === 'uint8' || sample === 'uint16' ? `code / ${LARGEST_CODE[sample]}` : 'stored';
  const unitWords = unit === '1' ? '' : ` in ${unit}`;
  const sign = decode.offset < 0 ? '-' : '+';
  return `${quantity}${unitWords} = ${stored} * ${decode.scale} ${sign} ${Math.abs(decode.offset)}`;
}

/**
 * Refuses what a codec cannot write, before it writes anything.
 * @throws InternalError: whoever calls an encoder has chosen the format and made the image
 */
export function requireEncodable(codec: Codec, image: Image, metadata: FrameMetadata): void {
  const fault = imageFault(image) ?? formatFault(codec, image) ?? metadataFault(metadata);
  if (fault !== null) throw new InternalError(`An image cannot be written as ${codec.format}: ${fault}.`);
}

function formatFault(codec: Codec, image: Image): string | null {
  if (!codec.samples.includes(image.sample)) return `the format has no ${image.sample} samples`;
  const unnameable = image.channels.find(({ name }) => !KEY.test(`decode.${name}`));
  if (unnameable !== undefined) return `a channel is called "${unnameable.name}"`;
  if (codec.channelSets === 'any') return null;
  const names = image.channels.map((channel) => channel.name).join(',');
  const held = codec.channelSets.some((set) => set.join(',') === names);
  return held ? null : `the format has no channels ${names}`;
}

function metadataFault(metadata: FrameMetadata): string | null {
  const [numerator, denominator] = metadata.frameRate;
  if (!isPositiveInt32(numerator) || !isPositiveInt32(denominator)) {
    return `its frame rate is ${numerator}/${denominator}`;
  }
  if (!Number.isInteger(metadata.frameNumber) || Math.abs(metadata.frameNumber) >= 2 ** 31) {
    return `its frame number is ${metadata.frameNumber}`;
  }
  for (const [key, value] of Object.entries(metadata.attributes)) {
    if (!KEY.test(key) || RESERVED_KEY.test(key)) return `an attribute is called "${key}"`;
    if (typeof value === 'number' && !Number.isFinite(value)) return `attribute ${key} is ${value}`;
  }
  const texts = [metadata.software, metadata.comments, ...Object.values(metadata.attributes)];
  return texts.some((text) => String(text).includes('\0')) ? 'a text holds a NUL' : null;
}

function isPositiveInt32(value: number): boolean {
  return Number.isInteger(value) && value >= 1 && value < 2 ** 31;
}
