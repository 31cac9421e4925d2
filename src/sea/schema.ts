import { z } from 'zod';
import type {
  CascadesDocument,
  LoopDocument,
  SeaDocument,
  ShapingDocument,
  WaterDocument,
} from './document.ts';
import { checkMessage, choice, flag, list, quantity, section, wholeNumber, wordOr } from './field-schema.ts';
import { FOAM_SCHEMA, MAPS_SCHEMA, OUTPUT_SCHEMA } from './output-schema.ts';
import { SYSTEM_SCHEMA } from './system-schema.ts';

const WATER_SCHEMA: z.ZodType<WaterDocument> = section(
  {
    depth: wordOr(
      'deep',
      Infinity,
      quantity('length', { min: 0.01, max: 12000, example: '20 m' }, 'Still-water depth.'),
      '`deep` or a depth from 0.01 m to 12000 m (a number in m or text in m, km, cm, mm, ft, nmi)',
      'Still-water depth, or `deep` (the default).',
    ).optional(),
    density: quantity(
      'density',
      { min: 100, max: 20000, example: '1025 kg/m3' },
      'Density of the water; default 1025 kg/m3.',
    ).optional(),
    surfaceTension: quantity(
      'surface tension',
      { min: 0, max: 1, example: '74.2 mN/m' },
      'Surface tension against air; default 0.0742 N/m.',
    ).optional(),
    gravity: quantity(
      'acceleration',
      { min: 0.1, max: 100, example: '9.80665 m/s2' },
      'Acceleration of gravity; default 9.80665 m/s2.',
    ).optional(),
    current: section(
      {
        speed: quantity('speed', { min: 0, max: 10, example: '1.5 kn' }, 'Speed of the current.'),
        toward: quantity(
          'direction',
          { min: -360, max: 360, example: '90 deg' },
          'Direction the current runs toward: clockwise from north, bare numbers in degrees.',
        ).optional(),
      },
      'A steady uniform current; default none.',
    ).optional(),
  },
  'The water the waves run on.',
);

const WAVELENGTH = { above: 0, max: 100000, example: '12 m' };

const SHAPING_SCHEMA: z.ZodType<ShapingDocument> = section(
  {
    bandGains: list(
      section(
        {
          longest: quantity('length', WAVELENGTH, 'Longest wavelength of the band.'),
          shortest: quantity('length', WAVELENGTH, 'Shortest wavelength of the band.'),
          gain: quantity(
            'ratio',
            { min: 0, max: 10, example: '150 %' },
            'Gain on the height of these waves.',
          ),
        },
        'Gain of one band of wavelengths.',
      ),
      0,
      32,
      'Gains per band of wavelengths; they act last, so the significant height changes and is reported.',
    ).optional(),
    againstWind: quantity(
      'ratio',
      { min: 0, max: 1, example: '0.2' },
      "Share of a wind sea's waves moving against its wind that stays; acts before the height is set; default 1.",
    ).optional(),
    horizontalScale: quantity(
      'ratio',
      { min: 0, max: 3, example: '1.2' },
      'Multiplies the horizontal displacement of linear theory: 1 (the default) is physical, 0 vertical only.',
    ).optional(),
    matchHeight: flag(
      "Scale each cascade so that the written loop has the cascade's expected height; default true.",
    ).optional(),
    amplitudes: choice(
      ['gaussian', 'deterministic'],
      '`gaussian` (the default) is a true random sea; `deterministic` gives each wave its expected amplitude.',
    ).optional(),
  },
  'Art direction.',
);

const FRAME_RATE_ERROR = checkMessage(
  'a frame rate from 0.1 to 1000 frames a second (a number, or a fraction such as `24000/1001`)',
  'Write for example `24`, `24 fps` or `24000/1001`.',
);

const LOOP_FIELDS = {
  seconds: quantity('time', { above: 0, max: 3600, example: '8 s' }, 'Length of the loop.').optional(),
  frameRate: z
    .union(
      [
        z
          .number({ error: FRAME_RATE_ERROR })
          .min(0.1, { error: FRAME_RATE_ERROR })
          .max(1000, { error: FRAME_RATE_ERROR }),
        z
          .string({ error: FRAME_RATE_ERROR })
          .regex(/^\s*[0-9]{1,7}(?:\.[0-9]{1,6}|\s*\/\s*[0-9]{1,7})?\s*(?:fps)?\s*$/, {
            error: FRAME_RATE_ERROR,
          }),
      ],
      { error: FRAME_RATE_ERROR },
    )
    .meta({
      description: 'Frames a second, exactly: a number or a fraction such as 24000/1001.',
      examples: [24, 30, '24000/1001'],
    })
    .optional(),
  frames: wholeNumber(
    1,
    100000,
    'Frames in the loop; frame N is frame 0 again and is not stored.',
  ).optional(),
};

