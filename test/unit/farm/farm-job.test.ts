import { describe, expect, it } from 'vitest';
import { UsageError } from '../../../src/errors.ts';
import { FARM_DEFAULTS, type FarmRequest, farmJob } from '../../../src/farm/farm-job.ts';
import { oneLine, quoted } from '../../../src/farm/shell.ts';
import { planBake } from '../../../src/plan/plan-bake.ts';
import { tinySea } from '../../support/tiny-seas.ts';

const { plan } = planBake(tinySea());
const REQUEST: FarmRequest = {
  program: ['loopswell'],
  planPath: '/shared/storm-farm/plan.json',
  bakeFolder: '/shared/Storm (final)!',
  tasks: 8,
};
const memory = (threads: number) => 200 * 2 ** 20 + threads * 100 * 2 ** 20;

/** The plan, expected to take another time. */
function planOf(coreSeconds: number): typeof plan {
  return { ...plan, report: { ...plan.report, cost: { ...plan.report.cost, coreSeconds } } };
}

describe('a job for a farm', () => {
  it('takes memory and time from the plan, with room to spare', () => {
    const job = farmJob(planOf(3600 * 4 * 8), REQUEST, memory);
    expect(job).toMatchObject({ ...FARM_DEFAULTS, tasks: 8, maxRunning: null, partition: null });
    // 600 MiB for four threads and a quarter more, in steps of 128.
    expect(job.memoryMiB).toBe(768);
    // An hour for each of 8 tasks of 4 processors; three times that, and a quarter of an hour.
    expect(job.taskMinutes).toBe(195);
    expect(job.gatherMinutes).toBe(Math.ceil(15 + 3 * 0.3 * 8 * 60));
    expect(farmJob(plan, { ...REQUEST, memoryMiB: 100, cpus: 1 }, memory).memoryMiB).toBe(100);
  });

  it('is named after its folder, in letters that schedulers take', () => {
    const named = (bakeFolder: string) => farmJob(plan, { ...REQUEST, bakeFolder }, memory).name;
    expect(named('/shared/Storm (final)!')).toBe('storm-final');
    expect(named('C:\\bakes\\Gale 7\\')).toBe('gale-7');
    expect(named('/шторм')).toBe('bake');
    expect(named(`/x/${'long'.repeat(50)}`)).toHaveLength(40);
  });

  it.each([
    { tasks: 0 },
    { tasks: 1.5 },
    { tasks: 100_001 },
    { cpus: 0 },
    { maxRunning: 0 },
    { maxRequeues: -1 },
    { memoryMiB: 0 },
    { partition: 'farm\n#SBATCH --wrap=x' },
    { partition: '' },
    { bakeFolder: '/a\nb' },
    { planPath: '/a\u2028b' },
    { program: ['x\r'] },
    { program: [''] },
  ])('is refused with %o', (wrong) => {
    expect(() => farmJob(plan, { ...REQUEST, ...wrong }, memory)).toThrow(UsageError);
  });
});

it('words reach a shell as they are', () => {
  expect(quoted('/a/b-c_d.e:f@g%h+i=j,k1')).toBe('/a/b-c_d.e:f@g%h+i=j,k1');
  expect(quoted("it's $HOME")).toBe("'it'\\''s $HOME'");
  expect(quoted('')).toBe("''");
  expect(oneLine(' a\n#SBATCH\tb\u0000\u2029c ')).toBe('a #SBATCH b c');
});
