import { join } from 'node:path';
import { type Command, Option } from 'commander';
import { BAKE_DEFAULTS, bake, type EngineName, type SyncPolicy, verifyBake } from '../index.ts';
import { bakeJson, bakeSummary } from './bake-summary.ts';
import { coloursOf } from './colours.ts';
import { engineOption } from './engine-option.ts';
import { type FrameRange, frameRange } from './frame-range.ts';
import { type ProgramIo, say, writeResult } from './io.ts';
import { printPlan } from './plan-command.ts';
import { warningLines } from './plan-report.ts';
import { plannedInput } from './planned-input.ts';
import { syncOption, threadsOption, watchedRun } from './run-options.ts';
import { requestedShard, type ShardRequest, shardArgument } from './shard-option.ts';
import { requirePassed } from './verdict.ts';

interface BakeCommandOptions {
  readonly output?: string;
  readonly engine?: EngineName;
  readonly threads: number;
  readonly frames?: FrameRange;
  readonly shard?: ShardRequest;
  readonly sync: SyncPolicy;
  readonly keepScratch?: boolean;
  readonly dryRun?: boolean;
  readonly quiet?: boolean;
  readonly json?: boolean;
  readonly force?: boolean;
  readonly verify: boolean;
}

/** `bake`: a sea in, a folder of maps with its manifest out. */
export function defineBakeCommand(command: Command, io: ProgramIo): void {
  command
    .argument('<sea>', 'a sea file, the name of a preset, or a saved plan')
    .option('-o, --output <folder>', 'where the files go (default: out/ and the name of the sea)')
    .addOption(engineOption())
    .addOption(threadsOption())
    .addOption(
      new Option('--frames <a-b>', 'make only these frames; a later bake reuses them').argParser(frameRange),
    )
    .addOption(
      new Option(
        '--shard <i/n>',
        'make only part i of n, for several machines at once; gather joins them. auto: as the scheduler says',
      ).argParser(shardArgument),
    )
    .addOption(syncOption())
    .option('--keep-scratch', 'keep the working files of the bake')
    .option('-n, --dry-run', 'print the plan and make nothing')
    .option('-q, --quiet', 'no progress, warnings and summary')
    .option('--json', 'print the result as JSON')
    .option('-f, --force', "replace another plan's bake in the folder")
    .option('--no-verify', 'leave out the quick checks of the finished files')
    .action((sea: string, options: BakeCommandOptions) => runBake(io, sea, options));
}

async function runBake(io: ProgramIo, sea: string, options: BakeCommandOptions): Promise<void> {
  const { name, planned } = plannedInput(io, sea, options.engine);
  const { plan } = planned;
  const { threads, json = false, quiet = false } = options;
  if (options.dryRun === true) return printPlan(io, plan, { json, threads });

  const { warnings } = plan.report;
  if (!quiet && warnings.length > 0) say(io, warningLines(warnings, coloursOf(io.stderr, io.env)).join('\n'));
  const shard = options.shard === undefined ? null : requestedShard(options.shard, io.env);
  const result = await watchedRun(io, quiet, (watch) =>
    bake(planned, options.output ?? join('out', name), {
      threads,
      frames: options.frames ?? null,
      shard,
      sync: options.sync,
      keepScratch: options.keepScratch ?? BAKE_DEFAULTS.keepScratch,
      force: options.force ?? BAKE_DEFAULTS.force,
      ...watch,
    }),
  );
  // Of the files as they lie on the disk; the full set is the command `verify`.
  const checked =
    result.manifest === null || !options.verify ? null : await verifyBake(result.folder, { checks: 'quick' });
  if (json) await writeResult(io.stdout, bakeJson(result));
  else if (!quiet) await writeResult(io.stdout, bakeSummary(plan, result, checked));
  if (checked !== null) requirePassed(checked);
}
