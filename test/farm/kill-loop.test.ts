import { existsSync, readdirSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { expect, it, vi } from 'vitest';
import { fileHashes, inTemporaryFolder } from '../support/bakes.ts';
import { builtLibrary, runProgram, seaFile, startProgram } from '../support/built.ts';

// Kills a bake with signal 9 at random moments and resumes it, over and over. A few times on a small sea here;
//
//     KILL_LOOP=100 npx vitest run test/farm/kill-loop.test.ts
//
// does it a hundred times on the demo and reports. KILL_SEED repeats a run's moments.

const OFTEN = Number(process.env.KILL_LOOP ?? 0);
const KILLS = OFTEN > 0 ? OFTEN : 6;
const SEED = Number(process.env.KILL_SEED ?? Math.floor(Math.random() * 2 ** 32));

vi.setConfig({ testTimeout: OFTEN > 0 ? 7_200_000 : 120_000 });

/** Numbers from 0 to 1, the same for a seed (mulberry32). */
function randomNumbers(seed: number): () => number {
  let a = seed >>> 0;
  return () => {
    a = (a + 0x6d2b79f5) >>> 0;
    let t = Math.imul(a ^ (a >>> 15), a | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 2 ** 32;
  };
}

it(`a bake killed ${KILLS} times at random moments comes out the same (seed ${SEED})`, async () => {
  const { bakeStatus } = await builtLibrary();
  const random = randomNumbers(SEED);
  await inTemporaryFolder(async (outer) => {
    const sea = OFTEN > 0 ? 'demo' : seaFile(outer);
    const undisturbed = join(outer, 'undisturbed');
    const whole = await runProgram(['bake', sea, '-o', undisturbed, '--no-verify']);
    expect(whole.status, whole.stderr).toBe(0);
    const expected = fileHashes(undisturbed);

    const folder = join(outer, 'killed');
    const stages: Record<string, number> = {};
    let [kills, bakes, temporaries, reused] = [0, 0, 0, 0];
    let isKilled = true;
    while (kills < KILLS || isKilled) {
      const threads = 1 + Math.floor(3 * random());
      const running = startProgram([
        'bake',
        sea,
        '-o',
        folder,
        '--threads',
        `${threads}`,
        '--no-verify',
        '--json',
      ]);
      // Somewhere from its first breath to well into the work of a bake.
      const seconds = 0.2 + random() * 0.6 * whole.seconds;
      const timer = setTimeout(() => kills < KILLS && running.child.kill('SIGKILL'), 1000 * seconds);
      const { status, signal, stdout, stderr } = await running.ended;
      clearTimeout(timer);
      isKilled = signal === 'SIGKILL';
      if (isKilled) {
        kills++;
        const stage = existsSync(join(folder, '.loopswell', 'plan.json'))
          ? stageOf(bakeStatus(folder))
          : 'start';
        stages[stage] = (stages[stage] ?? 0) + 1;
        if (existsSync(folder)) {
          const paths = readdirSync(folder, { recursive: true }) as string[];
          temporaries += paths.filter((path) => path.endsWith('.tmp')).length;
        }
        continue;
      }
      expect(status, stderr).toBe(0);
      reused += JSON.parse(stdout).run.framesReused;
      expect(fileHashes(folder)).toEqual(expected);
      bakes++;
      rmSync(folder, { recursive: true });
    }
    expect(kills).toBe(KILLS);
    if (OFTEN > 0) {
      console.log(
        JSON.stringify({
          seed: SEED,
          kills,
          bakes,
          stages,
          temporaries,
          reused,
          files: Object.keys(expected).length,
        }),
      );
    }
  });
});

/** What a killed bake was at, by what it has left. */
function stageOf({ cascades, finished }: ReturnType<typeof import('../../src/index.ts').bakeStatus>): string {
  if (finished) return 'end';
  if (cascades.some(({ frames }) => frames.missing.length > 0)) return 'frames';
  return cascades.every(({ foam }) => foam === null || foam.missing.length === foam.total)
    ? 'foam level'
    : 'foam';
}
