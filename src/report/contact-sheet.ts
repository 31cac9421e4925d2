import sharp from 'sharp';
import type { DecodedImage } from '../codec/codec.ts';
import { codecFor } from '../codec/registry.ts';
import { LARGEST_CODE } from '../image/image.ts';
import { framePath } from '../manifest/frame-path.ts';
import type { ManifestCascade, ManifestChannel, ManifestMap } from '../manifest/manifest.ts';
import { numberFromHalf } from '../math/half.ts';
import { fileBytes } from '../store/bake-folder.ts';
import { soundManifest } from '../verify/manifest-file.ts';

export interface ContactSheetOptions {
  /** Side of one picture, pixels. */
  readonly cell?: number;
  /** How many frames to show of each map, spread over the loop. */
  readonly pictures?: number;
}

export const CONTACT_SHEET_DEFAULTS: Readonly<Required<ContactSheetOptions>> = Object.freeze({
  cell: 192,
  pictures: 3,
});

const GAP = 8;
const BACKGROUND = { r: 24, g: 27, b: 31 };

/**
 * A picture of a bake for people: a row for each cascade, for each of its maps a few frames side by side. Lengths,
 * speeds, slopes and strains are grey around zero with one scale for all frames of a channel; the up channel is
 * shown where there is one, else the first. Normals are shown as stored, foam and J as grey.
 *
 * @param folder folder of a finished bake
 * @returns bytes of a PNG
 * @throws InputError where the folder's manifest or a file is not sound; ReadWriteError where one cannot be read
 */
export async function contactSheet(folder: string, options: ContactSheetOptions = {}): Promise<Uint8Array> {
  const { cell, pictures: count } = { ...CONTACT_SHEET_DEFAULTS, ...options };
  const manifest = soundManifest(folder);
  const pictures: { input: Buffer; left: number; top: number }[] = [];
  let width = 0;
  for (const [row, cascade] of manifest.cascades.entries()) {
    let left = GAP;
    const top = GAP + row * (cell + GAP);
    for (const map of Object.values(cascade.maps)) {
      for (const path of sampledPaths(cascade, map, count)) {
        const image = codecFor(map.format).decode(fileBytes(folder, path), path);
        const pixels = visiblePixels(image, map);
        const input = await sharp(pixels, { raw: { width: image.width, height: image.height, channels: 3 } })
          .resize(cell, cell, { kernel: 'lanczos3' })
          .png()
          .toBuffer();
        pictures.push({ input, left, top });
        left += cell + 1;
      }
      left += GAP;
    }
    width = Math.max(width, left);
  }
  const height = GAP + manifest.cascades.length * (cell + GAP);
  const sheet = sharp({ create: { width, height, channels: 3, background: BACKGROUND } });
  return new Uint8Array(await sheet.composite(pictures).png({ compressionLevel: 9 }).toBuffer());
}

/** Paths of a map's frames spread evenly over its loop. */
function sampledPaths(cascade: ManifestCascade, map: ManifestMap, wanted: number): readonly string[] {
  const { firstFrame, frameCount } = cascade.loop;
  const count = Math.min(wanted, frameCount);
  return Array.from({ length: count }, (_, i) => {
    return framePath(map.pattern, firstFrame + Math.floor((i * frameCount) / count));
  });
}

/** RGB bytes of a decoded file as it is best looked at. */
function visiblePixels(image: DecodedImage, map: ManifestMap): Uint8Array {
  const texels = image.width * image.height;
  const pixels = new Uint8Array(3 * texels);
  const isNormal = map.channels[0].quantity === 'normal-east';
  const shown = isNormal ? map.channels : [shownChannel(map)];
  for (let c = 0; c < 3; c++) {
    const channel = shown[isNormal ? c : 0];
    const value = decodedValues(image, channel);
    const [low, high] = visibleRange(channel);
    for (let i = 0; i < texels; i++) pixels[3 * i + c] = Math.round((255 * (value(i) - low)) / (high - low));
  }
  return pixels;
}

/** The vertical channel where there is one, else the first. */
function shownChannel({ channels }: ManifestMap): ManifestChannel {
  return channels.find(({ quantity }) => quantity.endsWith('-up')) ?? channels[0];
}

function visibleRange({ quantity, written }: ManifestChannel): readonly [number, number] {
  if (quantity.startsWith('normal')) return [-1, 1];
  if (quantity === 'foam') return [0, 1];
  if (quantity === 'jacobian') return [written.min, written.max];
  const largest = Math.max(-written.min, written.max) || 1;
  return [-largest, largest];
}

function decodedValues(image: DecodedImage, channel: ManifestChannel): (i: number) => number {
  const plane = image.planes[image.channels.indexOf(channel.name)];
  const { scale, offset } = channel.decode;
  if (image.sample === 'half') return (i) => numberFromHalf(plane[i]) * scale + offset;
  const largest = image.sample === 'float' ? 1 : LARGEST_CODE[image.sample];
  return (i) => (plane[i] / largest) * scale + offset;
}
