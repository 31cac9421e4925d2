import { expectedMemoryBytes, type Plan } from '../index.ts';
import type { Section } from './plan-report.ts';
import { fieldLines } from './table.ts';
import { byteSize, counted, duration } from './wording.ts';

/** What a bake takes: files, disk, memory and time. */
export function costSection(plan: Plan, threads: number): Section {
  const { files, outputBytes, scratchBytes, coreSeconds } = plan.report.cost;
  const scratch = scratchBytes === 0 ? '' : `, and ${byteSize(scratchBytes)} more while it runs`;
  const crew = threadWords(threads);
  return {
    heading: 'Cost (estimates)',
    lines: fieldLines([
      ['files', String(files)],
      ['disk', `${byteSize(outputBytes)}${scratch}`],
      ['memory', `${byteSize(expectedMemoryBytes(plan, threads))} ${crew}`],
      ['time', `${duration(coreSeconds / Math.max(1, threads))} ${crew}`],
    ]),
  };
}

/** `with 2 threads`; 0 threads is the main thread alone. */
export function threadWords(threads: number): string {
  return threads === 0 ? 'in the main thread' : `with ${counted(threads, 'thread')}`;
}
