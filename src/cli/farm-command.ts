import { join, resolve } from 'node:path';
import { Argument, type Command, InvalidArgumentError, Option } from 'commander';
import {
  bakeStatus,
  commandText,
  type EngineName,
  expectedMemoryBytes,
  FARM_DEFAULTS,
  FARM_TEMPLATES,
  type FarmFile,
  type FarmJob,
  type FarmTemplate,
  farmJob,
  farmTemplate,
  planText,
  slurmScripts,
  surveyedBake,
  UnavailableError,
  writeFileAtomic,
} from '../index.ts';
import { engineOption } from './engine-option.ts';
import { farmStatusReport } from './farm-status-report.ts';
import { type ProgramIo, say, writeResult } from './io.ts';
import { plannedInput } from './planned-input.ts';
import { threadsOption, watchedRun } from './run-options.ts';

interface FarmOptions {
  readonly output?: string;
  readonly tasks: number;
  readonly cpus: number;
  readonly mem?: number;
  readonly maxRunning?: number;
  readonly maxRequeues: number;
  readonly program?: string;
  readonly engine?: EngineName;
  readonly threads: number;
}

interface SlurmOptions extends FarmOptions {
  readonly partition?: string;
  readonly submit?: boolean;
}

const PLAN_FILE = 'plan.json';

/** `farm`: the same bake as shards, for the scheduler that is there. */
export function defineFarmCommand(command: Command, io: ProgramIo): void {
  withFarmOptions(command.command('slurm'))
    .description('Write the scripts of a Slurm job array, into a folder beside the bake.')
    .option('--partition <name>', 'partition of the farm (default: its own)')
    .option('--submit', 'submit them as well, and print the numbers of the jobs')
    .action(async (sea: string, options: SlurmOptions) => {
      const { job, folder } = await prepared(io, sea, options, io.program);
      writeFiles(folder, slurmScripts(job));
      const submit = join(folder, 'submit.sh');
      if (options.submit === true) await writeResult(io.stdout, submitted(io, submit));
      else await writeResult(io.stdout, `${submit}\n`);
    });
  withFarmOptions(command.command('template').addArgument(new Argument('<format>').choices(FARM_TEMPLATES)))
    .description('Write the same work for Open Job Description, Kubernetes or GNU parallel.')
    .action(async (format: FarmTemplate, sea: string, options: FarmOptions) => {
      // Other machines, or images of them, have the program by its name; this one by its path.
      const program = format === 'parallel' ? io.program : ['loopswell'];
      const { job, folder } = await prepared(io, sea, options, program);
      const file = farmTemplate(format, job);
      writeFiles(folder, [file]);
      await writeResult(io.stdout, `${join(folder, file.path)}\n`);
    });
  command
    .command('status')
    .description('Show what of a bake is done, being made and missing.')
    .argument('<folder>', 'the folder of the bake')
    .option('--json', 'print it as JSON')
    .action(async (folder: string, { json }: { readonly json?: boolean }) => {
      const status = bakeStatus(folder);
      await writeResult(
        io.stdout,
        json === true ? `${JSON.stringify(status, null, 2)}\n` : farmStatusReport(status),
      );
    });
}

function withFarmOptions(command: Command): Command {
  const whole = (name: string): ((text: string) => number) => {
    return (text) => {
      if (/^\d{1,9}$/.test(text)) return Number(text);
      throw new InvalidArgumentError(`Expected a whole number of ${name}.`);
    };
  };
  return command
    .argument('<sea>', 'a sea file, the name of a preset, or a saved plan')
    .option('-o, --output <folder>', 'where the bake goes, on a disk that all machines share')
    .addOption(
      new Option('--tasks <n>', 'shards that make the frames')
        .argParser(whole('tasks'))
        .makeOptionMandatory(),
    )
    .addOption(
      new Option('--cpus <n>', 'processors of a task')
        .argParser(whole('processors'))
        .default(FARM_DEFAULTS.cpus),
    )
    .addOption(
      new Option('--mem <MiB>', 'memory of a task (default: as the plan expects)').argParser(whole('MiB')),
    )
    .addOption(
      new Option('--max-running <n>', 'tasks that run at once (default: as the farm lets)').argParser(
        whole('tasks'),
      ),
    )
    .addOption(
      new Option('--max-requeues <n>', 'times that a stopped task is put back into the queue')
        .argParser(whole('times'))
        .default(FARM_DEFAULTS.maxRequeues),
    )
    .option('--program <path>', 'the program on those machines (default: this one, or loopswell)')
    .addOption(engineOption())
    .addOption(threadsOption().hideHelp());
}

interface Prepared {
  readonly job: FarmJob;
  /** Where the farm's files go: beside the bake, which holds nothing but the bake. */
  readonly folder: string;
}

/** Plans the sea with all ranges known, saves the plan, and fills in what the farm wants to know. */
async function prepared(
  io: ProgramIo,
  sea: string,
  options: FarmOptions,
  program: readonly string[],
): Promise<Prepared> {
  const { name, planned } = plannedInput(io, sea, options.engine);
  const bakeFolder = resolve(options.output ?? join('out', name));
  const folder = `${bakeFolder}-farm`;
  const { plan } = await watchedRun(io, false, (watch) =>
    surveyedBake(planned, { threads: options.threads, ...watch }),
  );
  const request = {
    program: options.program === undefined ? program : [options.program],
    planPath: join(folder, PLAN_FILE),
    bakeFolder,
    tasks: options.tasks,
    cpus: options.cpus,
    memoryMiB: options.mem ?? null,
    maxRunning: options.maxRunning ?? null,
    maxRequeues: options.maxRequeues,
    partition: 'partition' in options ? (options.partition as string) : null,
  };
  const job = farmJob(plan, request, (threads) => expectedMemoryBytes(plan, threads));
  writeFiles(folder, [{ path: PLAN_FILE, text: planText(plan), executable: false }]);
  return { job, folder };
}

function writeFiles(folder: string, files: readonly FarmFile[]): void {
  for (const { path, text, executable } of files)
    writeFileAtomic(folder, path, text, { sync: true, executable });
}

/** What the submit script has said: the numbers of the jobs. */
function submitted(io: ProgramIo, script: string): string {
  const { status, stdout, stderr } = io.runProgram(script);
  if (stderr !== '') say(io, stderr.trimEnd());
  if (status === 0) return stdout;
  throw new UnavailableError(
    `${commandText([script])} ${status === null ? 'cannot be run' : `ended with ${status}`}: the jobs are not submitted. Run it on a machine from which sbatch reaches the farm.`,
  );
}
