import { InvalidArgumentError } from 'commander';
import { describe, expect, it } from 'vitest';
import { requestedShard, shardArgument } from '../../../src/cli/shard-option.ts';
import { UsageError } from '../../../src/errors.ts';

describe('--shard', () => {
  it.each(['1/1', '2/8', '8/8', '1/100000'])('takes %s', (text) => {
    const [index, count] = text.split('/').map(Number);
    expect(requestedShard(shardArgument(text), {})).toEqual({ index, count });
  });

  it.each([
    '',
    '0/4',
    '5/4',
    '1',
    '1/',
    '/4',
    '-1/4',
    '1/4/2',
    '1.5/4',
    'a/b',
    'auto/',
    'auto/x',
    'automatic',
  ])('refuses "%s"', (text) => {
    expect(() => shardArgument(text)).toThrow(InvalidArgumentError);
  });
});

describe('--shard auto', () => {
  const auto = shardArgument('auto');
  const autoOf8 = shardArgument('auto/8');

  it.each([
    [{ SLURM_ARRAY_TASK_ID: '3', SLURM_ARRAY_TASK_MIN: '1', SLURM_ARRAY_TASK_COUNT: '8' }, '3/8'],
    [{ SLURM_ARRAY_TASK_ID: '0', SLURM_ARRAY_TASK_MIN: '0', SLURM_ARRAY_TASK_COUNT: '8' }, '1/8'],
    [{ SLURM_ARRAY_TASK_ID: '17', SLURM_ARRAY_TASK_MIN: '10', SLURM_ARRAY_TASK_COUNT: '8' }, '8/8'],
    [
      {
        SLURM_ARRAY_TASK_ID: '9',
        SLURM_ARRAY_TASK_MIN: '1',
        SLURM_ARRAY_TASK_COUNT: '3',
        SLURM_ARRAY_TASK_STEP: '4',
      },
      '3/3',
    ],
    // One task of an array, submitted again on its own: it makes whatever is missing.
    [{ SLURM_ARRAY_TASK_ID: '5', SLURM_ARRAY_TASK_MIN: '5', SLURM_ARRAY_TASK_COUNT: '1' }, '1/1'],
  ])('counts a Slurm array from its first task: %o is %s', (env, shard) => {
    const { index, count } = requestedShard(auto, env);
    expect(`${index}/${count}`).toBe(shard);
  });

  it.each([
    [{ SLURM_ARRAY_TASK_ID: '5', SLURM_ARRAY_TASK_MIN: '3', SLURM_ARRAY_TASK_COUNT: '2' }, '5/8'],
    [{ JOB_COMPLETION_INDEX: '0' }, '1/8'],
    [{ JOB_COMPLETION_INDEX: '7' }, '8/8'],
  ])('of a stated number takes the task itself: %o is %s', (env, shard) => {
    const { index, count } = requestedShard(autoOf8, env);
    expect(`${index}/${count}`).toBe(shard);
  });

  it('says what is wrong where the environment makes no shard', () => {
    expect(() => requestedShard(auto, {})).toThrow(
      /found neither SLURM_ARRAY_TASK_ID nor JOB_COMPLETION_INDEX/,
    );
    expect(() => requestedShard(auto, { JOB_COMPLETION_INDEX: '2' })).toThrow(/--shard auto\/8/);
    expect(() => requestedShard(autoOf8, { JOB_COMPLETION_INDEX: '8' })).toThrow(UsageError);
    expect(() => requestedShard(autoOf8, { SLURM_ARRAY_TASK_ID: '0' })).toThrow(/0\/8 of the environment/);
    expect(() =>
      requestedShard(auto, {
        SLURM_ARRAY_TASK_ID: '7',
        SLURM_ARRAY_TASK_MIN: '3',
        SLURM_ARRAY_TASK_COUNT: '2',
      }),
    ).toThrow(/5\/2/);
    expect(() => requestedShard(auto, { SLURM_ARRAY_TASK_ID: '-1; rm' })).toThrow(UsageError);
  });
});
