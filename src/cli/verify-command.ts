import type { Command } from 'commander';
import { VERIFY_DEFAULTS, verifyBake, verifyReportLines } from '../index.ts';
import { type FrameRange, frameRange } from './frame-range.ts';
import { type ProgramIo, writeResult } from './io.ts';
import { progressDisplay } from './progress.ts';
import { stoppable } from './stoppable.ts';
import { requirePassed } from './verdict.ts';

interface VerifyCommandOptions {
  readonly frames?: FrameRange;
  readonly quick?: boolean;
  readonly quiet?: boolean;
  readonly json?: boolean;
}

/** `verify`: proves a finished bake from its manifest and files alone. */
export function defineVerifyCommand(command: Command, io: ProgramIo): void {
  command
    .argument('<bake>', 'folder of a finished bake')
    .option(
      '--frames <a-b>',
      'look at these frames only; what needs the whole loop is not judged',
      frameRange,
    )
    .option('--quick', 'only the checks that a few frames can settle')
    .option('-q, --quiet', 'no progress')
    .option('--json', 'print the report as JSON')
    .action((folder: string, options: VerifyCommandOptions) => runVerify(io, folder, options));
}

async function runVerify(io: ProgramIo, folder: string, options: VerifyCommandOptions): Promise<void> {
  const progress = await progressDisplay(io, options.quiet === true);
  const report = await stoppable(
    io,
    () => progress.end(),
    async (signal) => {
      try {
        return await verifyBake(folder, {
          frames: options.frames ?? null,
          checks: options.quick === true ? 'quick' : VERIFY_DEFAULTS.checks,
          onProgress: ({ done, total }) => progress.update({ stage: 'verify', done, total }),
          signal,
        });
      } finally {
        progress.end();
      }
    },
  );
  const text = options.json === true ? JSON.stringify(report, null, 2) : verifyReportLines(report).join('\n');
  await writeResult(io.stdout, `${text}\n`);
  requirePassed(report);
}
