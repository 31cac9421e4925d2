import type { BakeResult, Manifest, Plan, VerifyReport } from '../index.ts';
import { threadWords } from './plan-report-cost.ts';
import { type Field, fieldLines } from './table.ts';
import { byteSize, counted, duration, metres, percent, rounded } from './wording.ts';

/** What was baked, what it holds, what was lost, where it is and how long it took. */
export function bakeSummary(
  plan: Plan,
  { folder, manifest, run }: BakeResult,
  checked: VerifyReport | null,
): string {
  const cascades = plan.cascades
    .map(({ id, resolution }) => `${id} ${resolution} x ${resolution}`)
    .join(', ');
  const maps = plan.cascades[0].maps.map(({ map }) => map).join(', ');
  const fields: Field[] = [
    ['baked', `${plan.title}: ${maps}; ${cascades}; ${counted(plan.loop.frameCount, 'frame')} a loop`],
    ...(manifest === null ? [] : resultFields(manifest)),
    ...(checked === null ? [] : [['checked', checkedWords(checked)] as const]),
    ['files', `${folder}${manifest === null ? ' (some frames only: no foam, no manifest yet)' : ''}`],
    ['took', runWords(run)],
  ];
  return `${fieldLines(fields).join('\n')}\n`;
}

/** What a gather has made of shards. */
export function gatherSummary({ folder, manifest, run }: BakeResult, checked: VerifyReport | null): string {
  const fields: Field[] =
    manifest === null
      ? [['gathered', 'a part of the foam; gather without --part once all parts are made']]
      : [['gathered', manifest.title], ...resultFields(manifest)];
  if (checked !== null) fields.push(['checked', checkedWords(checked)]);
  return `${fieldLines([...fields, ['files', folder], ['took', runWords(run)]]).join('\n')}\n`;
}

function runWords(run: BakeResult['run']): string {
  const made = `${counted(run.framesMade, 'frame')} made${run.framesReused === 0 ? '' : `, ${run.framesReused} reused`}`;
  return `${duration(run.wallSeconds)} ${threadWords(run.threads)}: ${made}, ${byteSize(run.bytesWritten)} written`;
}

function resultFields({ statistics, losses, files, cascades }: Manifest): Field[] {
  const { target, measured } = statistics.significantHeightM;
  const got = measured === null ? 'not measured: no map holds it' : `got ${metres(measured)}`;
  const bytes = files.reduce((sum, file) => sum + file.bytes, 0);
  const foam = cascades.flatMap(({ id, foam }) => (foam === null ? [] : [foamWords(id, foam)]));
  return [
    ['height', `significant, asked ${metres(target)}, ${got}`],
    ['left out', lossWords(losses)],
    ...(foam.length === 0 ? [] : [['foam', foam.join('; ')] as const]),
    ...clippedFields(cascades),
    ['size', `${counted(files.length, 'file')}, ${byteSize(bytes)}`],
  ];
}

/** The quick checks of the finished files. */
function checkedWords({ checks }: VerifyReport): string {
  const judged = checks.filter(({ passed }) => passed !== null);
  const failed = judged.filter(({ passed }) => passed === false).length;
  const outcome = failed === 0 ? 'all passed' : `${failed} failed`;
  return `${counted(judged.length, 'quick check')}, ${outcome}; loopswell verify makes all of them`;
}

function lossWords({
  notInAnyCascade,
  zeroCells,
  tooFastForFrames,
  slopeVarianceLeftOut,
}: Manifest['losses']): string {
  const lost = notInAnyCascade + zeroCells + tooFastForFrames;
  return `${percent(lost)} of the sea's energy; a slope variance of ${rounded(slopeVarianceLeftOut)} is roughness for the shader`;
}

function foamWords(
  id: string,
  { coverage, note }: NonNullable<Manifest['cascades'][number]['foam']>,
): string {
  const target = coverage.target === null ? '' : ` of ${percent(coverage.target)}`;
  return `${id} covers ${percent(coverage.measured)}${target}${note === null ? '' : ` (${note})`}`;
}

/** Named only where there is something to name. */
function clippedFields(cascades: Manifest['cascades']): Field[] {
  const clipped = cascades.flatMap(({ id, maps }) =>
    Object.entries(maps).flatMap(([map, { channels }]) => {
      const texels = channels.reduce((sum, { written }) => sum + written.clipped, 0);
      return texels === 0 ? [] : [`${id} ${map} ${counted(texels, 'texel')}`];
    }),
  );
  return clipped.length === 0 ? [] : [['clipped', clipped.join(', ')]];
}

/** The same for machines: the manifest but for its list of files, which is in the folder, and the run. */
export function bakeJson({ folder, manifest, run }: BakeResult): string {
  const summary = manifest === null ? null : manifestSummary(manifest);
  return `${JSON.stringify({ folder, manifest: summary, run }, null, 2)}\n`;
}

function manifestSummary({ files, ...manifest }: Manifest): object {
  const bytes = files.reduce((sum, file) => sum + file.bytes, 0);
  return { ...manifest, files: { count: files.length, bytes } };
}
