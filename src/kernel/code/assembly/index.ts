// What the host may call: PNG pixels band by band, blocks of OpenEXR, and any bytes, which only tests do.

export { beginExr, exrScratchBytes, putExrBlock } from './exr';
export {
  beginPixels,
  beginPng,
  clearRowAbove,
  endPixels,
  pngScratchBytes,
  putRows,
  sampleRows,
  setRowAbove,
} from './png';
export { LARGEST_BLOCK, WORKSPACE_BYTES } from './workspace';
export { putStream } from './zlib-stream';
