import { existsSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { EXIT_STATUS, type Manifest, parseManifest, parsePlan } from '../../../src/index.ts';
import { TINY_SEA_YAML } from '../../support/tiny-seas.ts';
import { type CapturedOptions, capturedIo, inNewFolder, type Outcome, outcomeOf } from './captured-io.ts';

// Frames are made in the main thread: real threads run the built files and are tested on those.

interface Bench {
  readonly sea: string;
  readonly folder: string;
  readonly bake: (argv?: readonly string[], options?: CapturedOptions) => Promise<Outcome>;
  readonly manifest: () => Manifest;
}

/** A tiny sea file and a folder to bake it into. */
async function onBench(test: (bench: Bench) => Promise<void>): Promise<void> {
  await inNewFolder(async (root) => {
    const sea = join(root, 'tiny.yaml');
    const folder = join(root, 'baked');
    writeFileSync(sea, TINY_SEA_YAML);
    await test({
      sea,
      folder,
      bake: (argv = [], options = {}) =>
        outcomeOf(['bake', sea, '-o', folder, '--threads', '0', ...argv], capturedIo(options)),
      manifest: () => parseManifest(readFileSync(join(folder, 'manifest.json'), 'utf8'), 'manifest.json'),
    });
  });
}

/** Writes another sea to the file. */
function changeSea(sea: string): void {
  writeFileSync(sea, TINY_SEA_YAML.replace('seed: 3', 'seed: 4'));
}

describe('bake', () => {
  it('makes the files and tells what was asked, got and lost, and where it is', async () => {
    await onBench(async ({ bake, folder, manifest }) => {
      const { status, stdout, stderr } = await bake();
      expect(status).toBe(EXIT_STATUS.done);
      expect(readdirSync(join(folder, 'c0'))).toHaveLength(24);

      const { statistics, files } = manifest();
      const measured = statistics.significantHeightM.measured as number;
      expect(stdout).toContain('asked 0.35 m');
      expect(stdout).toContain(`got ${Number(measured.toPrecision(3))} m`);
      expect(stdout).toContain('Tiny wind sea: displacement, normal, foam; c0 32 x 32; 8 frames a loop');
      expect(stdout).toContain(`${files.length} files`);
      expect(stdout).toContain(folder);
      expect(stdout).toMatch(/left out +\d+ % of the sea's energy/);
      expect(stdout).toMatch(/in the main thread: 8 frames made/);
      // The plan's warnings come before; nothing else, as a tiny bake takes less than half a minute.
      expect(stderr).toMatch(/^\d warnings\n( {2}- .*\n( {4}.*\n)*)+$/);
    });
  });

  it('prints one JSON document with --json: the manifest without its list of files, and the run', async () => {
    await onBench(async ({ bake, folder, manifest }) => {
      const { stdout } = await bake(['--json']);
      const printed = JSON.parse(stdout);
      const { files, ...rest } = manifest();
      const bytes = files.reduce((sum, file) => sum + file.bytes, 0);
      expect(printed.folder).toBe(folder);
      expect(printed.manifest).toEqual({ ...rest, files: { count: 24, bytes } });
      expect(printed.run).toMatchObject({
        format: 'loopswell-run',
        framesMade: 8,
        framesReused: 0,
        threads: 0,
      });
    });
  });

  it('prints nothing with --quiet, but JSON where that is asked for', async () => {
    await onBench(async ({ bake }) => {
      expect(await bake(['-q'])).toEqual({ status: 0, stdout: '', stderr: '' });
      const again = await bake(['--quiet', '--json']);
      expect(JSON.parse(again.stdout).run.framesReused).toBe(8);
      expect(again.stderr).toBe('');
    });
  });

  it('prints the plan and makes nothing with --dry-run, for as many threads as were asked for', async () => {
    await onBench(async ({ bake, sea, folder }) => {
      const { status, stdout } = await bake(['-n']);
      expect(status).toBe(EXIT_STATUS.done);
      expect(stdout).toContain('Wave systems');
      expect(stdout).toContain('in the main thread');
      expect((await bake(['-n', '--threads', '3'])).stdout).toContain('with 3 threads');
      const json = (await bake(['--dry-run', '--json'])).stdout;
      expect(json).toBe((await outcomeOf(['plan', sea, '--json'])).stdout);
      expect(existsSync(folder)).toBe(false);
    });
  });

  it('bakes into out/ and the name of the sea where no folder is given', async () => {
    await onBench(async ({ sea }) => {
      const before = process.cwd();
      const root = join(sea, '..');
      process.chdir(root);
      try {
        await outcomeOf(['bake', './tiny.yaml', '--threads', '0', '-q']);
      } finally {
        process.chdir(before);
      }
      expect(existsSync(join(root, 'out', 'tiny', 'manifest.json'))).toBe(true);
    });
  });

  it('bakes a saved plan to the same files', async () => {
    await onBench(async ({ bake, sea, folder, manifest }) => {
      await bake(['-q']);
      const plan = join(folder, '..', 'plan.json');
      await outcomeOf(['plan', sea, '--save', plan]);
      const { status } = await outcomeOf(['bake', plan, '-o', `${folder}2`, '--threads', '0']);
      expect(status).toBe(EXIT_STATUS.done);
      expect(readFileSync(join(`${folder}2`, 'manifest.json'))).toEqual(
        readFileSync(join(folder, 'manifest.json')),
      );
      expect(manifest().planHash).toBe(parsePlan(readFileSync(plan, 'utf8'), plan).hash);
    });
  });

  it('refuses a saved plan that was altered', async () => {
    await onBench(async ({ sea, folder }) => {
      const plan = join(folder, '..', 'plan.json');
      await outcomeOf(['plan', sea, '--save', plan]);
      writeFileSync(plan, readFileSync(plan, 'utf8').replace('"seed": 3', '"seed": 4'));
      const { status, stderr } = await outcomeOf(['bake', plan, '-o', folder]);
      expect(status).toBe(EXIT_STATUS.badInput);
      expect(stderr).toContain('altered');
      expect(existsSync(folder)).toBe(false);
    });
  });

  it('makes some frames with --frames, which a later bake reuses', async () => {
    await onBench(async ({ bake, folder }) => {
      const part = await bake(['--frames', '2-3']);
      expect(part.stdout).toContain('some frames only');
      expect(part.stdout).toContain('2 frames made');
      expect(readdirSync(join(folder, 'c0')).sort()).toEqual([
        'displacement.0002.exr',
        'displacement.0003.exr',
        'normal.0002.png',
        'normal.0003.png',
      ]);
      expect((await bake(['--frames', '3'])).stdout).toContain('0 frames made, 1 reused');
      expect((await bake()).stdout).toContain('6 frames made, 2 reused');
    });
  });

  it('keeps the scratch files with --keep-scratch, else not', async () => {
    await onBench(async ({ bake, folder }) => {
      await bake(['--keep-scratch']);
      expect(readdirSync(join(folder, '.loopswell')).filter((name) => name.endsWith('.codes'))).toHaveLength(
        8,
      );
    });
    await onBench(async ({ bake, folder }) => {
      await bake();
      expect(readdirSync(folder).sort()).toEqual(['c0', 'manifest.json', 'run.json']);
    });
  });
});

describe('statuses of bake', () => {
  it('64 for frames outside the loop', async () => {
    await onBench(async ({ bake }) => {
      const { status, stderr } = await bake(['--frames', '5-9']);
      expect(status).toBe(EXIT_STATUS.usage);
      expect(stderr).toContain("the loop's frames 1-8");
    });
  });

  it('65 for a sea with faults, all of them told with their lines', async () => {
    await onBench(async ({ bake, sea }) => {
      writeFileSync(sea, TINY_SEA_YAML.replace('0.35 m', '-1 m').replace('resolution: 32', 'resolution: 33'));
      const { status, stderr } = await bake();
      expect(status).toBe(EXIT_STATUS.badInput);
      expect(stderr).toContain('2 problems');
      expect(stderr).toContain(`${sea}:7:24: systems[0].significantHeight:`);
      expect(stderr).toContain(`${sea}:13:17: cascades[0].resolution:`);
    });
  });

  it('69, with the figures, for more than the machine has', async () => {
    await onBench(async ({ bake, sea }) => {
      // A terabyte and a half of files, and 1024 threads that would take 100 GB of memory.
      const huge = TINY_SEA_YAML.replace('resolution: 32', 'resolution: 512')
        .replace('frames: 8', 'frames: 100000')
        .replace(
          '{ displacement: exr, normal: png, foam: png }',
          '{ displacement: { format: exr, sample: float }, velocity: { format: exr, sample: float }, strain: { format: exr, sample: float }, foam: png }',
        );
      writeFileSync(sea, huge);
      const { status, stderr } = await bake(['--threads', '1024']);
      expect(status).toBe(EXIT_STATUS.unavailable);
      expect(stderr).toMatch(/needs about [\d.]+ GB .*has [\d.]+ GB/);
    });
  });

  it('70, asking for a report, for an error that nobody foresaw', async () => {
    await onBench(async ({ bake }) => {
      const secondsNow = (): number => {
        throw new TypeError('the clock has stopped');
      };
      const { status, stderr } = await bake([], { secondsNow });
      expect(status).toBe(EXIT_STATUS.internal);
      expect(stderr).toContain('error: the clock has stopped. This is our fault: please report it');
    });
  });

  it("73 where the folder holds another plan's bake; --force replaces that and nothing else", async () => {
    await onBench(async ({ bake, sea, folder, manifest }) => {
      await bake(['-q']);
      const before = manifest().planHash;
      writeFileSync(join(folder, 'notes.txt'), 'mine');
      changeSea(sea);
      const refused = await bake();
      expect(refused.status).toBe(EXIT_STATUS.cannotCreate);
      expect(refused.stderr).toContain('--force');
      expect(manifest().planHash).toBe(before);
      expect((await bake(['--force'])).status).toBe(EXIT_STATUS.done);
      expect(manifest().planHash).not.toBe(before);
      expect(readFileSync(join(folder, 'notes.txt'), 'utf8')).toBe('mine');
    });
  });

  it('73 where a file is in the place of the folder', async () => {
    await onBench(async ({ bake, folder }) => {
      writeFileSync(folder, '');
      expect((await bake()).status).toBe(EXIT_STATUS.cannotCreate);
    });
  });

  it('75 after a signal, with the hint to run again, which resumes', async () => {
    await onBench(async ({ bake, sea, folder, manifest }) => {
      // The clock is asked at each update of progress: the signal comes while frames are being made.
      let asked = 0;
      const io = capturedIo({
        secondsNow: () => {
          if (++asked === 4) io.signal('SIGTERM');
          return 0;
        },
      });
      const stopped = await outcomeOf(['bake', sea, '-o', folder, '--threads', '0'], io);
      expect(stopped.status).toBe(EXIT_STATUS.stopped);
      expect(stopped.stdout).toBe('');
      expect(stopped.stderr).toContain('SIGTERM: stopping after the frames in flight');
      expect(stopped.stderr).toContain('Run the same command again to resume.');
      expect(io.exits).toEqual([]);
      // The handler is gone with the bake.
      expect(io.signal('SIGTERM')).toBe(false);
      expect(existsSync(join(folder, 'manifest.json'))).toBe(false);

      const { status, stdout } = await bake();
      expect(status).toBe(EXIT_STATUS.done);
      const [, made, reused] = /(\d) frames? made, (\d) reused/.exec(stdout) as RegExpExecArray;
      expect(Number(made) + Number(reused)).toBe(8);
      expect(Number(reused)).toBeGreaterThan(0);
      expect(manifest().files).toHaveLength(24);
    });
  });

  it.each([
    ['at once after a second signal', 0.6, [EXIT_STATUS.stopped]],
    ['after the frames in flight where two signals come at one moment', 0.4, []],
  ])('75 %s', async (_, apartS, exits) => {
    await onBench(async ({ sea, folder }) => {
      let asked = 0;
      let timeS = 0;
      const io = capturedIo({
        secondsNow: () => {
          if (++asked === 4) {
            io.signal('SIGINT');
            timeS = apartS;
            io.signal('SIGINT');
          }
          return timeS;
        },
      });
      const { status } = await outcomeOf(['bake', sea, '-o', folder, '--threads', '0'], io);
      expect(status).toBe(EXIT_STATUS.stopped);
      expect(io.exits).toEqual(exits);
    });
  });

  it('0 for warnings only: they go to stderr and stdout stays clean', async () => {
    await onBench(async ({ bake, folder }) => {
      mkdirSync(folder);
      const { status, stdout, stderr } = await bake(['--json']);
      expect(status).toBe(EXIT_STATUS.done);
      expect(stderr).toContain('warning');
      expect(() => JSON.parse(stdout)).not.toThrow();
    });
  });
});
