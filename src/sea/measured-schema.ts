import { z } from 'zod';
import type { MeasuredDocument, NdbcDocument } from './document.ts';
import { checkMessage, quantity, section } from './field-schema.ts';
import { UTC_TIME } from './utc-time.ts';

const PATH_ERROR = checkMessage(
  'the path of a file, 1 to 500 characters on one line',
  'Write it relative to the folder of the sea file, e.g. `buoy.csv`.',
);

function path(description: string): z.ZodType<string, string> {
  return z
    .string({ error: PATH_ERROR })
    .min(1, { error: PATH_ERROR })
    .max(500, { error: PATH_ERROR })
    .regex(/^[^\p{Cc}\p{Zl}\p{Zp}]*$/u, { error: PATH_ERROR })
    .meta({ description });
}

const TIME_ERROR = checkMessage(
  'a time in UTC such as `2020-06-08T03:50Z`',
  'Write year-month-dayThour:minuteZ.',
);

const NDBC_SCHEMA: z.ZodType<NdbcDocument> = section(
  {
    density: path('Spectral density: `.data_spec` in real time, letter w in the history.'),
    direction1: path('Mean direction alpha1: `.swdir`, letter d.').optional(),
    direction2: path('Principal direction alpha2: `.swdir2`, letter i.').optional(),
    r1: path('r1: `.swr1`, letter j.').optional(),
    r2: path('r2: `.swr2`, letter k.').optional(),
  },
  'Spectral files of one station as the National Data Buoy Center publishes them: the density, or all five.',
);

type MeasuredKey = 'file' | 'ndbc' | 'time' | 'from' | 'spread';
type MeasuredFields = { readonly [K in MeasuredKey]: z.ZodType<MeasuredDocument[K]> };

/** The keys of a measured system beside those that other systems have too. */
export const MEASURED_FIELDS: MeasuredFields = {
  file: path(
    'Table of comma-separated values: columns frequency (Hz), energy (m2/Hz) and, if measured, direction and spread (deg).',
  ).optional(),
  ndbc: NDBC_SCHEMA.optional(),
  time: z
    .string({ error: TIME_ERROR })
    .regex(UTC_TIME, { error: TIME_ERROR })
    .meta({
      description:
        'Moment in UTC that chooses the record of `ndbc` files; between two records both are blended.',
      examples: ['2020-06-08T03:50Z'],
    })
    .optional(),
  from: quantity(
    'direction',
    { min: -360, max: 360, example: '250 deg' },
    'Direction the waves come from, where the file has none: clockwise from north, bare numbers in degrees.',
  ).optional(),
  spread: quantity(
    'direction',
    { min: 3, max: 80, example: '30 deg' },
    'Circular spread of the directions, where the file has none; default 30 deg.',
  ).optional(),
};
