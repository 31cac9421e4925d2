/*
 * The shape of a file that anybody may have written, checked before a number of it is used. Small on purpose: types say
 * what there is, this says where a file differs.
 */

/** Where a value is not what it should be. */
export interface ShapeFault {
  readonly path: string;
  readonly expected: string;
  readonly found: string;
}

/** Finds the first fault of a value that should be a T; null where there is none. */
export type Shape<T> = ((value: unknown, path: string) => ShapeFault | null) & {
  /** Never there: it tells the compiler a shape of one type from that of another. */
  readonly of?: T;
};

/** A value of exactly these keys. */
export function record<T extends object>(
  fields: {
    readonly [K in keyof T]-?: Shape<T[K]>;
  },
): Shape<T> {
  const keys = Object.keys(fields);
  return (value, path) => {
    if (!isRecord(value)) return { path, expected: 'an object', found: described(value) };
    const own = Object.keys(value);
    const odd = own.find((key) => !keys.includes(key));
    if (odd !== undefined) return { path: child(path, odd), expected: 'no such key', found: 'it' };
    for (const key of keys) {
      const fault = fields[key as keyof T](
        Object.hasOwn(value, key) ? value[key] : undefined,
        child(path, key),
      );
      if (fault !== null) return fault;
    }
    return null;
  };
}

/** A value of at least these keys. */
export function openRecord(fields: Readonly<Record<string, Shape<unknown>>>): Shape<object> {
  return (value, path) => {
    if (!isRecord(value)) return { path, expected: 'an object', found: described(value) };
    for (const [key, shape] of Object.entries(fields)) {
      const fault = shape(Object.hasOwn(value, key) ? value[key] : undefined, child(path, key));
      if (fault !== null) return fault;
    }
    return null;
  };
}

export function listOf<T>(item: Shape<T>, fewest: number, most: number): Shape<readonly T[]> {
  return (value, path) => {
    if (!Array.isArray(value) || value.length < fewest || value.length > most) {
      return { path, expected: `a list of ${fewest} to ${most}`, found: described(value) };
    }
    for (const [i, entry] of value.entries()) {
      const fault = item(entry, `${path}[${i}]`);
      if (fault !== null) return fault;
    }
    return null;
  };
}

export function orNull<T>(shape: Shape<T>): Shape<T | null> {
  return (value, path) => (value === null ? null : shape(value, path));
}

export function oneOf<T extends string | number>(...values: readonly T[]): Shape<T> {
  return (value, path) =>
    values.includes(value as T) ? null : { path, expected: values.join(', '), found: described(value) };
}

/** A finite number of the range, both ends included. */
export function numberFrom(low: number, high: number): Shape<number> {
  return (value, path) =>
    typeof value === 'number' && value >= low && value <= high && Number.isFinite(value)
      ? null
      : { path, expected: `a number from ${low} to ${high}`, found: described(value) };
}

export function wholeFrom(low: number, high: number): Shape<number> {
  return (value, path) =>
    Number.isInteger(value) && (value as number) >= low && (value as number) <= high
      ? null
      : { path, expected: `a whole number from ${low} to ${high}`, found: described(value) };
}

/** A length that may be infinite: deep water, unlimited fetch. */
export const LENGTH_OR_INFINITE: Shape<number> = (value, path) =>
  typeof value === 'number' && value > 0
    ? null
    : { path, expected: 'a number above 0, or Infinity', found: described(value) };

export const FINITE: Shape<number> = (value, path) =>
  Number.isFinite(value) ? null : { path, expected: 'a finite number', found: described(value) };

export const YES_OR_NO: Shape<boolean> = (value, path) =>
  typeof value === 'boolean' ? null : { path, expected: 'true or false', found: described(value) };

export function textOf(most: number, pattern: RegExp = /^/): Shape<string> {
  return (value, path) =>
    typeof value === 'string' && value.length <= most && pattern.test(value)
      ? null
      : { path, expected: `a text of at most ${most} characters`, found: described(value) };
}

function isRecord(value: unknown): value is Readonly<Record<string, unknown>> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

function child(path: string, key: string): string {
  return path === '' ? key : `${path}.${key}`;
}

const MOST_SHOWN = 40;

/** A value in a few words; it may be anything. */
export function described(value: unknown): string {
  if (value === undefined) return 'nothing';
  if (Array.isArray(value)) return `a list of ${value.length}`;
  if (typeof value === 'object' && value !== null) return 'an object';
  const text = typeof value === 'string' ? JSON.stringify(value) : String(value);
  return text.length > MOST_SHOWN ? `${text.slice(0, MOST_SHOWN)}…` : text;
}
