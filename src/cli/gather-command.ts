import { type Command, Option } from 'commander';
import { BAKE_DEFAULTS, gather, type Part, type SyncPolicy, verifyBake } from '../index.ts';
import { bakeJson, gatherSummary } from './bake-summary.ts';
import { type ProgramIo, writeResult } from './io.ts';
import { syncOption, threadsOption, watchedRun } from './run-options.ts';
import { partArgument } from './shard-option.ts';
import { requirePassed } from './verdict.ts';

interface GatherCommandOptions {
  readonly threads: number;
  readonly part?: Part;
  readonly sync: SyncPolicy;
  readonly keepScratch?: boolean;
  readonly quiet?: boolean;
  readonly json?: boolean;
  readonly verify: boolean;
}

/** `gather`: shards in, a finished bake out. */
export function defineGatherCommand(command: Command, io: ProgramIo): void {
  command
    .argument('<folder>', 'the folder that the shards were baked into')
    .addOption(threadsOption())
    .addOption(
      new Option(
        '--part <i/n>',
        'make only part i of n of the foam; a gather without it then ends the bake',
      ).argParser(partArgument),
    )
    .addOption(syncOption())
    .option('--keep-scratch', 'keep the working files of the bake')
    .option('-q, --quiet', 'no progress and summary')
    .option('--json', 'print the result as JSON')
    .option('--no-verify', 'leave out the quick checks of the finished files')
    .action((folder: string, options: GatherCommandOptions) => runGather(io, folder, options));
}

async function runGather(io: ProgramIo, folder: string, options: GatherCommandOptions): Promise<void> {
  const { threads, part = null, sync, json = false, quiet = false } = options;
  const keepScratch = options.keepScratch ?? BAKE_DEFAULTS.keepScratch;
  const result = await watchedRun(io, quiet, (watch) =>
    gather(folder, { threads, part, sync, keepScratch, ...watch }),
  );
  const checked =
    result.manifest === null || !options.verify ? null : await verifyBake(result.folder, { checks: 'quick' });
  if (json) await writeResult(io.stdout, bakeJson(result));
  else if (!quiet) await writeResult(io.stdout, gatherSummary(result, checked));
  if (checked !== null) requirePassed(checked);
}
