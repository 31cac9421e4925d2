import { putBits, putCode } from './bit-writer';
import { fillCanonicalCode } from './canonical-code';
import { fillCodeLengths } from './code-lengths';
import {
  DISTANCE_LENGTHS,
  DISTANCE_SYMBOLS,
  HEADER_CODES,
  HEADER_COUNTS,
  HEADER_LENGTHS,
  HEADER_SYMBOLS,
  HEADER_TOKENS,
  LITERAL_LENGTHS,
} from './workspace';

/*
 * The header of a block with codes of its own: the code lengths of both alphabets, in symbols of a third alphabet.
 * Source: RFC 1951, section 3.2.7.
 */

/** Symbols of the header alphabet beside the lengths 0..15: the length before 3..6 times, zero 3..10, 11..138 times. */
const AGAIN: usize = 16;
const ZEROS: usize = 17;
const MANY_ZEROS: usize = 18;

/**
 * The order in which the header alphabet's own lengths are written, so that the last are mostly zero: 16, 17, 18, then
 * 0, 8, 7, 9, 6, 10, 5, 11, 4, 12, 3, 13, 2, 14, 1, 15, here from the lowest four bits on.
 */
const WRITING_ORDER: u64 = ((<u64>0xf1e2d3c4) << 32) | 0xb5a69780;

let tokensEnd: usize = 0;
let literalSymbols: usize = 0;
let distanceSymbols: usize = 0;
let headerSymbols: usize = 0;

/**
 * Prepares the header of the lengths in LITERAL_LENGTHS and DISTANCE_LENGTHS.
 * @returns its bits, with the three that every block begins with
 */
export function preparedHeaderBits(): usize {
  literalSymbols = usedSymbols(LITERAL_LENGTHS, 286, 257);
  distanceSymbols = usedSymbols(DISTANCE_LENGTHS, DISTANCE_SYMBOLS, 1);
  memory.fill(HEADER_COUNTS, 0, 4 * HEADER_SYMBOLS);
  tokensEnd = HEADER_TOKENS;
  addTokens(LITERAL_LENGTHS, literalSymbols);
  addTokens(DISTANCE_LENGTHS, distanceSymbols);
  fillCodeLengths(HEADER_LENGTHS, HEADER_COUNTS, HEADER_SYMBOLS, 7);

  headerSymbols = HEADER_SYMBOLS;
  while (headerSymbols > 4 && writtenLength(headerSymbols - 1) === 0) headerSymbols--;
  let bits: usize = 3 + 5 + 5 + 4 + 3 * headerSymbols;
  for (let token = HEADER_TOKENS; token < tokensEnd; token += 2) {
    const symbol = load<u16>(token) & 31;
    bits += load<u8>(HEADER_LENGTHS + symbol) + extraBits(symbol);
  }
  return bits;
}

/** Writes the header that was prepared last. */
export function putHeader(isLast: bool): void {
  fillCanonicalCode(HEADER_CODES, HEADER_LENGTHS, HEADER_SYMBOLS);
  putBits((isLast ? 1 : 0) | (2 << 1), 3);
  putBits(literalSymbols - 257, 5);
  putBits(distanceSymbols - 1, 5);
  putBits(headerSymbols - 4, 4);
  for (let i: usize = 0; i < headerSymbols; i++) putBits(writtenLength(i), 3);
  for (let token = HEADER_TOKENS; token < tokensEnd; token += 2) {
    const symbol = load<u16>(token) & 31;
    putCode(load<u32>(HEADER_CODES + ((<usize>symbol) << 2)));
    putBits(load<u16>(token) >> 5, extraBits(symbol));
  }
}

/** The length of the symbol that stands i-th in the header. */
function writtenLength(i: usize): usize {
  const symbol = i < 3 ? <usize>16 + i : <usize>(WRITING_ORDER >> (4 * (i - 3))) & 15;
  return load<u8>(HEADER_LENGTHS + symbol);
}

/** One more than the last symbol that has a code; at least `least`. */
function usedSymbols(lengths: usize, symbols: usize, least: usize): usize {
  while (symbols > least && load<u8>(lengths + symbols - 1) === 0) symbols--;
  return symbols;
}

/** Appends the lengths of one alphabet as tokens, `extra << 5 | symbol`. Runs may cross alphabets, but ours do not. */
function addTokens(lengths: usize, symbols: usize): void {
  const end = lengths + symbols;
  for (let at = lengths; at < end; ) {
    const length = <u32>load<u8>(at);
    let runEnd = at + 1;
    while (runEnd < end && load<u8>(runEnd) === length) runEnd++;
    let run = <u32>(runEnd - at);
    at = runEnd;
    if (length === 0) {
      for (; run >= 11; run -= min(run, 138)) addToken(MANY_ZEROS, min(run, 138) - 11);
      if (run >= 3) {
        addToken(ZEROS, run - 3);
        run = 0;
      }
    } else {
      addToken(length, 0);
      run--;
      for (; run >= 3; run -= min(run, 6)) addToken(AGAIN, min(run, 6) - 3);
    }
    for (; run > 0; run--) addToken(length, 0);
  }
}

function addToken(symbol: usize, extra: usize): void {
  store<u16>(tokensEnd, <u16>((extra << 5) | symbol));
  tokensEnd += 2;
  const place = HEADER_COUNTS + ((<usize>symbol) << 2);
  store<u32>(place, load<u32>(place) + 1);
}

function extraBits(symbol: usize): usize {
  if (symbol < AGAIN) return 0;
  return symbol === AGAIN ? 2 : symbol === ZEROS ? 3 : 7;
}
