import type { BakeStatus, ProcessStatus, Progress } from '../index.ts';
import { frameRuns } from '../index.ts';
import { numbers, tableLines, words } from './table.ts';
import { counted, duration } from './wording.ts';

/** How far a bake is, for people. */
export function farmStatusReport({
  folder,
  title,
  finished,
  cascades,
  processes,
  notices,
}: BakeStatus): string {
  const lines = [`${title}: ${folder}`, ...notices];
  if (finished) lines.push('finished: the manifest is there');
  else lines.push('', ...cascadeLines(cascades));
  if (processes.length > 0) lines.push('', ...processLines(processes));
  return `${lines.join('\n')}\n`;
}

function cascadeLines(cascades: BakeStatus['cascades']): string[] {
  const row = (id: string, what: string, { total, missing }: Progress): string[] => [
    id,
    what,
    `${total - missing.length}/${total}`,
    frameRuns(missing) || '-',
  ];
  const rows = cascades.flatMap(({ id, frames, foam }) => [
    row(id, 'frames', frames),
    ...(foam === null ? [] : [row('', 'foam', foam)]),
  ]);
  const columns = [words('cascade'), words(''), numbers('done'), words('missing')];
  const lines = tableLines(columns, rows);
  const missing = cascades.some(({ frames }) => frames.missing.length > 0);
  return [...lines, missing ? 'frames are still to be made' : 'all frames are made: gather ends the bake'];
}

function processLines(processes: readonly ProcessStatus[]): string[] {
  const rows = processes.map(({ task, host, pid, state, made, lastSignS }) => [
    task,
    `${host} ${pid}`,
    state,
    counted(made, 'frame'),
    `${duration(lastSignS)} ago`,
  ]);
  return tableLines(
    [words('task'), words('process'), words('state'), numbers('made'), numbers('last sign')],
    rows,
  );
}
