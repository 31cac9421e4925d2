import { z } from 'zod';
import type { SpreadingDocument, SystemDocument } from './document.ts';
import { checkMessage, choice, quantity, section, wordOr } from './field-schema.ts';
import { SPECTRUM_NAMES, SPREADING_NAMES } from './sea.ts';

const SPREADING_FORM = choice(
  SPREADING_NAMES,
  '`cos-2s` with a fixed s, `mitsuyasu` (1975; needs windSpeed) or `hasselmann` (1980).',
);

const SPREADING_SCHEMA: z.ZodType<SpreadingDocument> = z
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
        `one of ${SPREADING_NAMES.join(', ')}, or a group of the keys form, s, swellNarrowing`,
        'Write for example `spreading: { form: cos-2s, s: 25 }`.',
      ),
    },
  )
  .meta({
    description:
      'How directions spread about the mean; default `hasselmann` for a wind sea, `cos-2s` with s 25 for a swell.',
  });

const NAME_ERROR = checkMessage(
  'a name of 1 to 40 letters, digits, hyphens and spaces, beginning with a letter or digit',
  'Choose a short name such as `north-swell`.',
);

const COMMON_FIELDS = {
  name: z
    .string({ error: NAME_ERROR })
    .regex(/^[A-Za-z0-9][A-Za-z0-9 -]{0,39}$/, { error: NAME_ERROR })
    .meta({ description: 'Name of the system, unique in the sea; default its kind, numbered.' })
    .optional(),
  from: quantity(
    'direction',
    { min: -360, max: 360, example: '250 deg' },
    'Direction the waves come from: clockwise from north, bare numbers in degrees.',
  ),
  spectrum: choice(
    SPECTRUM_NAMES,
    'Form of the spectrum; default `jonswap`, but `tma` for a wind sea in water of finite depth.',
  ).optional(),
  peakEnhancement: quantity(
    'ratio',
    { min: 1, max: 20, example: '3.3' },
    'Peak enhancement gamma of jonswap and tma; default from the growth law, or 3.3.',
  ).optional(),
};

const HEIGHT = { above: 0, max: 40, example: '2.5 m' };
const PERIOD = { min: 0.1, max: 40, example: '9 s' };
const HEIGHT_DESCRIPTION =
  'Significant height (four standard deviations of the surface) in the stated depth.';

const WIND_SEA_SCHEMA = section(
  {
    kind: z.literal('wind-sea').meta({ description: 'A sea raised by the wind over it.' }),
    ...COMMON_FIELDS,
    windSpeed: quantity(
      'speed',
      { above: 0, max: 60, example: '24 kn' },
      'Wind speed at 10 m height.',
    ).optional(),
    fetch: wordOr(
      'unlimited',
      Infinity,
      quantity('length', { above: 0, max: 20000000, example: '120 km' }, 'Fetch.'),
      '`unlimited` or a fetch above 0 m to 20000000 m (a number in m or text in m, km, cm, mm, ft, nmi)',
      'Length of water the wind has blown over, or `unlimited` (a fully developed sea).',
    ).optional(),
    significantHeight: quantity('length', HEIGHT, HEIGHT_DESCRIPTION).optional(),
    peakPeriod: quantity('time', PERIOD, 'Period of the spectral peak.').optional(),
    spreading: SPREADING_SCHEMA.optional(),
  },
  'A wind sea: by windSpeed and fetch, or by significantHeight and peakPeriod.',
);

const SWELL_SCHEMA = section(
  {
    kind: z.literal('swell').meta({ description: 'Waves that have left the wind that raised them.' }),
    ...COMMON_FIELDS,
    significantHeight: quantity('length', HEIGHT, HEIGHT_DESCRIPTION),
    peakPeriod: quantity('time', PERIOD, 'Period of the spectral peak.'),
    spreading: SPREADING_SCHEMA.optional(),
  },
  'A swell: by significantHeight and peakPeriod.',
);

export const SYSTEM_SCHEMA: z.ZodType<SystemDocument> = z.discriminatedUnion(
  'kind',
  [WIND_SEA_SCHEMA, SWELL_SCHEMA],
  {
    error: (issue) =>
      issue.code === 'invalid_union'
        ? checkMessage('one of wind-sea, swell', 'Say which kind of waves these are, e.g. `kind: wind-sea`.')
        : checkMessage(
            'a wave system (a group of keys)',
            'Begin it with `- kind: wind-sea` or `- kind: swell`.',
          ),
  },
);
