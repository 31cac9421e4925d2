import { z } from 'zod';
import type { FoamDocument, MapDocument, MapsDocument, OutputDocument } from './document.ts';
import { checkMessage, choice, flag, list, quantity, section, wholeNumber, wordOr } from './field-schema.ts';
import { MAP_NAMES, type MapName } from './sea.ts';

export const FOAM_SCHEMA: z.ZodType<FoamDocument> = z
  .union(
    [
      z.literal('off'),
      section(
        {
          coverage: wordOr<number | 'wind'>(
            'wind',
            'wind',
            quantity('ratio', { above: 0, max: 0.9, example: '2 %' }, 'Share of the area under foam.'),
            '`wind` or a share of the area above 0 to 0.9 (a number or text in %)',
            "Mean of the foam map: `wind` (the default: Monahan & O'Muircheartaigh 1980) or a share of the area.",
          ).optional(),
          breakingLevel: quantity(
            'ratio',
            { min: -1, max: 0.9, example: '0.7' },
            'In place of a coverage: foam arises where the Jacobian falls below this.',
          ).optional(),
          decayTime: quantity(
            'time',
            { min: 0.01, max: 3600, example: '2.5 s' },
            'Time in which foam fades to 37 %; default 3.85 s, but at most a third of the loop.',
          ).optional(),
          residue: choice(
            ['remove', 'keep'],
            'What a short loop leaves behind of every breaker: `remove` (the default) or `keep`.',
          ).optional(),
          shares: list(
            quantity('ratio', { min: 0, max: 1, example: '0.5' }, 'Share of one cascade.'),
            1,
            8,
            'Shares of the coverage by cascade, longest patch first; they add up to 1.',
          ).optional(),
        },
        'How much foam, and how long it stays.',
      ),
    ],
    {
      error: checkMessage(
        '`off` or a group of keys',
        'Write `foam: off` or for example `foam: { coverage: 2 % }`.',
      ),
    },
  )
  .meta({ description: 'Foam; default by the wind where a wind speed is given, else off.' });

const RANGE_ERROR = checkMessage(
  'a range (`6 sigmas`, `survey`, `natural`, or the largest magnitude with its unit)',
  'Write for example `6 sigmas` or `2.5 m`.',
);

const FORMAT = choice(['exr', 'png'], 'File format.');

const MAP_FIELDS = section(
  {
    format: FORMAT,
    sample: choice(['half', 'float'], 'Samples of an exr; default `half`.').optional(),
    bits: z
      .literal([8, 16], { error: checkMessage('8 or 16', 'Write `bits: 16`.') })
      .meta({ description: 'Bits of a png; default 8 for normal and foam, 16 for the others.' })
      .optional(),
    range: z
      .union(
        [
          z.number({ error: RANGE_ERROR }).gt(0, { error: RANGE_ERROR }).max(1000000, { error: RANGE_ERROR }),
          z.string({ error: RANGE_ERROR }).min(1, { error: RANGE_ERROR }).max(40, { error: RANGE_ERROR }),
        ],
        { error: RANGE_ERROR },
      )
      .meta({
        description:
          'Range of a png: `6 sigmas` (the default at 16 bits), `survey` (a pass over the loop; the default at 8 bits), ' +
          '`natural`, or the largest magnitude with its unit.',
        examples: ['6 sigmas', 'survey', '2.5 m'],
      })
      .optional(),
    dither: flag(
      'Dither before rounding to 8 bits, the same in every run; default true but for foam.',
    ).optional(),
  },
  'Format and coding of one map.',
);

const MAP_SCHEMA: z.ZodType<MapDocument> = z.union([FORMAT, MAP_FIELDS], {
  error: checkMessage(
    'exr, png or a group of the keys format, sample, bits, range, dither',
    'Write for example `normal: png` or `{ format: png, bits: 16 }`.',
  ),
});

const MAP_DESCRIPTIONS: Record<MapName, string> = {
  displacement: 'Displacement of the surface: east, north, up.',
  height: 'Vertical displacement alone.',
  velocity: 'Velocity of the surface.',
  slope: 'Slopes of the height: east, north.',
  strain: 'Gradient of the horizontal displacement: east-east, north-north, east-north.',
  normal: 'Normal of the displaced surface.',
  jacobian: 'Area ratio of the displaced surface; small where it is compressed.',
  foam: 'Foam that arises at crests and fades.',
};

const MAP_SHAPE = Object.fromEntries(
  MAP_NAMES.map((map) => [map, MAP_SCHEMA.meta({ description: MAP_DESCRIPTIONS[map] }).optional()]),
);

export const MAPS_SCHEMA: z.ZodType<MapsDocument> = section(
  MAP_SHAPE,
  'The maps to write; default displacement as half-float exr, normal and foam as 8-bit png.',
);

export const OUTPUT_SCHEMA: z.ZodType<OutputDocument> = section(
  {
    axes: choice(
      ['z-up', 'y-up'],
      'Axes of displacement and velocity: z-up (the default) or y-up.',
    ).optional(),
    rowZero: choice(
      ['north', 'south'],
      'Edge in the first image row: north (the default) or south.',
    ).optional(),
    normalGreen: choice(['north', 'south'], 'Where the green of a normal points; default north.').optional(),
    lengthUnit: choice(['m', 'cm'], 'Unit of displacement in the files; default m.').optional(),
    exrChannels: choice(
      ['plain', 'layered'],
      '`plain` (the default): R, G, B, or Y alone; `layered`: displacement.X and so on.',
    ).optional(),
    padding: wholeNumber(4, 10, 'Least number of digits of a frame number; default 4.').optional(),
  },
  'Conventions of the files.',
);
