import type { Plan, PlannedSystem, SystemReport } from '../index.ts';
import type { Section } from './plan-report.ts';
import { type Field, fieldLines, indented } from './table.ts';
import { bearing, counted, degrees, metres, percent, rounded, seconds } from './wording.ts';

/** Every wave system with all its numbers, and what the tiles do to it. */
export function systemsSection({ systems, report }: Plan): Section {
  const lines = systems.flatMap((system, s) => [
    `${system.name} (${system.kind})`,
    ...indented(fieldLines([...systemFields(system, report.systems[s]), latticeField(report.systems[s])], 2)),
  ]);
  return { heading: 'Wave systems', lines };
}

function systemFields(system: PlannedSystem, { heightVarianceShare }: SystemReport): Field[] {
  const wind: Field[] =
    system.windSpeedMps === null ? [] : [['wind', `${rounded(system.windSpeedMps)} m/s at 10 m`]];
  return [
    ['made from', system.basis],
    [
      'waves',
      `significant height ${metres(system.significantHeightM)}, peak period ${seconds(system.peakPeriodS)}, ` +
        `peak wavelength ${metres(system.peakWavelengthM)}; ${percent(heightVarianceShare)} of the sea's energy`,
    ],
    ['direction', `from ${bearing(system.fromRad)}, toward ${bearing(system.fromRad + Math.PI)}`],
    ...wind,
    ['spectrum', formWords(system.spectrum)],
    ['spreading', formWords(system.spreading)],
    ['against it', `${percent(system.againstShare)} of the waves kept`],
  ];
}

function latticeField(report: SystemReport): Field {
  const { meanFrequencyShift, meanDirectionShiftRad, effectiveWaves, zeroCellShare } = report;
  return [
    'on the tiles',
    `carried by ${counted(Math.round(effectiveWaves), 'wave')}; mean frequency shifted by ` +
      `${percent(meanFrequencyShift)}, mean direction by ${degrees(meanDirectionShiftRad)}; ` +
      `${percent(zeroCellShare)} of its energy lost in waves longer than the patch`,
  ];
}

const UNITS_OF_SUFFIXES: Readonly<Record<string, string>> = {
  RadPerS: ' rad/s',
  Rad: ' rad',
  Mps2: ' m/s2',
  Mps: ' m/s',
  M2PerHz: ' m2/Hz',
  Hz: ' Hz',
  M: ' m',
  S: ' s',
};

/**
 * A published form with its parameters, whichever they are: units are read off the names' suffixes, so that a new form
 * needs nothing here. `{form: 'jonswap', omegaPeakRadPerS: 2}` is `jonswap, omega peak 2 rad/s`.
 */
export function formWords(parameters: { readonly form: string }): string {
  const { form, ...numbers } = parameters;
  const parts = Object.entries(numbers).map(([name, value]) => {
    const [, stem, suffix = ''] = /^(.+?)(RadPerS|Rad|Mps2|Mps|M2PerHz|Hz|M|S)?$/.exec(
      name,
    ) as RegExpExecArray;
    const label = stem
      .replace(/(\d+)p(\d+)$/, ' at $1.$2 m')
      .replace(/[A-Z]/g, (letter) => ` ${letter.toLowerCase()}`);
    const text = parameterText(value);
    return `${label} ${text}${UNITS_OF_SUFFIXES[suffix] ?? ''}`;
  });
  return [form, ...parts].join(', ');
}

function parameterText(value: unknown): string {
  if (typeof value === 'number') return rounded(value, 5);
  if (!Array.isArray(value)) return String(value);
  const numbers = value as number[];
  return `${numbers.length} values of ${rounded(Math.min(...numbers), 4)} to ${rounded(Math.max(...numbers), 4)}`;
}

/** The sum of the systems, and what of its height the cascades hold. */
export function seaSection({ report }: Plan): Section {
  const { sea } = report;
  return {
    heading: 'The sea they make',
    lines: fieldLines([
      [
        'asked for',
        `significant height ${metres(sea.significantHeightM)}, peak period ${seconds(sea.peakPeriodS)}, ` +
          `peak wavelength ${metres(sea.peakWavelengthM)}, ` +
          `mean zero-crossing period ${seconds(sea.meanZeroCrossingPeriodS)}`,
      ],
      [
        'in cascades',
        `significant height ${metres(sea.expectedHeightM)}, ` +
          `${percent(sea.expectedHeightM / sea.significantHeightM)} of what was asked for`,
      ],
    ]),
  };
}

export function waterSection({ water, current }: Plan): Section {
  const speed = Math.hypot(current.eastMps, current.northMps);
  const toward = bearing(Math.atan2(current.eastMps, current.northMps));
  return {
    heading: 'Water',
    lines: fieldLines([
      ['depth', water.depthM === Infinity ? 'deep' : metres(water.depthM, 6)],
      ['density', `${rounded(water.densityKgpm3, 6)} kg/m3`],
      ['surface tension', `${rounded(water.surfaceTensionNpm, 6)} N/m`],
      ['gravity', `${rounded(water.gravityMps2, 7)} m/s2`],
      ['current', speed === 0 ? 'none' : `${rounded(speed, 4)} m/s toward ${toward}`],
    ]),
  };
}

export function shapingSection({ shaping }: Plan): Section {
  const gains = shaping.bandGains.map(
    ({ shortestWavelengthM, longestWavelengthM, gain }) =>
      `waves of ${metres(shortestWavelengthM)} to ${metres(longestWavelengthM)} times ${rounded(gain, 4)}`,
  );
  return {
    heading: 'Shaping',
    lines: fieldLines([
      ['horizontal scale', `${rounded(shaping.horizontalScale, 4)} (1 is physical)`],
      [
        'against wind',
        `${rounded(shaping.againstWind, 4)} (share of the wind seas' energy against their wind that stays)`,
      ],
      ['match height', shaping.matchHeight ? 'yes: each tile has its expected height' : 'no'],
      ['amplitudes', shaping.amplitudes],
      ['band gains', gains.length === 0 ? 'none' : gains.join('; ')],
    ]),
  };
}