const CASCADE_LOOP_SCHEMA = section(
  LOOP_FIELDS,
  'A loop of its own; what is left out is as in the whole loop, which must be a multiple of this one.',
);

const LOOP_SCHEMA: z.ZodType<LoopDocument> = section(
  {
    ...LOOP_FIELDS,
    firstFrame: wholeNumber(0, 10000000, 'Number of the first file of every cascade; default 1.').optional(),
  },
  'The loop: any two of seconds, frameRate and frames; default 8 s at 24 frames a second.',
);

const PATCH = { min: 0.05, max: 100000, example: '250 m' };

// The limits of resolution live in its cross-field rule, which can name the nearest power of two.
const RESOLUTION = wholeNumber(
  1,
  1000000,
  'Texels along each edge: a power of two from 16 to 8192; default 256.',
);

const CASCADES_SCHEMA: z.ZodType<CascadesDocument> = z
  .union(
    [
      z.literal('auto'),
      section(
        {
          count: wholeNumber(1, 8, 'Most cascades to plan; default 3.').optional(),
          resolution: RESOLUTION.optional(),
          shortestWavelength: quantity(
            'length',
            { min: 0.02, max: 1000, example: '0.25 m' },
            'Shortest wave wanted; default 0.25 m.',
          ).optional(),
          longestPatch: quantity(
            'length',
            PATCH,
            'Longest patch; planned from the waves by default.',
          ).optional(),
          headRoom: quantity(
            'ratio',
            { min: 0.1, max: 0.85, example: '0.5' },
            'Share of the Nyquist wavenumber at which a band ends; default 0.5, for tight budgets 0.7.',
          ).optional(),
          loops: list(
            z.union([z.literal('whole'), CASCADE_LOOP_SCHEMA], {
              error: checkMessage('`whole` or a loop', 'Write `whole` or for example `{ seconds: 4 }`.'),
            }),
            1,
            8,
            'Loops of single cascades, longest patch first: `whole` or a loop.',
          ).optional(),
        },
        'Cascades planned from the waves.',
      ),
      list(
        section(
          {
            patch: quantity('length', PATCH, 'Edge of the tile.'),
            resolution: RESOLUTION.optional(),
            band: section(
              {
                longest: quantity(
                  'length',
                  WAVELENGTH,
                  'Longest wave; default as the neighbour leaves it.',
                ).optional(),
                shortest: quantity('length', WAVELENGTH, 'Shortest wave; default four texels.').optional(),
              },
              'Wavelengths this cascade holds.',
            ).optional(),
            loop: CASCADE_LOOP_SCHEMA.optional(),
          },
          'One cascade.',
        ),
        1,
        8,
        'Cascades as stated, longest patch first.',
      ),
    ],
    {
      error: checkMessage(
        '`auto`, a group of keys (planned cascades) or a list of cascades',
        'Write for example `cascades: auto` or a list of `{ patch: 250 m, resolution: 256 }`.',
      ),
    },
  )
  .meta({ description: 'How the sea is divided over square tiles; default `auto`.' });

const TITLE_ERROR = checkMessage(
  'a title of 1 to 200 characters on one line',
  'Name the sea in a few words.',
);

/** The sections of a sea file, each checked on its own so that a fault in one hides none in another. */
export const SECTION_SCHEMAS: { readonly [K in keyof SeaDocument]-?: z.ZodType<SeaDocument[K]> } = {
  seaFile: z
    .literal(1, {
      error: checkMessage('`1`, the version of the sea file format', 'Begin the file with `seaFile: 1`.'),
    })
    .meta({ description: 'Version of the sea file format.' }),
  $schema: z
    .string({ error: checkMessage('the address of a JSON Schema', 'Remove it if no editor needs it.') })
    .meta({ description: 'For editors of JSON files; without effect.' })
    .optional(),
  title: z
    .string({ error: TITLE_ERROR })
    .min(1, { error: TITLE_ERROR })
    .max(200, { error: TITLE_ERROR })
    .regex(/^[^\p{Cc}\p{Zl}\p{Zp}]*$/u, { error: TITLE_ERROR })
    .regex(/\S/u, { error: TITLE_ERROR })
    .meta({ description: 'What this sea is, in a few words.' }),
  seed: wholeNumber(0, 4294967295, 'Chooses the random sea; default 1.').optional(),
  water: WATER_SCHEMA.optional(),
  systems: list(SYSTEM_SCHEMA, 1, 16, 'Wave systems; the sea is their sum.'),
  shaping: SHAPING_SCHEMA.optional(),
  loop: LOOP_SCHEMA.optional(),
  cascades: CASCADES_SCHEMA.optional(),
  foam: FOAM_SCHEMA.optional(),
  maps: MAPS_SCHEMA.optional(),
  output: OUTPUT_SCHEMA.optional(),
};

/** A whole sea file. */
export const SEA_SCHEMA: z.ZodType<SeaDocument> = section(
  SECTION_SCHEMAS,
  'A sea to bake into looping maps.',
);
