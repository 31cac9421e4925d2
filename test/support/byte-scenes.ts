import { scattered } from './image-scenes.ts';

/*
 * Bytes that a coder meets, and bytes made to break it.
 */

/** Bytes of geometric residues: 0 most often, then 1 and 255, and so on; `mean` is their mean magnitude. */
function residues(length: number, mean: number): Uint8Array {
  const ratio = mean / (1 + mean);
  return Uint8Array.from({ length }, (_, i) => {
    const magnitude = Math.floor(Math.log(1 - scattered(i)) / Math.log(ratio));
    return scattered(i + 1e7) < 0.5 ? magnitude : -magnitude;
  });
}

/** Symbols 0, 1, 2 ... as often as the Fibonacci numbers say: the counts with the deepest Huffman tree. Scattered. */
function fibonacci(length: number): Uint8Array {
  const bytes = new Uint8Array(length);
  let at = 0;
  for (let [symbol, a, b] = [0, 1, 1]; at < length; [symbol, a, b] = [symbol + 1, b, a + b]) {
    bytes.fill(symbol, at, Math.min(length, at + a));
    at += a;
  }
  return shuffled(bytes);
}

function shuffled(bytes: Uint8Array): Uint8Array {
  for (let i = bytes.length - 1; i > 0; i--) {
    const j = Math.floor(scattered(i + 5e6) * (i + 1));
    [bytes[i], bytes[j]] = [bytes[j], bytes[i]];
  }
  return bytes;
}

/** Pieces of an alphabet that come again, at any distance, between noise. */
function repeats(length: number): Uint8Array {
  const bytes = new Uint8Array(length);
  for (let at = 0; at < length; ) {
    const r = scattered(at + 3e6);
    const piece = 1 + Math.floor(scattered(at + 4e6) * 300);
    const distance = 1 + Math.floor(r * Math.min(at, 40_000));
    for (let i = 0; i < piece && at < length; i++, at++) {
      bytes[at] = r < 0.5 && at >= distance ? bytes[at - distance] : Math.floor(scattered(at) ** 3 * 256);
    }
  }
  return bytes;
}

/** Byte makers by name. */
export const BYTE_SCENES: Readonly<Record<string, (length: number) => Uint8Array>> = {
  zeros: (length) => new Uint8Array(length),
  'one symbol': (length) => new Uint8Array(length).fill(255),
  'two symbols': (length) => Uint8Array.from({ length }, (_, i) => (scattered(i) < 0.5 ? 7 : 200)),
  ramp: (length) => Uint8Array.from({ length }, (_, i) => i),
  'equal counts': (length) => shuffled(Uint8Array.from({ length }, (_, i) => i)),
  noise: (length) => Uint8Array.from({ length }, (_, i) => 256 * scattered(i)),
  'Fibonacci counts': fibonacci,
  'small residues': (length) => residues(length, 0.4),
  'large residues': (length) => residues(length, 12),
  'noise and residues by turns': (length) => {
    const small = residues(length, 3);
    return Uint8Array.from({ length }, (_, i) => (i % 2 === 0 ? small[i] : 256 * scattered(i)));
  },
  'pairs that cancel': (length) =>
    Uint8Array.from({ length }, (_, i) => (i % 2 === 0 ? 1 : -1) * Math.floor(256 * scattered(i >> 1))),
  'runs of every length': (length) => {
    const bytes = new Uint8Array(length);
    for (let at = 0, run = 1; at < length; at += run, run = (run % 600) + 1) {
      bytes.fill(256 * scattered(run), at, at + run);
    }
    return bytes;
  },
  'sparse blobs': (length) =>
    Uint8Array.from({ length }, (_, i) => (scattered(i >> 7) < 0.9 ? 0 : 60 + 40 * scattered(i))),
  repeats,
  'all bytes but one': (length) => Uint8Array.from({ length }, (_, i) => 255 * scattered(i)),
  'residues, zeros at the end': (length) => {
    const bytes = residues(length, 12);
    bytes.fill(0, Math.floor(0.8 * length));
    return bytes;
  },
  'zeros, noise at the end': (length) =>
    Uint8Array.from({ length }, (_, i) => (i < 0.7 * length ? 0 : 256 * scattered(i))),
};
