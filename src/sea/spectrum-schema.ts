import { z } from 'zod';
import { OCHI_HUBBLE_MEMBERS } from '../spectrum/ochi-hubble.ts';
import type { SpectrumDocument } from './document.ts';
import { checkMessage, choice, section, wholeNumber, wordOr } from './field-schema.ts';
import { SPECTRUM_NAMES } from './sea.ts';

const SPECTRUM_FORM = choice(SPECTRUM_NAMES, 'Published form of the spectrum.');

const LAST_ROW = OCHI_HUBBLE_MEMBERS - 1;

export const SPECTRUM_SCHEMA: z.ZodType<SpectrumDocument> = z
  .union(
    [
      SPECTRUM_FORM.transform((form): SpectrumDocument => ({ form })),
      section(
        {
          form: SPECTRUM_FORM,
          row: wordOr<number>(
            'most-probable',
            0,
            wholeNumber(1, LAST_ROW, 'Row of the published table.'),
            `\`most-probable\` or a whole number from 1 to ${LAST_ROW}`,
            'Member of the ochi-hubble family: `most-probable` (the default) or 1 to 10, those of .95 confidence.',
          ).optional(),
        },
        'Spectrum with its numbers.',
      ),
    ],
    {
      error: checkMessage(
        `one of ${SPECTRUM_NAMES.join(', ')}, or a group of the keys form, row`,
        'Write for example `spectrum: jonswap`.',
      ),
    },
  )
  .meta({
    description:
      'Form of the spectrum; default `jonswap`, but `tma` for a wind sea in water of finite depth.',
  });
