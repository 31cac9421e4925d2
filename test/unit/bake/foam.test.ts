import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { foamBuffers, foamSums } from '../../../src/bake/foam-loop.ts';
import { PNG } from '../../../src/codec/png.ts';
import type { ManifestFoam } from '../../../src/manifest/manifest.ts';
import type { CascadeFoam, PlannedCascade } from '../../../src/plan/plan.ts';
import { planBake } from '../../../src/plan/plan-bake.ts';
import { inlineBake, inTemporaryFolder } from '../../support/bakes.ts';
import { tinySea } from '../../support/tiny-seas.ts';

const FOAM_MAPS = { displacement: 'exr', foam: { format: 'png', bits: 16 } };

/** A loop's J codes, row by row from south, and its written foam codes in the same order. */
interface FoamLoop {
  readonly codes: readonly Uint16Array[];
  readonly foam: readonly Uint16Array[];
  readonly cascade: PlannedCascade;
  readonly figures: ManifestFoam;
}

function bakedFoam(changes: Readonly<Record<string, unknown>>): Promise<FoamLoop> {
  // A tiny linear sea is hardly compressed; gathered three times as much it foams.
  const shaping = { horizontalScale: 3 };
  const planned = planBake(tinySea({ maps: FOAM_MAPS, shaping, output: { rowZero: 'south' }, ...changes }));
  return inTemporaryFolder(async (folder) => {
    const { manifest } = await inlineBake(planned, folder, { keepScratch: true });
    const [cascade] = planned.plan.cascades;
    const frames = Array.from({ length: cascade.loop.frameCount }, (_, n) => n);
    const digits = (n: number, width: number) => String(n).padStart(width, '0');
    return {
      codes: frames.map((n) => {
        const bytes = readFileSync(join(folder, `.loopswell/c0.${digits(n, 5)}.codes`));
        return new Uint16Array(Uint8Array.from(bytes).buffer);
      }),
      foam: frames.map((n) => {
        const { planes } = PNG.decode(readFileSync(join(folder, `c0/foam.${digits(n + 1, 4)}.png`)));
        return Uint16Array.from(planes[0]);
      }),
      cascade,
      figures: manifest?.cascades[0].foam as ManifestFoam,
    };
  });
}

describe('the written foam', () => {
  it('follows f[n] = max(source, d f[n-1]) within one code in every frame, also from the last to the first', async () => {
    const { codes, foam, cascade, figures } = await bakedFoam({ foam: { coverage: 0.05, residue: 'keep' } });
    const { zeroJ, stepJ } = (cascade.foam as CascadeFoam).jacobianCodes;
    const N = foam.length;
    const d = Math.exp(-1 / figures.decayTimeS);
    expect(cascade.loop.frameRate).toEqual([1, 1]);
    let largest = 0;
    let changed = 0;
    for (let n = 0; n < N; n++) {
      const before = foam[(n + N - 1) % N];
      for (let i = 0; i < before.length; i++) {
        const J = zeroJ + stepJ * codes[n][i];
        const source = Math.min(1, Math.max(0, (figures.breakingJ - J) / figures.rampJ));
        const f = Math.max(source, (d * before[i]) / 65535);
        largest = Math.max(largest, Math.abs(foam[n][i] - 65535 * f));
        if (source > 0) changed++;
      }
    }
    // Half a code of the frame's own rounding, and d times as much of the frame before.
    expect(largest).toBeLessThanOrEqual(1);
    expect(changed).toBeGreaterThan(100);
  });

  it('covers its target within 2 %, and its coverage is the mean of what is in the files', async () => {
    for (const residue of ['remove', 'keep']) {
      for (const coverage of [0.003, 0.05, 0.3]) {
        const { foam, figures } = await bakedFoam({ foam: { coverage, residue } });
        let sum = 0;
        for (const frame of foam) for (const code of frame) sum += code;
        const mean = sum / 65535 / foam.length / foam[0].length;
        expect(mean).toBeCloseTo(figures.coverage.measured, 12);
        expect(figures.note).toBeNull();
        expect(Math.abs(mean / coverage - 1)).toBeLessThanOrEqual(0.02);
      }
    }
  });

  it('says so where the target cannot be reached', async () => {
    const { figures, cascade } = await bakedFoam({ foam: { coverage: 0.9 } });
    expect(figures.note).toMatch(/even with the highest breaking level \(J = 0\.9\) foam covers/);
    expect(figures.breakingJ).toBeCloseTo(0.9, 3);
    expect(figures.coverage.measured).toBeLessThan(0.9 * 0.98);
    expect(cascade.foam?.coverage).toBe(0.9);
  });

  it('has nothing left of what a loop does not fade where the residue is removed', async () => {
    const kept = await bakedFoam({ foam: { breakingLevel: 0.8, residue: 'keep' } });
    const removed = await bakedFoam({ foam: { breakingLevel: 0.8, residue: 'remove' } });
    const r = kept.figures.loopResidue;
    expect(r).toBeGreaterThan(0.01);
    expect(removed.figures.breakingJ).toBe(kept.figures.breakingJ);
    kept.foam.forEach((frame, n) => {
      frame.forEach((code, i) => {
        const expected = Math.max(0, (code / 65535 - r) / (1 - r)) * 65535;
        expect(Math.abs(removed.foam[n][i] - expected)).toBeLessThanOrEqual(0.5 + 0.5 / (1 - r) + 1e-6);
      });
    });
  });
});

it('sums of foam codes add up to the same over any split of the rows', () => {
  const { plan } = planBake(tinySea({ maps: FOAM_MAPS }));
  const [cascade] = plan.cascades;
  const N = cascade.resolution;
  // Any codes will do; these are spread over the whole range and differ from frame to frame.
  const codes = Array.from({ length: cascade.loop.frameCount }, (_, n) =>
    Uint16Array.from({ length: N * N }, (_, i) => ((i + 1) * 40503 + n * 9973) % 65536),
  );
  const buffers = foamBuffers();
  const sums = (fromRow: number, toRow: number, stride: number) =>
    foamSums(
      plan,
      cascade,
      cascade.foam as CascadeFoam,
      { fromRow, toRow, stride },
      [0, 9000, 30_000, 65_535],
      (frame, from, to) => codes[frame].subarray(from * N, to * N),
      buffers,
    );
  for (const stride of [1, 2]) {
    const whole = sums(0, N, stride);
    expect(whole.texels).toBe((N / stride) ** 2);
    expect(whole.sums).toEqual([...whole.sums].sort((a, b) => a - b));
    expect(whole.sums[0]).toBe(0);
    for (const cut of [2, 10, 30]) {
      const [south, north] = [sums(0, cut, stride), sums(cut, N, stride)];
      expect(south.texels + north.texels).toBe(whole.texels);
      expect(south.sums.map((sum, i) => sum + north.sums[i])).toEqual(whole.sums);
    }
  }
});
