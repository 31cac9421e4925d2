import { cpSync, mkdirSync, mkdtempSync, readFileSync, rmSync, symlinkSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import fc from 'fast-check';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { InputError, LoopswellError, StoppedError, UsageError } from '../../src/errors.ts';
import type { Manifest } from '../../src/manifest/manifest.ts';
import { verifyBake } from '../../src/verify/verify-bake.ts';
import { bakeShelf } from '../support/small-bakes.ts';
import type { Writable } from '../support/spoilers.ts';

// Manifests and files that no bake writes: what they lead to is a failed check or an error with a status, never a crash
// and never memory in proportion to what they claim.

const shelf = bakeShelf();
const root = mkdtempSync(join(tmpdir(), 'loopswell-hostile-'));
let sound = '';
let made = 0;
beforeAll(async () => {
  sound = await shelf.bake('tiny');
});
afterAll(() => {
  shelf.remove();
  rmSync(root, { recursive: true, force: true });
});

/** A copy of the sound bake whose manifest is changed. */
function changedBake(change: (manifest: Writable<Manifest>) => void): string {
  const folder = join(root, String(made++));
  cpSync(sound, folder, { recursive: true });
  const path = join(folder, 'manifest.json');
  const manifest = JSON.parse(readFileSync(path, 'utf8')) as Writable<Manifest>;
  change(manifest);
  writeFileSync(path, JSON.stringify(manifest));
  return folder;
}

async function failuresOf(folder: string): Promise<readonly string[]> {
  const { checks } = await verifyBake(folder);
  return [...new Set(checks.filter(({ passed }) => passed === false).map(({ name }) => name))];
}

describe('a manifest that contradicts itself is refused', () => {
  it.each<[string, (manifest: Writable<Manifest>) => void]>([
    ['a resolution that is no power of two', ({ cascades: [c0] }) => Object.assign(c0, { resolution: 24 })],
    ['a resolution of one texel', ({ cascades: [c0] }) => Object.assign(c0, { resolution: 1 })],
    ['a resolution beyond all', ({ cascades: [c0] }) => Object.assign(c0, { resolution: 2 ** 20 })],
    [
      'more frames than files',
      ({ cascades: [c0] }) =>
        Object.assign(c0.loop, { frameCount: 2 ** 31 - 1, seconds: (2 ** 31 - 1) / c0.loop.frameRate[0] }),
    ],
    [
      'more frames than files, of no map',
      ({ cascades: [c0] }) => {
        c0.maps = {};
        Object.assign(c0.loop, { frameCount: 2 ** 31 - 1, seconds: (2 ** 31 - 1) / c0.loop.frameRate[0] });
      },
    ],
    ['seconds that are not its frames', ({ cascades: [c0] }) => Object.assign(c0.loop, { seconds: 7.25 })],
    ['a path that leaves the folder', ({ files }) => Object.assign(files[0], { path: '../../etc/passwd' })],
    ['a path twice', ({ files }) => Object.assign(files[0], { path: files[1].path })],
    [
      'a pattern without a number',
      ({ cascades: [c0] }) => Object.assign(c0.maps.displacement ?? {}, { pattern: 'c0/displacement.exr' }),
    ],
    [
      'two maps of one pattern',
      ({ cascades: [c0] }) => Object.assign(c0.maps.normal ?? {}, { pattern: c0.maps.foam?.pattern }),
    ],
    ['a cascade twice', (manifest) => manifest.cascades.push(manifest.cascades[0])],
    [
      'a map of other quantities',
      ({ cascades: [c0] }) => Object.assign(c0.maps.foam?.channels[0] ?? {}, { quantity: 'jacobian' }),
    ],
    [
      'a scale of nothing',
      ({ cascades: [c0] }) => Object.assign(c0.maps.foam?.channels[0].decode ?? {}, { scale: 0 }),
    ],
    ['another unit', ({ conventions }) => Object.assign(conventions, { lengthUnit: 'cm' })],
    [
      'samples that its format cannot hold',
      ({ cascades: [c0] }) => Object.assign(c0.maps.displacement ?? {}, { sample: 'uint16' }),
    ],
    ['a spectrum of no form', ({ sea }) => Object.assign(sea.systems[0].spectrum, { form: 'constructor' })],
    ['a spreading of no form', ({ sea }) => Object.assign(sea.systems[0].spreading, { form: '__proto__' })],
    [
      'a parameter that is a text',
      ({ sea }) => Object.assign(sea.systems[0].spectrum, { energyFactor: '1' }),
    ],
    [
      'a table without entries',
      ({ sea }) => {
        sea.systems[0].spectrum = { form: 'tabulated', energyFactor: 1 } as never;
      },
    ],
    [
      'a table with a text in it',
      ({ sea }) => Object.assign(sea.systems[0].spectrum, { form: 'tabulated', frequencyHz: [0.1, '0.2'] }),
    ],
    ['no peak', ({ sea }) => Object.assign(sea.systems[0].spectrum, { omegaPeakRadPerS: 0 })],
  ])('%s', async (_, change) => {
    await expect(verifyBake(changedBake(change))).rejects.toThrow(InputError);
  });
});

describe('a manifest that lies about its files fails', () => {
  it('a resolution that the files do not have, and no memory for it', async () => {
    const folder = changedBake(({ cascades: [c0] }) => Object.assign(c0, { resolution: 8192 }));
    const before = process.memoryUsage().rss;
    // Tables for a finer lattice reach shorter waves, so that the figures of the sea move too.
    expect(await failuresOf(folder)).toEqual(['files', 'sea']);
    // One plane of that size in float64 takes 537 MB.
    expect(process.memoryUsage().rss - before).toBeLessThan(400e6);
  });

  it('another sample type', async () => {
    const folder = changedBake(({ cascades: [c0] }) =>
      Object.assign(c0.maps.normal ?? {}, { sample: 'uint16' }),
    );
    expect(await failuresOf(folder)).toEqual(['files']);
  });

  it('another name of a channel', async () => {
    const folder = changedBake(({ cascades: [c0] }) =>
      Object.assign(c0.maps.foam?.channels[0] ?? {}, { name: 'R' }),
    );
    expect(await failuresOf(folder)).toEqual(['files']);
  });

  it('a map that is not there', async () => {
    const folder = changedBake(({ cascades: [c0] }) => {
      const [channel] = c0.maps.foam?.channels ?? [];
      const height = { ...channel, quantity: 'height', unit: 'm' } as const;
      c0.maps.height = {
        ...(c0.maps.foam as object),
        pattern: 'c0/height.%04d.png',
        channels: [height],
      } as never;
    });
    expect(await failuresOf(folder)).toEqual(['files']);
  });

  it('another spectrum, as a table', async () => {
    const folder = changedBake(({ sea }) => {
      const table = { frequencyHz: [0.25, 0.3, 0.35], densityM2PerHz: [0, 0.1, 0] };
      sea.systems[0].spectrum = { form: 'tabulated', energyFactor: 1, ...table };
    });
    expect(await failuresOf(folder)).toEqual(expect.arrayContaining(['waves', 'spectrum', 'spot']));
  });

  it.each([1e308, -5])('a wind of %s m/s, which no wave follows from', async (windSpeedMps) => {
    const folder = changedBake(({ sea }) => Object.assign(sea.systems[0], { windSpeedMps }));
    const { statistics } = await verifyBake(folder);
    expect(statistics?.sea.whitecapCoverage).toBeNull();
    expect(statistics?.sea.slopeVariance?.clean).toBeNull();
  });

  it('a sea without bounds', async () => {
    const folder = changedBake(({ sea }) => Object.assign(sea.systems[0].spectrum, { energyFactor: 1e300 }));
    expect(await failuresOf(folder)).toEqual(['sea', 'waves', 'spectrum', 'spot']);
  });
});

describe('files that are no frames', () => {
  it('cost their own check: a folder, a link to nothing, an empty file, a file that claims to be large', async () => {
    const folder = changedBake(() => {});
    const path = (n: number): string => join(folder, `c0/normal.000${n}.png`);
    for (const n of [1, 2, 3, 4]) rmSync(path(n));
    mkdirSync(path(1));
    symlinkSync(join(folder, 'nowhere'), path(2));
    writeFileSync(path(3), '');
    const header = Buffer.from('89504e470d0a1a0a0000000d49484452000020000000200008020000000000000000', 'hex');
    writeFileSync(path(4), header);
    expect(await failuresOf(folder)).toEqual(['files']);
  });

  it('are read no further than their pixels can reach', async () => {
    const folder = changedBake(() => {});
    writeFileSync(join(folder, 'c0/normal.0001.png'), Buffer.alloc(3e6));
    const { checks } = await verifyBake(folder);
    expect(checks[0].details.join()).toContain('3000000 bytes, more than its pixels can take');
  });

  it('of other names are nobody’s business', async () => {
    const folder = changedBake(() => {});
    writeFileSync(join(folder, 'notes.txt'), 'mine');
    writeFileSync(join(folder, 'c0/normal.preview.png'), 'mine');
    mkdirSync(join(folder, '.loopswell'), { recursive: true });
    writeFileSync(join(folder, '.loopswell/x.journal'), 'mine');
    expect((await verifyBake(folder)).passed).toBe(true);
  });
});

describe('verification', () => {
  it('refuses a folder without a manifest, and a manifest that is none', async () => {
    const folder = join(root, String(made++));
    mkdirSync(folder);
    await expect(verifyBake(folder)).rejects.toThrow(LoopswellError);
    writeFileSync(join(folder, 'manifest.json'), '{');
    await expect(verifyBake(folder)).rejects.toThrow(InputError);
  });

  it('stops when it is asked to', async () => {
    const stop = new AbortController();
    const promise = verifyBake(sound, {
      signal: stop.signal,
      onProgress: ({ done }) => done === 3 && stop.abort(),
    });
    await expect(promise).rejects.toThrow(StoppedError);
  });

  it('tells how far it is', async () => {
    const seen: string[] = [];
    await verifyBake(sound, { onProgress: ({ done, total }) => seen.push(`${done}/${total}`) });
    expect(seen).toEqual(Array.from({ length: 16 }, (_, i) => `${i}/16`));
  });

  it('of some frames judges those and leaves open what needs the loop', async () => {
    await expect(verifyBake(sound, { frames: { first: 0, last: 3 } })).rejects.toThrow(UsageError);
    const report = await verifyBake(sound, { frames: { first: 3, last: 5 } });
    expect(report.passed).toBe(true);
    expect(report.statistics).toBeNull();
    const open = report.checks.filter(({ passed }) => passed === null).map(({ name }) => name);
    expect([...new Set(open)]).toEqual([
      'figures',
      'loop',
      'heights',
      'dispersion',
      'direction',
      'spectrum',
      'foam',
    ]);
    const folder = changedBake(() => {});
    rmSync(join(folder, 'c0/displacement.0007.exr'));
    expect((await verifyBake(folder, { frames: { first: 3, last: 5 } })).passed).toBe(true);
    expect((await verifyBake(folder, { frames: { first: 3, last: 7 } })).passed).toBe(false);
  });

  it('of the quick kind reads few frames and still misses no file', async () => {
    let total = 0;
    const report = await verifyBake(sound, {
      checks: 'quick',
      onProgress: (progress) => (total = progress.total),
    });
    expect(report.passed).toBe(true);
    expect(total).toBeLessThanOrEqual(8);
    expect([...new Set(report.checks.map(({ name }) => name))]).toEqual([
      'files',
      'labels',
      'waves',
      'tile',
      'horizontal',
      'derivatives',
      'spot',
    ]);
    for (let n = 1; n <= 8; n++) {
      const folder = changedBake(() => {});
      rmSync(join(folder, `c0/foam.000${n}.png`));
      expect((await verifyBake(folder, { checks: 'quick' })).passed).toBe(false);
    }
  });
});

describe('any change of one number or word of a manifest', () => {
  it('ends in a report or in an error with a status', async () => {
    const text = readFileSync(join(sound, 'manifest.json'), 'utf8');
    const manifest = JSON.parse(text) as Writable<Manifest>;
    // The list of files is long and alike: two entries stand for all.
    const leaves = leavesOf(manifest).filter(([first, second]) => first !== 'files' || Number(second) < 2);
    const strange = fc.constantFrom<unknown>(
      0,
      -1,
      1,
      0.5,
      1e-308,
      1e308,
      2 ** 31,
      65536,
      '',
      'x',
      '%04d',
      null,
      true,
      [],
      {},
      -1e-3,
    );
    await fc.assert(
      fc.asyncProperty(fc.constantFrom(...leaves), strange, async (path, value) => {
        const folder = changedBake((changed) => setLeaf(changed, path, value));
        try {
          const { checks } = await verifyBake(folder);
          expect(checks.length).toBeGreaterThan(0);
        } catch (error) {
          if (!(error instanceof LoopswellError)) throw error;
          expect(error.exitStatus).toBe(65);
        } finally {
          rmSync(folder, { recursive: true });
        }
      }),
      { numRuns: Number(process.env.FUZZ_RUNS ?? 120), ...(process.env.FUZZ_RUNS ? {} : { seed: 4 }) },
    );
  });
});

type Path = readonly string[];

function leavesOf(value: unknown, path: Path = []): Path[] {
  if (typeof value !== 'object' || value === null) return [path];
  return Object.entries(value).flatMap(([key, inner]) => leavesOf(inner, [...path, key]));
}

function setLeaf(target: object, [key, ...rest]: Path, value: unknown): void {
  const holder = target as Record<string, unknown>;
  if (rest.length === 0) holder[key] = value;
  else setLeaf(holder[key] as object, rest, value);
}
