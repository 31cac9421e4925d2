import { z } from 'zod';
import {
  type Dimension,
  quantityFromNumber,
  quantityFromText,
  quantityPattern,
  UNITS,
  unitNames,
} from './units.ts';

// The kinds of field a sea file is made of. Each writes its own error message in two lines, what was expected and
// what to do, which schema-findings.ts takes apart again; descriptions travel into the JSON Schema for editors.

/** The message of a schema check: what was expected, and what to do about it. */
export function checkMessage(expected: string, remedy: string): string {
  return `${expected}\n${remedy}`;
}

/** Limits of a quantity in the unit of its bare numbers; `above` excludes its end, `min` and `max` include theirs. */
export interface QuantityRange {
  readonly above?: number;
  readonly min?: number;
  readonly max: number;
  /** A value in the user's words for the remedy, e.g. `24 kn`. */
  readonly example: string;
}

/** A number with a unit, or bare in SI (directions: degrees); comes out in SI and radians. */
export function quantity(
  dimension: Dimension,
  range: QuantityRange,
  description: string,
): z.ZodType<number, number | string> {
  const { bare } = UNITS[dimension];
  const withUnit = bare === '' ? '' : ` ${bare}`;
  const least = range.above === undefined ? `from ${range.min}` : `above ${range.above}`;
  const written =
    bare === ''
      ? `a number or text in ${unitNames(dimension)}`
      : `a number in ${bare} or text in ${unitNames(dimension)}`;
  const error = checkMessage(
    `a ${dimension} ${least} to ${range.max}${withUnit} (${written})`,
    `Write for example \`${range.example}\`.`,
  );
  const bound = z.number({ error }).max(range.max, { error });
  const number =
    range.above === undefined ? bound.min(range.min as number, { error }) : bound.gt(range.above, { error });
  const text = z.string({ error }).regex(quantityPattern(dimension), { error });
  const leastSi = quantityFromNumber(range.above ?? (range.min as number), dimension);
  const mostSi = quantityFromNumber(range.max, dimension);
  return z
    .union([number, text], { error })
    .transform((written, context) => {
      if (typeof written === 'number') return quantityFromNumber(written, dimension);
      const value = quantityFromText(written, dimension) as number;
      // Written as "not inside" so that NaN and an overflow to infinity (`1e999 m`) fail too.
      const inside = (range.above === undefined ? value >= leastSi : value > leastSi) && value <= mostSi;
      if (!inside) context.addIssue({ code: 'custom', message: error });
      return value;
    })
    .meta({ description, examples: [range.example] });
}

/** One word that stands for a value a quantity cannot express, or the quantity. */
export function wordOr<T>(
  word: string,
  meaning: T,
  other: z.ZodType<T, number | string>,
  expected: string,
  description: string,
): z.ZodType<T> {
  const remedy = `Write \`${word}\` or a number with its unit.`;
  return z
    .union([z.literal(word).transform(() => meaning), other], { error: checkMessage(expected, remedy) })
    .meta({ description });
}

/** A whole number within limits. */
export function wholeNumber(min: number, max: number, description: string): z.ZodType<number, number> {
  const error = checkMessage(`a whole number from ${min} to ${max}`, 'Write it without a fraction or unit.');
  return z.number({ error }).int({ error }).min(min, { error }).max(max, { error }).meta({ description });
}

/** One of a few words. */
export function choice<const T extends string>(words: readonly T[], description: string): z.ZodType<T> {
  return z.enum(words as readonly [T, ...T[]]).meta({ description });
}

/** Yes or no. */
export function flag(description: string): z.ZodType<boolean> {
  const error = checkMessage('true or false', 'Write `true` or `false`.');
  return z.boolean({ error }).meta({ description });
}

/** A group of keys; any other key is a problem whose message lists the known ones. */
export function section<T extends z.ZodRawShape>(
  shape: T,
  description: string,
): z.ZodObject<T, z.core.$strict> {
  const keys = Object.keys(shape).join(', ');
  return z
    .strictObject(shape, {
      error: (issue) =>
        issue.code === 'unrecognized_keys'
          ? keys
          : checkMessage(`a group of the keys ${keys}`, 'Indent the keys under it.'),
    })
    .meta({ description });
}

/** A list within limits of length. */
export function list<T>(item: z.ZodType<T>, min: number, max: number, description: string): z.ZodType<T[]> {
  const error = checkMessage(
    `a list of ${min} to ${max} entries`,
    'Write each entry on a line of its own after `- `.',
  );
  return z.array(item, { error }).min(min, { error }).max(max, { error }).meta({ description });
}
