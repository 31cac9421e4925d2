import type { SampleType } from '../image/image.ts';
import { damage } from './damage.ts';
import type { ExrReader } from './exr-bytes.ts';
import { LINES_PER_BLOCK, LONG_NAMES_FLAG, MAGIC, PIXEL_TYPE, VERSION } from './exr-header.ts';

/** What decoding needs of a header. */
export interface ExrHeaderFields {
  readonly width: number;
  readonly height: number;
  /** y of the first scan line. */
  readonly top: number;
  readonly sample: SampleType;
  /** Channel names in the file's order. */
  readonly channels: readonly string[];
  /** 0 none, 2 ZIPS, 3 ZIP. */
  readonly compression: number;
  /** Attributes that are one text or one number. */
  readonly attributes: ReadonlyMap<string, string | number>;
}

interface ChannelList {
  readonly names: readonly string[];
  readonly sample: SampleType;
}

/**
 * Reads magic number, version field and header, and leaves the reader at the offset table.
 * Accepts single-part scan-line files with half or float channels of full resolution, uncompressed, ZIPS or ZIP.
 * @throws InputError for anything else
 */
export function exrHeaderFields(reader: ExrReader, source: string): ExrHeaderFields {
  requirePlainFile(reader, source);
  let channels: ChannelList | undefined;
  let window: readonly number[] | undefined;
  let compression: number | undefined;
  const attributes = new Map<string, string | number>();

  for (let name = reader.name(); name !== ''; name = reader.name()) {
    const type = reader.name();
    const size = reader.int32();
    const end = reader.offset() + size;
    if (name === 'channels' && type === 'chlist') channels = channelList(reader, source);
    else if (name === 'dataWindow' && type === 'box2i') window = [0, 1, 2, 3].map(() => reader.int32());
    else if (name === 'compression' && type === 'compression') compression = reader.uint8();
    else {
      const value = textOrNumber(reader, type, size);
      if (value !== undefined) attributes.set(name, value);
    }
    if (reader.offset() !== end) throw damage(source, name, `a value of ${size} bytes`, 'another length');
  }

  if (channels === undefined || window === undefined || compression === undefined) {
    throw damage(source, 'header', 'channels, dataWindow and compression', 'a header without one of them');
  }
  if (LINES_PER_BLOCK[compression] === undefined) {
    throw damage(source, 'compression', '0 (none), 2 (ZIPS) or 3 (ZIP)', `${compression}`);
  }
  const [left, top, right, bottom] = window;
  return {
    width: right - left + 1,
    height: bottom - top + 1,
    top,
    sample: channels.sample,
    channels: channels.names,
    compression,
    attributes,
  };
}

function requirePlainFile(reader: ExrReader, source: string): void {
  const magic = reader.int32();
  if (magic !== MAGIC) throw damage(source, 'magic number', `${MAGIC}`, `${magic}`);
  const version = reader.int32();
  // Any flag but long names means tiles, deep data or several parts.
  if ((version & ~LONG_NAMES_FLAG) !== VERSION) {
    const found = `version field 0x${(version >>> 0).toString(16)}`;
    throw damage(source, 'version', 'a single-part scan-line file of version 2', found);
  }
}

function channelList(reader: ExrReader, source: string): ChannelList {
  const names: string[] = [];
  const types = new Set<number>();
  for (let name = reader.name(); name !== ''; name = reader.name()) {
    names.push(name);
    types.add(reader.int32());
    // pLinear and 3 reserved bytes say nothing about the pixels.
    reader.int32();
    const xSampling = reader.int32();
    const ySampling = reader.int32();
    if (xSampling !== 1 || ySampling !== 1) {
      throw damage(source, `channel ${name}`, 'full resolution', `sampling ${xSampling}, ${ySampling}`);
    }
  }
  if (names.length === 0) throw damage(source, 'channels', 'at least one', 'none');
  if (new Set(names).size !== names.length)
    throw damage(source, 'channels', 'different names', names.join(','));
  const [type] = types;
  if (types.size > 1) throw damage(source, 'channels', 'one pixel type', [...types].join(','));
  if (type === PIXEL_TYPE.half) return { names, sample: 'half' };
  if (type === PIXEL_TYPE.float) return { names, sample: 'float' };
  throw damage(source, 'channels', 'half (1) or float (2)', `pixel type ${type}`);
}

/** The value of an attribute that is one text or number; undefined, and stepped over, for all other types. */
function textOrNumber(reader: ExrReader, type: string, size: number): string | number | undefined {
  if (type === 'string') return reader.text(size);
  if (type === 'int') return reader.int32();
  if (type === 'float') return reader.float();
  if (type === 'double') return reader.double();
  reader.view(size);
  return undefined;
}
