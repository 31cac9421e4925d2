import { InvalidArgumentError } from 'commander';
import { UsageError } from '../errors.ts';
import type { Part } from '../index.ts';
import type { ProgramIo } from './io.ts';

/** What `--shard` was given: a shard, or that the scheduler knows which; of how many, if that was said. */
export type ShardRequest = Part | { readonly auto: true; readonly count: number | null };

/** `2/8`; parts are counted from 1. */
export function partArgument(text: string): Part {
  const match = /^(\d{1,6})\/(\d{1,6})$/.exec(text);
  const [index, count] = [Number(match?.[1]), Number(match?.[2])];
  if (match !== null && index >= 1 && index <= count) return { index, count };
  throw new InvalidArgumentError('Expected part/parts counted from 1, for example 2/8.');
}

/** `2/8`, `auto`, or `auto/8`. */
export function shardArgument(text: string): ShardRequest {
  const match = /^auto(?:\/(\d{1,6}))?$/.exec(text);
  if (match === null) return partArgument(text);
  return { auto: true, count: match[1] === undefined ? null : Number(match[1]) };
}

/**
 * The shard that was asked for; `auto` takes it from what the scheduler has put into the environment: a Slurm job array
 * or a Kubernetes Indexed Job.
 *
 * @throws UsageError where the environment does not say
 */
export function requestedShard(request: ShardRequest, env: ProgramIo['env']): Part {
  if (!('auto' in request)) return request;
  const part = slurmShard(request.count, env) ?? indexedShard(request.count, env);
  if (part === null) {
    throw new UsageError(
      '--shard auto found neither SLURM_ARRAY_TASK_ID nor JOB_COMPLETION_INDEX in the environment: give part/parts, for example --shard 2/8.',
    );
  }
  const { index, count } = part;
  if (index >= 1 && index <= count) return part;
  throw new UsageError(
    `--shard auto made ${index}/${count} of the environment, which is no shard. Say of how many: --shard auto/8 takes tasks 1 to 8.`,
  );
}

/** Of `auto/n` the task's number is the shard's; of `auto` it counts from the array's first. */
function slurmShard(count: number | null, env: ProgramIo['env']): Part | null {
  const id = whole(env.SLURM_ARRAY_TASK_ID);
  if (id === null) return null;
  if (count !== null) return { index: id, count };
  const [first, step] = [whole(env.SLURM_ARRAY_TASK_MIN) ?? 1, whole(env.SLURM_ARRAY_TASK_STEP) ?? 1];
  return { index: (id - first) / step + 1, count: whole(env.SLURM_ARRAY_TASK_COUNT) ?? 1 };
}

/** An index counts from 0, and how many there are is not in the environment. */
function indexedShard(count: number | null, env: ProgramIo['env']): Part | null {
  const index = whole(env.JOB_COMPLETION_INDEX);
  if (index === null) return null;
  if (count !== null) return { index: index + 1, count };
  throw new UsageError(
    'An Indexed Job does not say how many completions it has: give them, for example --shard auto/8.',
  );
}

function whole(text: string | undefined): number | null {
  return text !== undefined && /^\d{1,9}$/.test(text) ? Number(text) : null;
}
