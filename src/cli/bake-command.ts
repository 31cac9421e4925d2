import { join } from 'node:path';
import { type Command, InvalidArgumentError, Option } from 'commander';
import { BAKE_DEFAULTS, bake, machineThreads, verifyBake } from '../index.ts';
import { bakeJson, bakeSummary } from './bake-summary.ts';
import { coloursOf } from './colours.ts';
import { type FrameRange, frameRange } from './frame-range.ts';
import { type ProgramIo, say, writeResult } from './io.ts';
import { printPlan } from './plan-command.ts';
import { warningLines } from './plan-report.ts';
import { plannedInput } from './planned-input.ts';
import { progressDisplay } from './progress.ts';
import { stoppable } from './stoppable.ts';
import { requirePassed } from './verdict.ts';

interface BakeCommandOptions {
  readonly output?: string;
  readonly threads: number;
  readonly frames?: FrameRange;
  readonly keepScratch?: boolean;
  readonly dryRun?: boolean;
  readonly quiet?: boolean;
  readonly json?: boolean;
  readonly force?: boolean;
  readonly verify: boolean;
}

/** More threads than any machine has are a slip of the finger. */
const MOST_THREADS = 1024;

/** `bake`: a sea in, a folder of maps with its manifest out. */
export function defineBakeCommand(command: Command, io: ProgramIo): void {
  command
    .argument('<sea>', 'a sea file, the name of a preset, or a saved plan')
    .option('-o, --output <folder>', 'where the files go (default: out/ and the name of the sea)')
    .addOption(
      new Option('--threads <n>', 'worker threads; 0 makes frames in the main thread')
        .argParser(threadCount)
        .default(BAKE_DEFAULTS.threads ?? machineThreads(), `${machineThreads()}, all of this machine`),
    )
    .addOption(
      new Option('--frames <a-b>', 'make only these frames; a later bake reuses them').argParser(frameRange),
    )
    .option('--keep-scratch', 'keep the working files of the bake')
    .option('-n, --dry-run', 'print the plan and make nothing')
    .option('-q, --quiet', 'no progress, warnings and summary')
    .option('--json', 'print the result as JSON')
    .option('-f, --force', "replace another plan's bake in the folder")
    .option('--no-verify', 'leave out the quick checks of the finished files')
    .action((sea: string, options: BakeCommandOptions) => runBake(io, sea, options));
}

async function runBake(io: ProgramIo, sea: string, options: BakeCommandOptions): Promise<void> {
  const { name, planned } = plannedInput(io, sea);
  const { plan } = planned;
  const { threads, json = false, quiet = false } = options;
  if (options.dryRun === true) return printPlan(io, plan, { json, threads });

  const { warnings } = plan.report;
  if (!quiet && warnings.length > 0) say(io, warningLines(warnings, coloursOf(io.stderr, io.env)).join('\n'));
  const progress = await progressDisplay(io, quiet);
  const announce = (signal: string): void => {
    progress.end();
    say(io, `${signal}: stopping after the frames in flight; once more stops at once.`);
  };
  const result = await stoppable(io, announce, async (signal) => {
    try {
      return await bake(planned, options.output ?? join('out', name), {
        threads,
        frames: options.frames ?? null,
        keepScratch: options.keepScratch ?? BAKE_DEFAULTS.keepScratch,
        force: options.force ?? BAKE_DEFAULTS.force,
        signal,
        onProgress: progress.update,
      });
    } finally {
      progress.end();
    }
  });
  // Of the files as they lie on the disk; the full set is the command `verify`.
  const checked =
    result.manifest === null || !options.verify ? null : await verifyBake(result.folder, { checks: 'quick' });
  if (json) await writeResult(io.stdout, bakeJson(result));
  else if (!quiet) await writeResult(io.stdout, bakeSummary(plan, result, checked));
  if (checked !== null) requirePassed(checked);
}

function threadCount(text: string): number {
  const count = Number(text);
  if (/^\d+$/.test(text) && count <= MOST_THREADS) return count;
  throw new InvalidArgumentError(`Expected a whole number from 0 to ${MOST_THREADS}.`);
}
