import { existsSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { EXIT_STATUS } from '../../../src/errors.ts';
import { parsePlan } from '../../../src/index.ts';
import { TINY_SEA_YAML } from '../../support/tiny-seas.ts';
import { capturedIo, inNewFolder, outcomeOf } from './captured-io.ts';

const THREADS = ['--threads', '0'];

/** Calls back with a sea file, with a range to be surveyed, and a folder to bake it into. */
function onBench(use: (sea: string, folder: string) => Promise<void>): Promise<void> {
  return inNewFolder(async (outer) => {
    const sea = join(outer, 'tiny.yaml');
    writeFileSync(
      sea,
      TINY_SEA_YAML.replace('displacement: exr', 'displacement: { format: png, bits: 16, range: survey }'),
    );
    await use(sea, join(outer, 'baked'));
  });
}

describe('farm slurm', () => {
  it('writes a plan with its ranges known and three scripts beside the bake, and nothing into it', async () => {
    await onBench(async (sea, folder) => {
      const options = [
        '--tasks',
        '6',
        '--cpus',
        '2',
        '--mem',
        '900',
        '--partition',
        'night',
        '--max-running',
        '3',
      ];
      const { status, stdout, stderr } = await outcomeOf([
        'farm',
        'slurm',
        sea,
        '-o',
        folder,
        ...options,
        ...THREADS,
      ]);
      expect(status, stderr).toBe(EXIT_STATUS.done);
      expect(stdout).toBe(`${folder}-farm/submit.sh\n`);
      expect(existsSync(folder)).toBe(false);
      const read = (path: string) => readFileSync(join(`${folder}-farm`, path), 'utf8');
      const plan = parsePlan(read('plan.json'), 'plan.json');
      expect(plan.cascades[0].maps[0].channels.every(({ decode }) => decode !== null)).toBe(true);
      expect(read('submit.sh')).toContain('--array=1-6%3');
      expect(read('frames.sh')).toContain(
        `loopswell bake ${folder}-farm/plan.json -o ${folder} --shard "$SLURM_ARRAY_TASK_ID/6"`,
      );
      expect(read('frames.sh')).toContain('#SBATCH --mem=900M');
      expect(read('gather.sh')).toContain(`loopswell gather ${folder} `);
      expect(statSync(`${folder}-farm/submit.sh`).mode & 0o100).toBe(0o100);
      expect(statSync(`${folder}-farm/plan.json`).mode & 0o100).toBe(0);
      // The plan that was written is what the shards are to bake.
      const shard = ['bake', `${folder}-farm/plan.json`, '-o', folder, '--shard', '1/6', ...THREADS];
      expect((await outcomeOf(shard)).status).toBe(EXIT_STATUS.done);
    });
  });

  it('submits with --submit and prints the numbers of the jobs', async () => {
    await onBench(async (sea, folder) => {
      const ran: string[] = [];
      const io = capturedIo({
        runProgram: (command) => {
          ran.push(command);
          return { status: 0, stdout: 'frames 7\ngather 8\n', stderr: 'sbatch: told\n' };
        },
      });
      const { status, stdout, stderr } = await outcomeOf(
        ['farm', 'slurm', sea, '-o', folder, '--tasks', '2', '--submit', ...THREADS],
        io,
      );
      expect(status).toBe(EXIT_STATUS.done);
      expect(ran).toEqual([`${folder}-farm/submit.sh`]);
      expect(stdout).toBe('frames 7\ngather 8\n');
      expect(stderr).toContain('sbatch: told');
    });
  });

  it.each([
    [null, 'cannot be run'],
    [1, 'ended with 1'],
  ])('says with 69 that the jobs are not submitted where the script ends with %s', async (ended, words) => {
    await onBench(async (sea, folder) => {
      const io = capturedIo({
        runProgram: () => ({ status: ended, stdout: '', stderr: 'sbatch: error: no\n' }),
      });
      const { status, stderr } = await outcomeOf(
        ['farm', 'slurm', sea, '-o', folder, '--tasks', '2', '--submit', ...THREADS],
        io,
      );
      expect(status).toBe(EXIT_STATUS.unavailable);
      expect(stderr).toContain(words);
      expect(stderr).toContain('the jobs are not submitted');
    });
  });

  it('refuses with 64 what no farm takes', async () => {
    await onBench(async (sea, folder) => {
      for (const options of [
        [],
        ['--tasks', '0'],
        ['--tasks', 'x'],
        ['--tasks', '2', '--cpus', '0'],
        ['--tasks', '2', '--partition', 'a b'],
        ['--tasks', '2', '--program', ''],
      ]) {
        const { status } = await outcomeOf(['farm', 'slurm', sea, '-o', folder, ...options, ...THREADS]);
        expect(status, options.join(' ')).toBe(EXIT_STATUS.usage);
      }
      expect(existsSync(`${folder}-farm`)).toBe(false);
    });
  });
});

describe('farm template', () => {
  it.each([
    ['openjd', 'openjd.yaml', 'specificationVersion: jobtemplate-2023-09'],
    ['kubernetes', 'kubernetes.yaml', 'completionMode: Indexed'],
    ['parallel', 'parallel.sh', 'parallel --jobs 1'],
  ])('writes the work for %s', async (format, file, words) => {
    await onBench(async (sea, folder) => {
      const { status, stdout } = await outcomeOf([
        'farm',
        'template',
        format,
        sea,
        '-o',
        folder,
        '--tasks',
        '3',
        ...THREADS,
      ]);
      expect(status).toBe(EXIT_STATUS.done);
      expect(stdout).toBe(`${folder}-farm/${file}\n`);
      expect(readFileSync(stdout.trim(), 'utf8')).toContain(words);
    });
  });

  it('names the formats there are', async () => {
    const { status, stderr } = await outcomeOf(['farm', 'template', 'pbs', 'demo', '--tasks', '3']);
    expect(status).toBe(EXIT_STATUS.usage);
    expect(stderr).toContain('openjd, kubernetes, parallel');
  });
});

describe('farm status', () => {
  it('says what is done, by whom, and what is missing', async () => {
    await onBench(async (sea, folder) => {
      await outcomeOf(['bake', sea, '-o', folder, '--frames', '2-6', ...THREADS]);
      const { stdout } = await outcomeOf(['farm', 'status', folder]);
      expect(stdout).toContain(`Tiny wind sea: ${folder}`);
      expect(stdout).toMatch(/^ *c0 +frames +5\/8 +1, 7-8$/m);
      expect(stdout).toMatch(/^ *foam +0\/8 +1-8$/m);
      expect(stdout).toContain('frames are still to be made');
      expect(stdout).toMatch(/^ *frames 2-6 +\S+ \d+ +done +5 frames/m);
      const { stdout: json } = await outcomeOf(['farm', 'status', folder, '--json']);
      expect(JSON.parse(json)).toMatchObject({ finished: false, cascades: [{ id: 'c0' }] });
      await outcomeOf(['bake', sea, '-o', folder, '--shard', '1/1', ...THREADS]);
      expect((await outcomeOf(['farm', 'status', folder])).stdout).toContain(
        'all frames are made: gather ends the bake',
      );
      await outcomeOf(['gather', folder, ...THREADS]);
      expect((await outcomeOf(['farm', 'status', folder])).stdout).toContain('finished');
    });
  });

  it('is 65 where there is no bake', async () => {
    await inNewFolder(async (folder) => {
      expect((await outcomeOf(['farm', 'status', folder])).status).toBe(EXIT_STATUS.badInput);
    });
  });
});
