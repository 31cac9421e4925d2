import { UsageError } from '../errors.ts';
import type { Plan } from '../plan/plan.ts';
import { oneLine } from './shell.ts';

/** A bake as a farm sees it: tasks that make shards, and one more that joins them. */
export interface FarmJob {
  readonly title: string;
  /** Name of the jobs: letters, digits, dots and dashes. */
  readonly name: string;
  /** How the program is started. */
  readonly program: readonly string[];
  /** The saved plan that all tasks read, and the folder that they bake into: absolute, on a disk that all share. */
  readonly planPath: string;
  readonly bakeFolder: string;
  readonly tasks: number;
  /** Tasks that may run at once; null for as many as the farm lets. */
  readonly maxRunning: number | null;
  /** Processors of a task; as many threads make frames. */
  readonly cpus: number;
  /** Memory of a task, MiB. */
  readonly memoryMiB: number;
  /** Time limits of a task and of the gather, minutes. */
  readonly taskMinutes: number;
  readonly gatherMinutes: number;
  /** How often a task that was stopped may be put back into the queue. */
  readonly maxRequeues: number;
  /** Queue of the farm; null for its default. */
  readonly partition: string | null;
}

/** What a user may say about it; the rest follows from the plan. */
export interface FarmRequest {
  readonly program: readonly string[];
  readonly planPath: string;
  readonly bakeFolder: string;
  readonly tasks: number;
  readonly cpus?: number;
  /** MiB. */
  readonly memoryMiB?: number | null;
  readonly maxRunning?: number | null;
  readonly maxRequeues?: number;
  readonly partition?: string | null;
}

export const FARM_DEFAULTS: Readonly<{ cpus: number; maxRequeues: number }> = Object.freeze({
  cpus: 4,
  maxRequeues: 20,
});

/** A file to be written, its path relative to wherever the farm's files go. */
export interface FarmFile {
  readonly path: string;
  readonly text: string;
  /** Whether it is a program to be run. */
  readonly executable: boolean;
}

/**
 * Time limits are what the plan expects times this, for slow machines and full disks, and a quarter of an hour for
 * starting up: a limit that is too short costs a requeue, one that is too long keeps the task from small gaps.
 */
const TIME_FACTOR = 3;
const START_MINUTES = 15;
/** Share of the work that foam and its level take. */
const GATHER_SHARE = 0.3;
const MEMORY_FACTOR = 1.25;
const MEMORY_STEP_MIB = 128;
const MIB = 2 ** 20;

/**
 * Fills in what a farm wants to know.
 *
 * @param plan the plan the tasks are to bake
 * @param memoryBytes what a process with so many threads is expected to take
 * @throws UsageError for numbers and names that no farm takes
 */
export function farmJob(plan: Plan, request: FarmRequest, memoryBytes: (threads: number) => number): FarmJob {
  const { tasks, planPath, bakeFolder, program } = request;
  const { cpus = FARM_DEFAULTS.cpus, maxRequeues = FARM_DEFAULTS.maxRequeues } = request;
  const { maxRunning = null, partition = null, memoryMiB = null } = request;
  requireCount('--tasks', tasks, 1, 100_000);
  requireCount('--cpus', cpus, 1, 1024);
  requireCount('--max-requeues', maxRequeues, 0, 100_000);
  if (maxRunning !== null) requireCount('--max-running', maxRunning, 1, 100_000);
  if (memoryMiB !== null) requireCount('--mem', memoryMiB, 1, 2 ** 40);
  if (partition !== null && !/^[A-Za-z0-9_.,-]+$/.test(partition)) {
    throw new UsageError(`--partition ${JSON.stringify(partition)} is no name of a partition.`);
  }
  for (const text of [...program, planPath, bakeFolder]) requireOneLine(text);
  const minutes = plan.report.cost.coreSeconds / 60 / cpus;
  const expectedMiB = (MEMORY_FACTOR * memoryBytes(cpus)) / MIB;
  return {
    title: oneLine(plan.title),
    name: jobName(bakeFolder),
    program,
    planPath,
    bakeFolder,
    tasks,
    maxRunning,
    cpus,
    memoryMiB: memoryMiB ?? Math.ceil(expectedMiB / MEMORY_STEP_MIB) * MEMORY_STEP_MIB,
    taskMinutes: Math.ceil(START_MINUTES + (TIME_FACTOR * minutes) / tasks),
    gatherMinutes: Math.ceil(START_MINUTES + TIME_FACTOR * GATHER_SHARE * minutes),
    maxRequeues,
    partition,
  };
}

function requireCount(name: string, value: number, least: number, most: number): void {
  if (Number.isInteger(value) && value >= least && value <= most) return;
  throw new UsageError(`Expected ${name} to be a whole number from ${least} to ${most}, found ${value}.`);
}

/** A line break in a path could end one line of a script and begin another. */
function requireOneLine(text: string): void {
  if (text !== '' && text === oneLine(text)) return;
  throw new UsageError(`${JSON.stringify(text)} has characters that a script cannot hold on one line.`);
}

/** The folder's own name, in letters that every scheduler takes. */
function jobName(bakeFolder: string): string {
  const last = bakeFolder.split(/[\\/]/).findLast((part) => part !== '') ?? '';
  const name = last.replaceAll(/[^A-Za-z0-9.-]+/g, '-').replaceAll(/^[^A-Za-z0-9]+|[^A-Za-z0-9]+$/g, '');
  return name.slice(0, 40).toLowerCase() || 'bake';
}

/** Words of the command that makes one shard; the shard's number is as its argument has it. */
export function shardCommand(job: FarmJob, shard: string): readonly string[] {
  return [...job.program, 'bake', job.planPath, '-o', job.bakeFolder, '--shard', shard];
}

/** Words of the command that joins the shards. */
export function gatherCommand(job: FarmJob): readonly string[] {
  return [...job.program, 'gather', job.bakeFolder];
}
