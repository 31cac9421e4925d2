import { butterfly4, butterfly8, type Complex, complexProduct, type Radix } from './butterflies.ts';
import { COMPLEX_VECTOR, LINE, LINE_VECTORS, STRIP_ROW, STRIP_VECTORS } from './layout.ts';
import { type StraightLine, straightLine, type Term, term, ZERO_TERM } from './straight-line.ts';

/*
 * Writes the stages of the two-dimensional transform as AssemblyScript, for assembly/transform.ts to call.
 *
 * A transform of N = r 4 4 ... 4 (r = 4 or 8) values is a first stage of radix r, middle stages of radix 4 and a last
 * stage of radix 4, each a pass over the data (decimation in frequency). The last stage puts results in natural order.
 * A first stage has two forms: for any spectrum, and for one whose waves all lie below half the Nyquist index ("inner"),
 * whose middle half is zero and is neither read nor added: 0.65 of the time, and what planned cascades have.
 *
 * Along a row, neighbouring values share a vector; the last stage turns 4 x 4 values in registers so that its
 * butterflies, too, run across vectors. Along a column, a vector holds one row's values of four columns and a twiddle
 * is the same for all of them.
 *
 * Contributor notes (Xeon with AVX-512, Node 20; figures of test/bench/fft-contenders.mjs in DEVELOPERS.md):
 * - Stages take their strides as arguments, so one program of 20 kB serves every size. V8 turns a butterfly into 56
 *   instructions, 34 of them the arithmetic itself; strides as constants, a program a size, have nothing left to save.
 * - Radix 8 has more live values than the 16 registers; it is used once, where log2 N is odd.
 */

type Butterfly = (out: StraightLine, x: readonly Complex<Term>[]) => Complex<Term>[];

const BUTTERFLIES: Readonly<Record<Radix, Butterfly>> = {
  4: (out, x) => butterfly4(x, out),
  8: (out, x) => butterfly8(x, term('sqrtHalf'), out),
};

const ZERO: Complex<Term> = { re: ZERO_TERM, im: ZERO_TERM };

/** AssemblyScript text of all stages. */
export function transformSource(): string {
  const firsts = ([4, 8] as const).flatMap((radix) => [false, true].map((inner) => ({ radix, inner })));
  const rows = [...firsts.map(({ radix, inner }) => rowFirst(radix, inner)), rowMiddle(), rowLast()];
  const columns = ([1, 2] as const).flatMap((lines) => [
    ...firsts.map(({ radix, inner }) => columnFirst(radix, inner, lines)),
    columnMiddle(lines),
    columnLast(lines),
  ]);
  return [...rows, ...columns, ''].join('\n\n');
}

/** How many lines of a strip, of 8 columns each, a column pass takes at a time. */
type Lines = 1 | 2;

/** Names of first stages, e.g. `rowFirst4Inner`, and of column stages, e.g. `columnMiddle8` for 8 columns. */
function rowFirstName(radix: Radix, inner: boolean): string {
  return `rowFirst${radix}${inner ? 'Inner' : ''}`;
}
function columnName(stage: string, lines: Lines): string {
  return `column${stage}By${8 * lines}`;
}

/**
 * A row's first stage, from two planes of single values into complex vectors.
 * `apart` is the distance of a butterfly's inputs in a plane, bytes.
 */
function rowFirst(radix: Radix, inner: boolean): string {
  const out = straightLine('t');
  const x = inputs(radix, inner, (m) => ({
    re: out.define(`v128.load(re + ${m} * apart)`),
    im: out.define(`v128.load(im + ${m} * apart)`),
  }));
  BUTTERFLIES[radix](out, x).forEach((y, k) => {
    const turned = k === 0 ? y : complexProduct(y, vectorTwiddle(out, k), out);
    storeComplex(out, `work + ${2 * k} * apart`, 0, turned);
  });
  return `export function ${rowFirstName(radix, inner)}(re: usize, im: usize, work: usize, apart: usize, twiddles: usize): void {
${constants(radix)}
for (let end = work + 2 * apart; work < end; work += ${COMPLEX_VECTOR}) {
${out.take()}
re += ${COMPLEX_VECTOR / 2};
im += ${COMPLEX_VECTOR / 2};
twiddles += ${(radix - 1) * COMPLEX_VECTOR};
}
}`;
}

