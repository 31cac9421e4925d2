// What the host may call: PNG pixels band by band, and blocks of OpenEXR.

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
