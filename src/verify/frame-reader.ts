import type { DecodedImage } from '../codec/codec.ts';
import { codecFor } from '../codec/registry.ts';
import { LoopswellError } from '../errors.ts';
import { sha256 } from '../hash.ts';
import type { Quantity } from '../image/image.ts';
import { framePath } from '../manifest/frame-path.ts';
import type { Manifest, ManifestCascade, ManifestFile, ManifestMap } from '../manifest/manifest.ts';
import type { MapName } from '../sea/sea.ts';
import { fileBytes, fileStatus } from '../store/bake-folder.ts';
import { type FieldValues, fieldStore } from './field-values.ts';

/** One file of a frame, as far as it could be read. */
export interface SeenFile {
  readonly map: MapName;
  readonly planned: ManifestMap;
  readonly path: string;
  /** What the manifest says of it; null where it is not in the list. */
  readonly listed: ManifestFile | null;
  /** The file; null where there is none. Its digest only where one was asked for. */
  readonly found: { readonly bytes: Uint8Array; readonly sha256: string | null } | null;
  readonly image: DecodedImage | null;
  /** Why there is no image that fits the manifest; null where there is one. */
  readonly fault: string | null;
}

/** One frame of a cascade. */
export interface SeenFrame {
  /** 0 for the first frame of the loop. */
  readonly index: number;
  /** As in file names. */
  readonly number: number;
  readonly files: readonly SeenFile[];
  /** A quantity's values over the tile; null where no map has it or its file cannot be used. Valid until the next frame. */
  readonly field: (quantity: Quantity) => FieldValues | null;
}

/** Reads the frames of one cascade, one at a time. */
export interface FrameReader {
  readonly read: (index: number, options: { readonly digest: boolean }) => SeenFrame;
}

/** The largest file worth reading: floats that do not compress at all, four channels, and a header. */
function mostBytes(resolution: number): number {
  return 20 * resolution * resolution + 2 ** 20;
}

/**
 * @param folder bake folder
 * @param manifest its manifest
 * @param cascade one of its cascades
 * @param listed the manifest's files by path
 */
export function frameReader(
  folder: string,
  manifest: Manifest,
  cascade: ManifestCascade,
  listed: ReadonlyMap<string, ManifestFile>,
): FrameReader {
  const store = fieldStore(cascade, manifest.conventions.rowZero);
  const maps = Object.entries(cascade.maps) as [MapName, ManifestMap][];
  return {
    read(index, { digest }) {
      const number = cascade.loop.firstFrame + index;
      const files = maps.map(([map, planned]): SeenFile => {
        const path = framePath(planned.pattern, number);
        return {
          map,
          planned,
          path,
          listed: listed.get(path) ?? null,
          ...seen(folder, path, cascade, planned, digest),
        };
      });
      return { index, number, files, field: store.frame(files) };
    },
  };
}

function seen(
  folder: string,
  path: string,
  cascade: ManifestCascade,
  planned: ManifestMap,
  digest: boolean,
): Pick<SeenFile, 'found' | 'image' | 'fault'> {
  const status = fileStatus(folder, path);
  if (status?.isFile() !== true) return { found: null, image: null, fault: 'it is missing' };
  if (status.size > mostBytes(cascade.resolution)) {
    return { found: null, image: null, fault: `it has ${status.size} bytes, more than its pixels can take` };
  }
  const bytes = fileBytes(folder, path);
  const found = { bytes, sha256: digest ? sha256(bytes) : null };
  try {
    const image = codecFor(planned.format).decode(bytes, path);
    const fault = imageFault(image, cascade, planned);
    return { found, image: fault === null ? image : null, fault };
  } catch (error) {
    if (!(error instanceof LoopswellError)) throw error;
    return { found, image: null, fault: `it does not decode: ${error.message}` };
  }
}

/** What is wrong with a decoded image by the manifest, as the end of a sentence; null where nothing is. */
function imageFault(
  image: DecodedImage,
  { resolution }: ManifestCascade,
  planned: ManifestMap,
): string | null {
  const { width, height, sample, channels, planes } = image;
  if (width !== resolution || height !== resolution) {
    return `it is ${width} x ${height} texels, not ${resolution} x ${resolution}`;
  }
  if (sample !== planned.sample) return `its samples are ${sample}, not ${planned.sample}`;
  const wanted = planned.channels.map(({ name }) => name).sort();
  const names = [...channels].sort();
  if (names.join() !== wanted.join()) return `its channels are ${names.join(', ')}, not ${wanted.join(', ')}`;
  const strange = planes.findIndex((plane) => !isFinitePlane(plane, sample));
  return strange < 0 ? null : `channel ${channels[strange]} holds a value that is no number`;
}

function isFinitePlane(plane: DecodedImage['planes'][number], sample: DecodedImage['sample']): boolean {
  if (sample === 'half') {
    for (let i = 0; i < plane.length; i++) if ((plane[i] & 0x7c00) === 0x7c00) return false;
  } else if (sample === 'float') {
    for (let i = 0; i < plane.length; i++) if (!Number.isFinite(plane[i])) return false;
  }
  return true;
}