/** A row's middle stage, in place, in all blocks of `block` bytes of the row at `work`. */
function rowMiddle(): string {
  const out = straightLine('t');
  const twiddles = [ZERO, ...[1, 2, 3].map((k) => vectorTwiddle(out, k))];
  const head = out.take();
  const x = inputs(4, false, (m) => loadComplex(out, `p + ${m} * apart`, 0));
  butterfly4(x, out).forEach((y, k) => {
    storeComplex(out, `p + ${k} * apart`, 0, k === 0 ? y : complexProduct(y, twiddles[k], out));
  });
  return `export function rowMiddle(work: usize, bytes: usize, block: usize, twiddles: usize): void {
const apart = block >> 2;
const end = work + bytes;
for (let first = work, next = work + apart; first < next; first += ${COMPLEX_VECTOR}) {
${head}
twiddles += ${3 * COMPLEX_VECTOR};
for (let p = first; p < end; p += block) {
${out.take()}
}
}
}`;
}

/**
 * A row's last stage, into one row of the strips. Four vectors whose values differ in the first stage's output digit
 * are turned, so that a vector's lanes become neighbouring results. `order` lists, by result, where they begin;
 * results a quarter of the row further go to `to1`, `to2` and `to3` behind the first.
 */
function rowLast(): string {
  const out = straightLine('t');
  const turned = [0, 16].map((offset) => {
    const rows = [0, 1, 2, 3].map((m) => out.define(`v128.load(from + ${m} * apart, ${offset})`).name);
    return transposed(out, rows);
  });
  const x = inputs(4, false, (m) => ({ re: turned[0][m], im: turned[1][m] }));
  butterfly4(x, out).forEach((y, k) => {
    storeComplex(out, k === 0 ? 'to' : `to + to${k}`, 0, y);
  });
  return `export function rowLast(work: usize, apart: usize, order: usize, end: usize, strip: usize, stripBytes: usize, to1: usize, to2: usize, to3: usize): void {
while (order < end) {
let to = strip;
for (const stripEnd = min(order + ${4 * STRIP_VECTORS}, end); order < stripEnd; order += 4) {
const from = work + <usize>load<u32>(order);
${out.take()}
to += ${COMPLEX_VECTOR};
}
strip += stripBytes;
}
}`;
}

/**
 * A column's first stage, from a strip into the work rows. `apart` is the distance of a butterfly's work rows, bytes.
 */
function columnFirst(radix: Radix, inner: boolean, lines: Lines): string {
  const workRow = lines * LINE;
  const from = (m: number) => `from + ${(m * STRIP_ROW) / workRow} * apart`;
  const body = (turned: boolean) => {
    const out = straightLine('t');
    for (let v = 0; v < lines * LINE_VECTORS; v++) {
      const x = inputs(radix, inner, (m) => loadComplex(out, from(m), v * COMPLEX_VECTOR));
      BUTTERFLIES[radix](out, x).forEach((y, k) => {
        storeComplex(out, `to + ${k} * apart`, v * COMPLEX_VECTOR, turned ? turnedColumn(out, y, k) : y);
      });
    }
    return out.take();
  };
  const stage = `First${radix}${inner ? 'Inner' : ''}`;
  return `export function ${columnName(stage, lines)}(from: usize, to: usize, apart: usize, twiddles: usize): void {
${constants(radix)}
const end = to + apart;
${body(false)}
twiddles += ${twiddleRow(radix)};
for (from += ${STRIP_ROW}, to += ${workRow}; to < end; from += ${STRIP_ROW}, to += ${workRow}) {
${columnTwiddles(radix)}
${body(true)}
}
}`;
}

/** A column's middle stage, in place, in one block of work rows at `p` whose quarter is `apart` bytes. */
function columnMiddle(lines: Lines): string {
  const workRow = lines * LINE;
  const body = (turned: boolean) => {
    const out = straightLine('t');
    for (let v = 0; v < lines * LINE_VECTORS; v++) {
      const x = inputs(4, false, (m) => loadComplex(out, `p + ${m} * apart`, v * COMPLEX_VECTOR));
      butterfly4(x, out).forEach((y, k) => {
        storeComplex(out, `p + ${k} * apart`, v * COMPLEX_VECTOR, turned ? turnedColumn(out, y, k) : y);
      });
    }
    return out.take();
  };
  return `export function ${columnName('Middle', lines)}(p: usize, apart: usize, twiddles: usize): void {
const end = p + apart;
${body(false)}
twiddles += ${twiddleRow(4)};
for (p += ${workRow}; p < end; p += ${workRow}) {
${columnTwiddles(4)}
${body(true)}
}
}`;
}

