import { describe, expect, it } from 'vitest';
import {
  type Arithmetic,
  butterfly4,
  butterfly8,
  type Complex,
  complexProduct,
} from '../../../../src/kernel/wave/butterflies.ts';
import { straightLine, term, ZERO_TERM } from '../../../../src/kernel/wave/straight-line.ts';

const NUMBERS: Arithmetic<number> = { add: (a, b) => a + b, sub: (a, b) => a - b, mul: (a, b) => a * b };
const BUTTERFLIES = {
  4: (x: readonly Complex<number>[]) => butterfly4(x, NUMBERS),
  8: (x: readonly Complex<number>[]) => butterfly8(x, Math.SQRT1_2, NUMBERS),
};

function directSum(x: readonly Complex<number>[], k: number): Complex<number> {
  let re = 0;
  let im = 0;
  x.forEach((value, m) => {
    const angle = (2 * Math.PI * k * m) / x.length;
    re += value.re * Math.cos(angle) - value.im * Math.sin(angle);
    im += value.re * Math.sin(angle) + value.im * Math.cos(angle);
  });
  return { re, im };
}

describe('butterflies', () => {
  it.each([4, 8] as const)('of radix %i are the direct sum', (radix) => {
    // Each unit vector, real and imaginary: by linearity that is every input.
    for (let m = 0; m < radix; m++) {
      for (const unit of [
        { re: 1, im: 0 },
        { re: 0, im: 1 },
      ]) {
        const x = Array.from({ length: radix }, (_, i) => (i === m ? unit : { re: 0, im: 0 }));
        BUTTERFLIES[radix](x).forEach((y, k) => {
          const expected = directSum(x, k);
          expect(y.re).toBeCloseTo(expected.re, 14);
          expect(y.im).toBeCloseTo(expected.im, 14);
        });
      }
    }
  });

  it('take the published number of operations', () => {
    const operations = (
      transform: (x: Complex<number>[], on: Arithmetic<number>) => unknown,
      radix: number,
    ) => {
      const counts = { add: 0, mul: 0 };
      const counted = (kind: 'add' | 'mul') => {
        counts[kind]++;
        return 1;
      };
      const counting: Arithmetic<number> = {
        add: () => counted('add'),
        sub: () => counted('add'),
        mul: () => counted('mul'),
      };
      transform(
        Array.from({ length: radix }, () => ({ re: 1, im: 2 })),
        counting,
      );
      return counts;
    };
    // 16 additions of 4 points, 52 and 4 multiplications of 8. Source: Van Loan 1992 (from memory).
    expect(operations(butterfly4, 4)).toEqual({ add: 16, mul: 0 });
    expect(operations((x, on) => butterfly8(x, Math.SQRT1_2, on), 8)).toEqual({ add: 52, mul: 4 });
  });
});

describe('straight lines', () => {
  it('say a complex product in six operations', () => {
    const out = straightLine('t');
    const y = complexProduct({ re: term('a'), im: term('b') }, { re: term('c'), im: term('d') }, out);
    expect([out.text(y.re), out.text(y.im)]).toEqual(['t2', 't5']);
    expect(out.take()).toBe(
      [
        'const t0 = f32x4.mul(a, c);',
        'const t1 = f32x4.mul(b, d);',
        'const t2 = f32x4.sub(t0, t1);',
        'const t3 = f32x4.mul(b, c);',
        'const t4 = f32x4.mul(a, d);',
        'const t5 = f32x4.add(t3, t4);',
      ].join('\n'),
    );
    expect(out.take()).toBe('');
  });

  it('leave out zeros and keep signs', () => {
    const out = straightLine('t');
    const a = term('a');
    const b = term('b');
    const minusA = out.sub(ZERO_TERM, a);
    expect(out.text(minusA)).toBe('f32x4.neg(a)');
    expect(out.add(ZERO_TERM, b)).toBe(b);
    expect(out.mul(ZERO_TERM, b)).toEqual(ZERO_TERM);
    expect(out.text(ZERO_TERM)).toBe('f32x4.splat(0)');
    expect(out.take()).toBe('');
    out.add(minusA, b);
    out.sub(minusA, b);
    out.mul(minusA, b);
    expect(out.take()).toBe(
      ['const t0 = f32x4.sub(b, a);', 'const t1 = f32x4.add(a, b);', 'const t2 = f32x4.mul(a, b);'].join(
        '\n',
      ),
    );
  });

  it('say a half-empty butterfly in half the operations', () => {
    const out = straightLine('t');
    const zero = { re: ZERO_TERM, im: ZERO_TERM };
    const [x0, x3] = [0, 3].map((m) => ({ re: term(`re${m}`), im: term(`im${m}`) }));
    butterfly4([x0, zero, zero, x3], out);
    expect(out.take().split('\n')).toHaveLength(8);
  });
});
