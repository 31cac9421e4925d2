import { addSequence, beginSequences, distanceExtraBits, LONGEST_MATCH, lengthExtraBits } from './sequences';
import { DEAR_PLACES, DISTANCES, LITERAL_LENGTHS, MATCH_SEQUENCES, PLACES, PRICES } from './workspace';

/** What a match costs beside its extra bits: about the codes of its length and its distance. */
const CODES_BITS: i32 = 10;

/** Bits from which on a byte is dear. */
const DEAR_BITS: usize = 7;

/** Bits of an index of PLACES. */
const HASH_BITS: u32 = 13;

/** The longest distance of DEFLATE. */
const WINDOW: usize = 32768;

/** How far a match may reach back from a dear byte. */
const FARTHEST_BACK: usize = 200;

let streamStart: usize = 0;
let block: usize = 0;
let blockEnd: usize = 0;
/** Behind the last match. */
let literalsFrom: usize = 0;

/** Which bytes the key of a place consists of: those of 32 bits from `keyOffset` bytes before it on. */
let keyMask: u32 = 0;
let keyOffset: usize = 0;

/** Forgets all places. */
export function beginMatches(): void {
  memory.fill(PLACES, 0, 16 << HASH_BITS);
}

/**
 * Finds repeats of earlier bytes; leaves the block as MATCH_SEQUENCES.
 *
 * LITERAL_LENGTHS are the prices of the bytes, and a match is taken where it costs less than what it covers. Only a
 * match that covers a dear byte can save much, so only these are looked up, by themselves and their neighbours, and the
 * match is followed from there in both directions. On the high bytes of half floats one place in five is dear; to look
 * up all of them gains 0.1 % of the file and takes four times as long.
 *
 * @param start first byte of the stream that is still in the memory before `from`
 * @param from at most 65536 bytes before `to`; LITERAL_LENGTHS holds a code in which each of them has a length
 * @param inPairs whether bytes come in pairs, the second of which follows from the first, as those of floats do
 */
export function findMatches(start: usize, from: usize, to: usize, inPairs: bool): void {
  streamStart = start;
  block = from;
  blockEnd = to;
  literalsFrom = from;
  keyMask = inPairs ? 0xffffffff : 0xffffff;
  keyOffset = inPairs ? 0 : 1;
  beginSequences(MATCH_SEQUENCES);
  const placesEnd = inPairs ? fillPairPrices() : fillPrices();
  for (let place = DEAR_PLACES; place < placesEnd; place += 2) {
    const at = from + <usize>load<u16>(place);
    const best = bestMatch(at);
    if (best > 0 && at >= literalsFrom) addMatch(at, <usize>best & 0xffff);
  }
  addSequence(to - literalsFrom, 0, 0);
}

/**
 * PRICES[i] = bits of all literals before the i-th byte, modulo 65536, and on for 8 bytes behind the block;
 * DEAR_PLACES = the dear bytes that have the neighbours a key needs.
 * @returns address behind the last of DEAR_PLACES
 */
function fillPrices(): usize {
  const bytes = blockEnd - block;
  let dear = DEAR_PLACES;
  let sum: usize = 0;
  for (let i: usize = 0; i < bytes; i++) {
    const price = <usize>load<u8>(LITERAL_LENGTHS + load<u8>(block + i));
    store<u16>(PRICES + (i << 1), <u16>sum);
    store<u16>(dear, <u16>i);
    sum += price;
    dear += usize(price >= DEAR_BITS) << 1;
  }
  v128.store(PRICES + (bytes << 1), i16x8.splat(<i16>sum));
  // A key needs the byte before and the byte behind.
  if (dear > DEAR_PLACES && load<u16>(dear - 2) === bytes - 1) dear -= 2;
  return dear;
}

/** As fillPrices, where bytes come in pairs: a key needs two whole ones. */
function fillPairPrices(): usize {
  const bytes = blockEnd - block;
  let dear = DEAR_PLACES;
  let sum: usize = 0;
  for (let i: usize = 0; i < bytes; i += 2) {
    const price = <usize>load<u8>(LITERAL_LENGTHS + load<u8>(block + i));
    store<u16>(PRICES + (i << 1), <u16>sum);
    store<u16>(PRICES + (i << 1) + 2, <u16>(sum + price));
    store<u16>(dear, <u16>i);
    sum += price + <usize>load<u8>(LITERAL_LENGTHS + load<u8>(block + i + 1));
    dear += usize(price >= DEAR_BITS) << 1;
  }
  v128.store(PRICES + (bytes << 1), i16x8.splat(<i16>sum));
  while (dear > DEAR_PLACES && <usize>load<u16>(dear - 2) + 4 > bytes) dear -= 2;
  return dear;
}

