import { spawnSync } from 'node:child_process';
import { chmodSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { parseAllDocuments } from 'yaml';
import { type FarmJob, gatherCommand, shardCommand } from '../../../src/farm/farm-job.ts';
import { slurmScripts } from '../../../src/farm/slurm.ts';
import { FARM_TEMPLATES, farmTemplate } from '../../../src/farm/templates.ts';
import { inTemporaryFolder } from '../../support/bakes.ts';

const JOB: FarmJob = {
  title: 'Storm off "Vane" $(touch /tmp/owned) `x` # \\',
  name: 'storm',
  program: ['/opt/node js/bin/node', "/opt/it's/main.js"],
  planPath: '/shared/$HOME/a b/plan.json',
  bakeFolder: '/shared/"quoted" {{Param.X}} {}/bake',
  tasks: 5,
  maxRunning: 2,
  cpus: 3,
  memoryMiB: 640,
  taskMinutes: 77,
  gatherMinutes: 33,
  maxRequeues: 4,
  partition: 'night',
};

/** Runs a script with programs of ours in the place of the scheduler's: each writes down what it was given. */
async function ranScript(
  text: string,
  job: (folder: string) => {
    readonly env: NodeJS.ProcessEnv;
    readonly replies: Readonly<Record<string, string>>;
  },
): Promise<{ readonly calls: readonly string[][]; readonly status: number | null; readonly stdout: string }> {
  return inTemporaryFolder(async (folder) => {
    const { env, replies } = job(folder);
    const calls = join(folder, 'calls');
    const bin = join(folder, 'bin');
    mkdirSync(bin);
    writeFileSync(calls, '');
    for (const [name, reply] of Object.entries(replies)) {
      const path = join(bin, name);
      writeFileSync(
        path,
        `#!/bin/bash\nprintf '%s\\0' ${name} "$@" >> '${calls}'\necho >> '${calls}'\n${reply}\n`,
      );
      chmodSync(path, 0o755);
    }
    const script = join(folder, 'script.sh');
    writeFileSync(script, text);
    const { status, stdout } = spawnSync('bash', [script], {
      encoding: 'utf8',
      env: { ...process.env, PATH: `${bin}:${process.env.PATH}`, ...env },
    });
    const lines = readFileSync(calls, 'utf8').split('\n').slice(0, -1);
    return { calls: lines.map((line) => line.split('\0').slice(0, -1)), status, stdout };
  });
}

const fileOf = (path: string, job: FarmJob = JOB): string =>
  slurmScripts(job).find((file) => file.path === path)?.text ?? '';

/** The script with the program by a name that is replied to. */
const withProgram = (path: string): string => fileOf(path, { ...JOB, program: ['swell'] });

const TASK = {
  SLURM_ARRAY_JOB_ID: '100',
  SLURM_ARRAY_TASK_ID: '3',
  SLURM_JOB_ID: '102',
  SLURM_CPUS_PER_TASK: '3',
};

describe('Slurm scripts', () => {
  it('are sound Bash and hand over every path as it is', async () => {
    for (const { text } of slurmScripts(JOB)) {
      expect(spawnSync('bash', ['-n'], { input: text, encoding: 'utf8' })).toMatchObject({
        status: 0,
        stderr: '',
      });
    }
    const frames = await ranScript(withProgram('frames.sh'), () => ({ env: TASK, replies: { swell: '' } }));
    const job = { ...JOB, program: ['swell'] };
    expect(frames.calls).toEqual([[...shardCommand(job, '3/5'), '--threads', '3']]);
    expect(frames.status).toBe(0);
    const gather = await ranScript(withProgram('gather.sh'), () => ({ env: TASK, replies: { swell: '' } }));
    expect(gather.calls).toEqual([[...gatherCommand(job), '--threads', '3']]);
  });

  it('ask for what the job needs', () => {
    const frames = fileOf('frames.sh');
    for (const line of [
      '#SBATCH --job-name=storm-frames',
      '#SBATCH --cpus-per-task=3',
      '#SBATCH --mem=640M',
      '#SBATCH --time=77',
      '#SBATCH --requeue',
      '#SBATCH --signal=B:TERM@60',
      '#SBATCH --partition=night',
      '#SBATCH --open-mode=append',
    ]) {
      expect(frames.split('\n')).toContain(line);
    }
    expect(fileOf('gather.sh').split('\n')).toContain('#SBATCH --time=33');
    expect(fileOf('frames.sh', { ...JOB, partition: null })).not.toContain('--partition');
  });

  it('submit the array and, after it, the gather', async () => {
    const submitted = await ranScript(fileOf('submit.sh'), () => ({
      env: {},
      replies: { sbatch: 'case "$2" in --array*) echo "7;farm";; *) echo 8;; esac' },
    }));
    expect(submitted.status).toBe(0);
    expect(submitted.stdout).toBe('frames 7\ngather 8\n');
    expect(submitted.calls).toEqual([
      ['sbatch', '--parsable', '--array=1-5%2', 'frames.sh'],
      ['sbatch', '--parsable', '--dependency=afterok:7', '--kill-on-invalid-dep=yes', 'gather.sh'],
    ]);
  });

  it('pass the status on, and ask for a requeue after 75 alone', async () => {
    for (const status of [0, 1, 65, 73, 75]) {
      const { calls, status: ended } = await ranScript(withProgram('frames.sh'), () => ({
        env: TASK,
        replies: { swell: `exit ${status}`, squeue: 'echo RUNNING', scontrol: '', sleep: '' },
      }));
      expect(ended).toBe(status);
      const asked = calls.filter(([name]) => name === 'scontrol');
      expect(asked).toEqual(status === 75 ? [['scontrol', 'requeue', '100_3']] : []);
    }
  });

  it.each([
    ['Slurm has already decided', 'CANCELLED', '0', 0],
    ['it is being put back already', 'COMPLETING', '0', 0],
    ['it was put back often enough', 'RUNNING', '4', 0],
    ['it may once more', 'RUNNING', '3', 1],
  ])('ask for a requeue or not where %s', async (_, state, restarts, times) => {
    const { calls, status } = await ranScript(withProgram('gather.sh'), () => ({
      env: { ...TASK, SLURM_RESTART_COUNT: restarts },
      replies: { swell: 'exit 75', squeue: `echo ${state}`, scontrol: '', sleep: '' },
    }));
    expect(calls.filter(([name]) => name === 'scontrol').length).toBe(times);
    expect(status).toBe(75);
  });

  it('pass a TERM on to the program and wait for it', async () => {
    // The program tells the shell to end, as Slurm would, and then needs a while for its own end.
    const swell = `trap 'told=1' TERM
kill -TERM $PPID
for i in 1 2 3 4 5 6 7 8 9 10; do /bin/sleep 0.1; [ "$told" = 1 ] && break; done
/bin/sleep 0.3
[ "$told" = 1 ] && exit 75
exit 9`;
    const { status, calls } = await ranScript(withProgram('frames.sh'), () => ({
      env: TASK,
      replies: { swell, squeue: 'echo RUNNING', scontrol: '', sleep: '' },
    }));
    expect(status).toBe(75);
    expect(calls.filter(([name]) => name === 'scontrol').length).toBe(1);
  });
});

describe('templates', () => {
  it.each(FARM_TEMPLATES)('of %s hold the title on a line of its comments', (name) => {
    const { text } = farmTemplate(name, JOB);
    const lines = text.split('\n').filter((line) => line.includes('Storm off'));
    expect(lines).toHaveLength(1);
    expect(lines[0]).toMatch(/^# /);
  });

  it('of Open Job Description name the parts of its schema', () => {
    const [document] = parseAllDocuments(farmTemplate('openjd', JOB).text).map((parsed) => parsed.toJS());
    expect(document).toMatchObject({
      specificationVersion: 'jobtemplate-2023-09',
      name: 'storm',
      parameterDefinitions: [
        { name: 'Plan', type: 'PATH', default: JOB.planPath },
        { name: 'Bake', type: 'PATH', default: JOB.bakeFolder },
      ],
      steps: [
        {
          name: 'Frames',
          parameterSpace: { taskParameterDefinitions: [{ name: 'Shard', type: 'INT', range: '1-5' }] },
          hostRequirements: {
            amounts: [
              { name: 'amount.worker.vcpu', min: 3 },
              { name: 'amount.worker.memory', min: 640 },
            ],
          },
          script: { actions: { onRun: { command: JOB.program[0], timeout: 77 * 60 } } },
        },
        { name: 'Gather', dependencies: [{ dependsOn: 'Frames' }] },
      ],
    });
  });

  it('of Kubernetes are an Indexed Job and one that waits', () => {
    const documents = parseAllDocuments(farmTemplate('kubernetes', JOB).text).map((parsed) => parsed.toJS());
    expect(documents).toMatchObject([
      {
        apiVersion: 'batch/v1',
        kind: 'Job',
        metadata: { name: 'storm-frames' },
        spec: { completionMode: 'Indexed', completions: 5, parallelism: 2, backoffLimit: 4 },
      },
      { apiVersion: 'batch/v1', kind: 'Job', metadata: { name: 'storm-gather' }, spec: { suspend: true } },
    ]);
    const [{ spec }] = documents;
    const [container] = spec.template.spec.containers;
    expect(container.command).toEqual([...shardCommand(JOB, 'auto/5'), '--threads', '3']);
    expect(container.volumeMounts).toEqual([
      { name: 'shared', mountPath: '/shared/"quoted" {{Param.X}} {}' },
    ]);
    expect(spec.template.spec.restartPolicy).toBe('Never');
  });
});
