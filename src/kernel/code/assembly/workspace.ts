/*
 * Where the coder keeps its tables: fixed addresses at the bottom of the memory, so that each is a constant in the
 * instructions that use it. From WORKSPACE_BYTES on the memory belongs to the caller.
 *
 * All tables belong to the block being written and are filled anew for each.
 */

/** Symbols of the literal/length alphabet: 256 bytes, the end of block, 29 lengths; 286 and 287 only fill the fixed code. */
export const LITERAL_SYMBOLS: usize = 288;
/** The symbol that ends a block. */
export const END_OF_BLOCK: usize = 256;
/** Symbols of the distance alphabet. */
export const DISTANCE_SYMBOLS: usize = 30;
/** Symbols of the alphabet in which code lengths are written. */
export const HEADER_SYMBOLS: usize = 19;

/** u32[288], u32[32], u32[32]: how often each symbol occurs. */
export const LITERAL_COUNTS: usize = 0x400;
export const DISTANCE_COUNTS: usize = LITERAL_COUNTS + 4 * 288;
export const HEADER_COUNTS: usize = DISTANCE_COUNTS + 4 * 32;

/** u8[288], u8[32], u8[32]: length of each symbol's code in bits; 0 for symbols that do not occur. */
export const LITERAL_LENGTHS: usize = HEADER_COUNTS + 4 * 32;
export const DISTANCE_LENGTHS: usize = LITERAL_LENGTHS + 288;
export const HEADER_LENGTHS: usize = DISTANCE_LENGTHS + 32;

/** u32[288], u32[32], u32[32]: the code of each symbol, packed as in canonical-code.ts. */
export const LITERAL_CODES: usize = HEADER_LENGTHS + 32;
export const DISTANCE_CODES: usize = LITERAL_CODES + 4 * 288;
export const HEADER_CODES: usize = DISTANCE_CODES + 4 * 32;

/** u8[320] twice: the lengths of both alphabets, kept while others are tried. */
export const KEPT_LENGTHS: usize = HEADER_CODES + 4 * 32;
export const SPARE_LENGTHS: usize = KEPT_LENGTHS + 320;

/** u16[320]: the code lengths of a block in the symbols of the header alphabet, with their extra bits. */
export const HEADER_TOKENS: usize = SPARE_LENGTHS + 320;

/** u32[288] twice and u32[64]: what code-lengths.ts and canonical-code.ts work on. */
export const SORTED: usize = HEADER_TOKENS + 2 * 320;
export const SORTED_SPARE: usize = SORTED + 4 * 288;
export const LENGTH_COUNTS: usize = SORTED_SPARE + 4 * 288;

/** u32[4][256]: four counts of the same bytes, so that no addition waits for the one before it. */
export const LANE_COUNTS: usize = 0x3000;

/** u8[4][4][16]: how samples become pixels, see png-rows.ts. */
export const SAMPLE_LISTS: usize = 0x4000;

/** u32[65536]: the code of each pair of bytes, first byte low. */
export const PAIR_CODES: usize = 0x10000;

/** u16[65537]: the bits of all literals before each byte of a searched block, which has no use for pairs. */
export const PRICES: usize = PAIR_CODES + 64;
/** u16[65536]: the places in a searched block whose bytes are dear. */
export const DEAR_PLACES: usize = PRICES + 0x20010;

/** u32[4]: the distances of four places. */
export const DISTANCES: usize = 0x50f00;

/** u64[16384]: the four latest places whose bytes have one hash. */
export const PLACES: usize = 0x51000;

/** u64[16384]: a block of at most SEARCHED_BLOCK bytes as sequences with matches, see sequences.ts. */
export const MATCH_SEQUENCES: usize = 0x71000;

/** u64[14565]: a block of at most LARGEST_BLOCK bytes as sequences with runs: one for every 9 bytes, and the last. */
export const RUN_SEQUENCES: usize = 0x91000;

/**
 * Bytes in the largest block. A widely used inflater (fflate 0.8, as it reads streams) makes room for 128 KiB when a
 * block of literals begins, and loses without a word what a longer one holds.
 */
export const LARGEST_BLOCK: usize = 0x20000;
/** Bytes in the largest block that is searched for matches: places in it fit 16 bits. */
export const SEARCHED_BLOCK: usize = 0x10000;

/** Bytes of memory that the coder keeps for itself. */
export const WORKSPACE_BYTES: usize = 0xb0000;