/**
 * The match around `at` that saves most among the four latest places whose key has this one's hash.
 *
 * A place is the lowest 16 bits of its address: it is the latest such address. Beside it stand 16 bits more of the hash,
 * so that one comparison of vectors tells the usual case, nothing, from all others.
 *
 * @returns bits saved << 16 | distance; not above 0 where nothing is saved
 */
function bestMatch(at: usize): i32 {
  const hash = (load<u32>(at - keyOffset) & keyMask) * 0x9e3779b1;
  const place = i32x4.splat((hash << 16) | <u32>(at & 0xffff));
  const slot = PLACES + ((<usize>(hash >> (32 - HASH_BITS))) << 4);
  const places = v128.load(slot);
  v128.store(
    slot,
    i8x16.shuffle(place, places, 12, 13, 14, 15, 16, 17, 18, 19, 20, 21, 22, 23, 24, 25, 26, 27),
  );
  const unlike = i32x4.shr_u(v128.xor(places, place), 16);
  const equal = i32x4.bitmask(i32x4.eq(unlike, i32x4.splat(0)));
  if (equal === 0) return 0;

  // The two latest of equal hash; twice the same where there is but one, or the latest of all.
  v128.store(DISTANCES, v128.and(i32x4.sub(place, places), i32x4.splat(0xffff)));
  const latest = load<u32>(DISTANCES + ((<usize>ctz(equal)) << 2));
  const next = load<u32>(DISTANCES + ((<usize>ctz(equal & (equal - 1)) & 3) << 2));
  const window = v128.load(at - 8);
  const prices = PRICES + ((at - block) << 1);
  return larger(saved(window, prices, at, latest), saved(window, prices, at, next));
}

/** The larger of two numbers that differ by less than 2^31; the compiler would make a branch of max(). */
function larger(a: i32, b: i32): i32 {
  const less = a - b;
  return a - (less & (less >> 31));
}

/**
 * What the match at a distance would save, of the eight bytes before `at` and the eight from there on. Has no branch:
 * none could be foretold.
 * @returns as bestMatch
 */
function saved(window: v128, prices: usize, at: usize, distance: usize): i32 {
  const same = <u32>i8x16.bitmask(i8x16.eq(window, v128.load(at - distance - 8)));
  const back = <usize>clz(~(same << 24));
  const forward = <usize>ctz(~(same >> 8));
  const price = load<u16>(prices + (forward << 1)) - load<u16>(prices - (back << 1));
  const bits = <i32>(price & 0xffff) - CODES_BITS - 30 + <i32>clz(<u32>distance - 1);
  return (bits << 16) | <i32>distance;
}

/** Appends the match around `at`, as far as it goes, if it saves anything. */
function addMatch(at: usize, distance: usize): void {
  if (distance === 0 || distance > WINDOW || at < streamStart + distance) return;
  const start = startOfMatch(at, distance);
  const end = endOfMatch(at, distance, min(blockEnd, start + LONGEST_MATCH));
  const length = end - start;
  if (length < 3) return;
  const price = (pricedTo(end) - pricedTo(start)) & 0xffff;
  if (<i32>price <= CODES_BITS + <i32>lengthExtraBits(length) + <i32>distanceExtraBits(distance)) return;
  addSequence(start - literalsFrom, length, distance);
  literalsFrom = end;
}

function pricedTo(at: usize): u32 {
  return load<u16>(PRICES + ((at - block) << 1));
}

/** The first byte of the repeat that reaches to `at`; not before the last match, nor of the stream, nor far back. */
function startOfMatch(at: usize, distance: usize): usize {
  const first = max(max(literalsFrom, streamStart + distance), at - FARTHEST_BACK);
  while (at > first && load<u8>(at - 1) === load<u8>(at - 1 - distance)) at--;
  return at;
}

/** Where the repeat that reaches from `at` on ends; not behind `limit`. */
function endOfMatch(at: usize, distance: usize, limit: usize): usize {
  while (at + 8 <= limit) {
    const difference = load<u64>(at) ^ load<u64>(at - distance);
    if (difference !== 0) return at + <usize>(ctz(difference) >> 3);
    at += 8;
  }
  while (at < limit && load<u8>(at) === load<u8>(at - distance)) at++;
  return at;
}