/**
 * A column's last stage, from blocks of four work rows into lines of two real fields: 8 real parts, then 8 imaginary
 * parts. `order` lists, by block, the byte where its first result's row begins; the others follow a quarter of the strip
 * (`apart`) further each.
 */
function columnLast(lines: Lines): string {
  const workRow = lines * LINE;
  const out = straightLine('t');
  for (let v = 0; v < lines * LINE_VECTORS; v++) {
    const x = inputs(4, false, (m) => loadComplex(out, 'from', m * workRow + v * COMPLEX_VECTOR));
    const offset = Math.floor(v / LINE_VECTORS) * LINE + (v % LINE_VECTORS) * (LINE / 4);
    butterfly4(x, out).forEach((y, k) => {
      out.statement(`v128.store(to + ${k} * apart, ${out.text(y.re)}, ${offset});`);
      out.statement(`v128.store(to + ${k} * apart, ${out.text(y.im)}, ${offset + LINE / 2});`);
    });
  }
  return `export function ${columnName('Last', lines)}(from: usize, end: usize, order: usize, strip: usize, apart: usize): void {
for (; from < end; from += ${4 * workRow}, order += 4) {
const to = strip + <usize>load<u32>(order);
${out.take()}
}
}`;
}

/** The inputs of a butterfly: loaded, or zero where an inner spectrum has none. */
function inputs(radix: Radix, inner: boolean, loaded: (m: number) => Complex<Term>): Complex<Term>[] {
  return Array.from({ length: radix }, (_, m) => {
    const isZero = inner && m >= radix / 4 && m < (3 * radix) / 4;
    return isZero ? ZERO : loaded(m);
  });
}

function loadComplex(out: StraightLine, address: string, offset: number): Complex<Term> {
  return {
    re: out.define(`v128.load(${address}, ${offset})`),
    im: out.define(`v128.load(${address}, ${offset + COMPLEX_VECTOR / 2})`),
  };
}

function storeComplex(out: StraightLine, address: string, offset: number, { re, im }: Complex<Term>): void {
  out.statement(`v128.store(${address}, ${out.text(re)}, ${offset});`);
  out.statement(`v128.store(${address}, ${out.text(im)}, ${offset + COMPLEX_VECTOR / 2});`);
}

/** The twiddle of output k of a row stage: a value a lane. */
function vectorTwiddle(out: StraightLine, k: number): Complex<Term> {
  return loadComplex(out, 'twiddles', (k - 1) * COMPLEX_VECTOR);
}

/** Loads the twiddles of a column stage, each a single value for all lanes, and steps to the next. */
function columnTwiddles(radix: Radix): string {
  const loads = Array.from({ length: radix - 1 }, (_, j) => {
    const re = `const re${j + 1} = v128.load_splat<f32>(twiddles, ${8 * j});`;
    return `${re}\nconst im${j + 1} = v128.load_splat<f32>(twiddles, ${8 * j + 4});`;
  });
  return `${loads.join('\n')}\ntwiddles += ${twiddleRow(radix)};`;
}

/** Bytes of the twiddles of one row of a column stage. */
function twiddleRow(radix: Radix): number {
  return 8 * (radix - 1);
}

function turnedColumn(out: StraightLine, y: Complex<Term>, k: number): Complex<Term> {
  return k === 0 ? y : complexProduct(y, { re: term(`re${k}`), im: term(`im${k}`) }, out);
}

/** Turns four vectors: lane l of result m is lane m of vector l. */
function transposed(out: StraightLine, [a, b, c, d]: readonly string[]): Term[] {
  const ab = out.define(`v128.shuffle<f32>(${a}, ${b}, 0, 4, 1, 5)`).name;
  const cd = out.define(`v128.shuffle<f32>(${c}, ${d}, 0, 4, 1, 5)`).name;
  const abHigh = out.define(`v128.shuffle<f32>(${a}, ${b}, 2, 6, 3, 7)`).name;
  const cdHigh = out.define(`v128.shuffle<f32>(${c}, ${d}, 2, 6, 3, 7)`).name;
  return [
    out.define(`v128.shuffle<f64>(${ab}, ${cd}, 0, 2)`),
    out.define(`v128.shuffle<f64>(${ab}, ${cd}, 1, 3)`),
    out.define(`v128.shuffle<f64>(${abHigh}, ${cdHigh}, 0, 2)`),
    out.define(`v128.shuffle<f64>(${abHigh}, ${cdHigh}, 1, 3)`),
  ];
}

function constants(radix: Radix): string {
  return radix === 8 ? 'const sqrtHalf = f32x4.splat(0.7071067811865476);' : '';
}
