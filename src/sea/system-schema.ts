import { z } from 'zod';
import type { SystemDocument } from './document.ts';
import { checkMessage, choice, quantity, section, wholeNumber, wordOr } from './field-schema.ts';
import { MEASURED_FIELDS } from './measured-schema.ts';
import { GROWTH_NAMES } from './sea.ts';
import { SPECTRUM_SCHEMA } from './spectrum-schema.ts';
import { SPREADING_SCHEMA } from './spreading-schema.ts';

const NAME_ERROR = checkMessage(
  'a name of 1 to 40 letters, digits, hyphens and spaces, beginning with a letter or digit',
  'Choose a short name such as `north-swell`.',
);

const NAME_FIELD = {
  name: z
    .string({ error: NAME_ERROR })
    .regex(/^[A-Za-z0-9][A-Za-z0-9 -]{0,39}$/, { error: NAME_ERROR })
    .meta({ description: 'Name of the system, unique in the sea; default its kind, numbered.' })
    .optional(),
};

const HEIGHT = { above: 0, max: 40, example: '2.5 m' };
const PERIOD = { min: 0.1, max: 40, example: '9 s' };
const HEIGHT_DESCRIPTION =
  'Significant height (four standard deviations of the surface) in the stated depth.';

const SCALE_FIELD = {
  scaleTo: quantity(
    'length',
    HEIGHT,
    'Significant height the finished system is scaled to in the stated depth, whatever made it.',
  ).optional(),
};

const COMMON_FIELDS = {
  ...NAME_FIELD,
  from: quantity(
    'direction',
    { min: -360, max: 360, example: '250 deg' },
    'Direction the waves come from: clockwise from north, bare numbers in degrees.',
  ),
  spectrum: SPECTRUM_SCHEMA.optional(),
  peakEnhancement: quantity(
    'ratio',
    { min: 1, max: 20, example: '3.3' },
    'Peak enhancement gamma of jonswap and tma; default from the growth law, for a wind sea of stated height from its ' +
      'steepness (DNV-RP-C205), for a swell 3.3.',
  ).optional(),
  spreading: SPREADING_SCHEMA.optional(),
  ...SCALE_FIELD,
};

const WIND_FIELDS = {
  windSpeed: quantity('speed', { above: 0, max: 60, example: '24 kn' }, 'Wind speed.').optional(),
  windHeight: quantity(
    'length',
    { min: 1, max: 100, example: '19.5 m' },
    'Height above the sea that windSpeed was measured at; default 10 m.',
  ).optional(),
  beaufort: wholeNumber(
    1,
    12,
    'Force of the wind on the Beaufort scale, in place of windSpeed; U10 = .836 B^1.5 m/s.',
  ).optional(),
};

const WIND_SEA_SCHEMA = section(
  {
    kind: z.literal('wind-sea').meta({ description: 'A sea raised by the wind over it.' }),
    ...COMMON_FIELDS,
    ...WIND_FIELDS,
    fetch: wordOr(
      'unlimited',
      Infinity,
      quantity('length', { above: 0, max: 20000000, example: '120 km' }, 'Fetch.'),
      '`unlimited` or a fetch above 0 m to 20000000 m (a number in m or text in m, km, cm, mm, ft, nmi)',
      'Length of water the wind has blown over, or `unlimited` (a fully developed sea).',
    ).optional(),
    duration: quantity(
      'time',
      { above: 0, max: 2592000, example: '6 h' },
      'How long the wind has blown; default long enough.',
    ).optional(),
    growth: choice(
      GROWTH_NAMES,
      'Law by which wind and fetch raise the sea: `jonswap` (1973, the default), `kahma-calkoen` (1992), ' +
        '`shore-protection-manual` (1984), `wilson` (1965) or `young-verhagen` (1996, which knows the depth).',
    ).optional(),
    significantHeight: quantity('length', HEIGHT, HEIGHT_DESCRIPTION).optional(),
    seaState: wholeNumber(
      1,
      9,
      'State of the sea by WMO code table 3700, in place of significantHeight: the middle of its class.',
    ).optional(),
    peakPeriod: quantity(
      'time',
      PERIOD,
      'Period of the spectral peak; beside seaState by default that of a fully developed sea of this height.',
    ).optional(),
  },
  'A wind sea: by windSpeed or beaufort and fetch, or by significantHeight or seaState and peakPeriod.',
);

const SWELL_SCHEMA = section(
  {
    kind: z.literal('swell').meta({ description: 'Waves that have left the wind that raised them.' }),
    ...COMMON_FIELDS,
    significantHeight: quantity('length', HEIGHT, HEIGHT_DESCRIPTION),
    peakPeriod: quantity('time', PERIOD, 'Period of the spectral peak.'),
  },
  'A swell: by significantHeight and peakPeriod.',
);

const MEASURED_SCHEMA = section(
  {
    kind: z
      .literal('measured')
      .meta({ description: 'A sea that a buoy or another instrument has measured.' }),
    ...NAME_FIELD,
    ...MEASURED_FIELDS,
    ...WIND_FIELDS,
    ...SCALE_FIELD,
  },
  'A measured sea: by a table, or by the files of a buoy and a time.',
);

export const SYSTEM_SCHEMA: z.ZodType<SystemDocument> = z.discriminatedUnion(
  'kind',
  [WIND_SEA_SCHEMA, SWELL_SCHEMA, MEASURED_SCHEMA],
  {
    error: (issue) =>
      issue.code === 'invalid_union'
        ? checkMessage(
            'one of wind-sea, swell, measured',
            'Say which kind of waves these are, e.g. `kind: wind-sea`.',
          )
        : checkMessage(
            'a wave system (a group of keys)',
            'Begin it with `- kind: wind-sea`, `- kind: swell` or `- kind: measured`.',
          ),
  },
);
