import { z } from 'zod';
import type { SpreadingDocument } from './document.ts';
import { checkMessage, choice, quantity, section } from './field-schema.ts';
import { SPREADING_NAMES } from './sea.ts';

const SPREADING_FORM = choice(
  SPREADING_NAMES,
  '`cos-2s` with a fixed s, `mitsuyasu` (1975; needs a wind), `hasselmann` (1980), `donelan-banner` (1985, 1990), ' +
    '`wrapped-normal` with a fixed width, or `elfouhaily` (1997; needs a wind).',
);

export const SPREADING_SCHEMA: z.ZodType<SpreadingDocument> = z
  .union(
    [
      SPREADING_FORM.transform((form): SpreadingDocument => ({ form })),
      section(
        {
          form: SPREADING_FORM.optional(),
          s: quantity(
            'ratio',
            { min: 0, max: 1000, example: '25' },
            'Exponent of cos-2s: 1 is very broad, 10 a wind sea, 25 to 75 swells of short to long travel.',
          ).optional(),
          width: quantity(
            'direction',
            { min: 1, max: 120, example: '25 deg' },
            'Standard deviation of wrapped-normal, bare numbers in degrees: 25 a wind sea, 8 to 16 swells.',
          ).optional(),
          swellNarrowing: quantity(
            'ratio',
            { min: 0, max: 1, example: '0.5' },
            'Narrowing of long waves (Horvath 2015), 0 to 1; default 0.',
          ).optional(),
        },
        'Spreading with its numbers.',
      ),
    ],
    {
      error: checkMessage(
        `one of ${SPREADING_NAMES.join(', ')}, or a group of the keys form, s, width, swellNarrowing`,
        'Write for example `spreading: { form: cos-2s, s: 25 }`.',
      ),
    },
  )
  .meta({
    description:
      'How directions spread about the mean; default `hasselmann` for a wind sea (with the spectrum `elfouhaily` its ' +
      'own), `cos-2s` with s 25 for a swell.',
  });
