import { readdirSync, readFileSync, rmSync, utimesSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, it } from 'vitest';
import { bakeStatus } from '../../../src/bake/status.ts';
import { InputError, StoppedError } from '../../../src/errors.ts';
import { sha256 } from '../../../src/hash.ts';
import { planBake } from '../../../src/plan/plan-bake.ts';
import { inlineBake, inTemporaryFolder, stopAfter } from '../../support/bakes.ts';
import { endedProcessId } from '../../support/foreign-process.ts';
import { tinyTwoCascadeSea } from '../../support/tiny-seas.ts';

const planned = planBake(tinyTwoCascadeSea());

/** Writes the beginning of a journal as another process would. */
function beginJournal(folder: string, name: string, host: string, pid: number, ageS: number): void {
  const text = JSON.stringify({
    plan: planned.plan.hash,
    kind: 'begin',
    task: `shard of ${name}`,
    host,
    pid,
  });
  const path = join(folder, '.loopswell', `${name}.jsonl`);
  writeFileSync(path, `${text.slice(0, -1)},"check":"${sha256(text).slice(7, 23)}"}\n`);
  const timeS = Date.now() / 1000 - ageS;
  utimesSync(path, timeS, timeS);
}

/** This host, as journals name it. */
function hostOf(folder: string): string {
  const [name] = readdirSync(join(folder, '.loopswell')).filter((path) => path.endsWith('.jsonl'));
  return JSON.parse(readFileSync(join(folder, '.loopswell', name), 'utf8').split('\n')[0]).host;
}

it('names what is missing, by cascade and frame, also files that went missing', async () => {
  await inTemporaryFolder(async (folder) => {
    await inlineBake(planned, folder, { frames: { first: 2, last: 8 } });
    rmSync(join(folder, 'c1/normal.0005.png'));
    writeFileSync(join(folder, 'c1/displacement.0006.exr'), 'cut');
    const status = bakeStatus(folder);
    expect(status).toMatchObject({ folder, finished: false, planHash: planned.plan.hash, notices: [] });
    expect(status.cascades.map(({ id, frames }) => [id, frames])).toEqual([
      ['c0', { total: 8, missing: [1] }],
      ['c1', { total: 8, missing: [1, 5, 6] }],
    ]);
    expect(status.cascades.map(({ foam }) => foam?.missing.length)).toEqual([8, 8]);
  });
});

it('tells of every process whether it runs, is silent, or how it ended', async () => {
  await inTemporaryFolder(async (folder) => {
    await inlineBake(planned, folder, { shard: { index: 1, count: 2 } });
    await expect(inlineBake(planned, folder, stopAfter('frames', 10))).rejects.toThrow(StoppedError);
    const host = hostOf(folder);
    beginJournal(folder, 'x-alive', host, process.pid, 3000);
    beginJournal(folder, 'x-dead', host, endedProcessId(), 1);
    beginJournal(folder, 'y-heard', 'elsewhere', 1, 60);
    beginJournal(folder, 'y-silent', 'elsewhere', 1, 700);
    const { processes } = bakeStatus(folder);
    const states = new Map(processes.map(({ task, state }) => [task, state]));
    expect(Object.fromEntries(states)).toEqual({
      'shard 1/2': 'done',
      bake: 'stopped',
      'shard of x-alive': 'running',
      'shard of x-dead': 'silent',
      'shard of y-heard': 'running',
      'shard of y-silent': 'silent',
    });
    const shard = processes.find(({ task }) => task === 'shard 1/2');
    expect(shard).toMatchObject({ host, pid: process.pid, made: 8 });
    expect(shard?.lastSignS).toBeLessThan(600);
    expect(processes.find(({ task }) => task === 'shard of y-silent')?.lastSignS).toBeGreaterThan(699);
  });
});

it('is finished once the manifest is there', async () => {
  await inTemporaryFolder(async (folder) => {
    await inlineBake(planned, folder);
    expect(bakeStatus(folder)).toMatchObject({
      finished: true,
      cascades: [],
      processes: [],
      title: planned.plan.title,
    });
  });
});

it('is an error where there is no bake, or a plan or manifest is damaged', async () => {
  await inTemporaryFolder(async (folder) => {
    expect(() => bakeStatus(folder)).toThrow(InputError);
    expect(() => bakeStatus(join(folder, 'none'))).toThrow(/expected the folder of a bake/);
    await inlineBake(planned, folder, { frames: { first: 1, last: 1 } });
    writeFileSync(join(folder, '.loopswell/plan.json'), '{}');
    expect(() => bakeStatus(folder)).toThrow(InputError);
  });
});
