import type { CascadeReport, Plan, PlannedCascade } from '../index.ts';
import { loopSeconds } from '../index.ts';
import type { Section } from './plan-report.ts';
import { numbers, paragraph, tableLines, words } from './table.ts';
import { metres, percent, rounded, seconds } from './wording.ts';

const COLUMNS = [
  words('', ''),
  numbers('patch', 'length'),
  numbers('', 'texels'),
  numbers('longest', 'wave'),
  numbers('shortest', 'wave'),
  numbers('height', 'share'),
  numbers('slope', 'share'),
  numbers('waves', 'across'),
  numbers('vertex', 'spacing'),
  numbers('waves', 'in all'),
  numbers('', 'repeats'),
  numbers('', 'loop'),
];

/** The tiles, and what none of them covers. */
export function cascadesSection({ cascades, report }: Plan): Section {
  const rows = cascades.map((cascade, c) => cascadeRow(cascade, report.cascades[c]));
  return {
    heading: 'Cascades',
    lines: [
      ...tableLines(COLUMNS, rows),
      '',
      ...paragraph(
        'Shares are of the variance of height, and of slope in waves longer than 0.1 m. Waves across are those at the ' +
          'long end of the band (of c0: the main waves); waves in all, how many carry the tile as effective number. ' +
          'Vertex spacing is that of a mesh with four vertices on the shortest wave. Repeats: how much of what the ' +
          'eye sees at the size of the tile comes round with it, 0.10 or less is good; c0 comes round as a whole.',
      ),
      '',
      ...lossLines(report.losses),
    ],
  };
}

function cascadeRow({ id, patchLengthM, resolution, loop }: PlannedCascade, report: CascadeReport): string[] {
  return [
    id,
    metres(patchLengthM, 6),
    String(resolution),
    metres(report.longestWavelengthM),
    metres(report.shortestWavelengthM),
    percent(report.heightVarianceShare),
    percent(report.slopeVarianceShare),
    rounded(report.wavesAcross),
    metres(report.vertexSpacingM, 2),
    String(Math.round(report.effectiveWaves)),
    report.repetition === null ? 'whole' : report.repetition.toFixed(2),
    seconds(loopSeconds(loop)),
  ];
}

function lossLines({
  notInAnyCascade,
  zeroCells,
  tooFastForFrames,
  slopeVarianceLeftOut,
  gaps,
}: Plan['report']['losses']): string[] {
  const missing = gaps.map(
    ({ longestWavelengthM, shortestWavelengthM }) =>
      `No cascade holds waves between ${metres(longestWavelengthM)} and ${metres(shortestWavelengthM)}.`,
  );
  const left =
    `Left out, of the sea's energy: ${percent(notInAnyCascade)} in no cascade, ${percent(zeroCells)} in waves longer ` +
    `than the patch, ${percent(tooFastForFrames)} too fast for the frame rate.`;
  const roughness =
    `Left to the shader as roughness: a slope variance (both axes) of ${rounded(slopeVarianceLeftOut)}, ` +
    `an rms slope of ${rounded(Math.sqrt(slopeVarianceLeftOut))}, in waves down to 0.1 m.`;
  return [...missing, left, roughness].flatMap(paragraph);
}
