import type { Arithmetic } from './butterflies.ts';

/**
 * A real vector in generated text: the name of a variable, its negative, or zero. Signs and zeros are kept out of the
 * program by choosing other operations, so that a butterfly whose inputs are partly zero is written without them.
 */
export interface Term {
  readonly sign: -1 | 0 | 1;
  readonly name: string;
}

export const ZERO_TERM: Term = { sign: 0, name: '' };

/** A term of one AssemblyScript expression. */
export function term(name: string): Term {
  return { sign: 1, name };
}

/** Collects AssemblyScript statements on float32 vectors, one operation each. */
export interface StraightLine extends Arithmetic<Term> {
  /** Gives an expression a name of its own. */
  define(expression: string): Term;
  /** The text of a term, with its sign. */
  text(value: Term): string;
  /** Adds a statement. */
  statement(line: string): void;
  /** The statements so far, one a line, and none after. */
  take(): string;
}

/**
 * A writer of straight-line text.
 * @param prefix first letter of the variables it names
 */
export function straightLine(prefix: string): StraightLine {
  let lines: string[] = [];
  let count = 0;
  const define = (expression: string): Term => {
    const name = `${prefix}${count++}`;
    lines.push(`const ${name} = ${expression};`);
    return term(name);
  };
  const negative = (value: Term): Term => ({ sign: -value.sign as Term['sign'], name: value.name });
  const add = (a: Term, b: Term): Term => {
    if (a.sign === 0) return b;
    if (b.sign === 0) return a;
    if (a.sign === b.sign) {
      const sum = define(`f32x4.add(${a.name}, ${b.name})`);
      return a.sign === 1 ? sum : negative(sum);
    }
    return a.sign === 1
      ? define(`f32x4.sub(${a.name}, ${b.name})`)
      : define(`f32x4.sub(${b.name}, ${a.name})`);
  };
  return {
    define,
    add,
    sub: (a, b) => add(a, negative(b)),
    mul(a, b) {
      if (a.sign === 0 || b.sign === 0) return ZERO_TERM;
      const product = define(`f32x4.mul(${a.name}, ${b.name})`);
      return a.sign === b.sign ? product : negative(product);
    },
    text({ sign, name }) {
      if (sign === 0) return 'f32x4.splat(0)';
      return sign === 1 ? name : `f32x4.neg(${name})`;
    },
    statement: (line) => void lines.push(line),
    take() {
      const text = lines.join('\n');
      lines = [];
      return text;
    },
  };
}
