import { describe, expect, it } from 'vitest';
import { planBake } from '../../../src/plan/plan-bake.ts';
import { seaOf, windSeaKeys } from '../../support/planned-seas.ts';
import { tinySea, tinyTwoCascadeSea } from '../../support/tiny-seas.ts';

const warningsOf = (sea: ReturnType<typeof tinySea>): string => planBake(sea).plan.report.warnings.join('\n');
const swell = { kind: 'swell', from: 250, significantHeight: 0.3, peakPeriod: 2.4 };
const narrow = { ...swell, spreading: { form: 'cos-2s', s: 300 }, peakEnhancement: 10 };

describe('a good plan', () => {
  it('has nothing to warn of', () => {
    const sea = seaOf([windSeaKeys(5, 10)], {
      loop: { seconds: 8, frameRate: 24 },
      cascades: { count: 2, resolution: 128 },
    });
    expect(warningsOf(sea)).toBe('');
  });
});

describe('what a plan warns of', () => {
  const calm = warningsOf(
    tinySea({ loop: { frames: 200, frameRate: 8 }, cascades: [{ patch: 30, resolution: 256 }] }),
  );

  it.each<[string, Parameters<typeof tinySea>[0], RegExp]>([
    [
      'energy in no cascade',
      { cascades: [{ patch: 30, resolution: 32, band: { shortest: 12 } }] },
      /% of the sea's energy is in no cascade/,
    ],
    [
      'waves too fast for the frames',
      { loop: { frames: 20, frameRate: 0.7 } },
      /% of the energy turns too fast/,
    ],
    [
      'few waves',
      { systems: [narrow], cascades: [{ patch: 18, resolution: 32 }] },
      /swell: only \d waves carry it/,
    ],
    [
      'a direction turned',
      { systems: [{ ...narrow, from: 255 }], cascades: [{ patch: 8.5, resolution: 32 }] },
      /turn its mean direction by -?\d+\.\d degrees/,
    ],
    [
      'waves longer than the patch',
      { cascades: [{ patch: 7, resolution: 32 }] },
      /in waves longer than the patch/,
    ],
    [
      'speeds changed',
      { loop: { frames: 8, frameRate: 2 } },
      /c0: a loop of 4\.00 s changes wave speeds by \d+ %/,
    ],
    ['waves longer than the loop', { loop: { frames: 16, frameRate: 8 } }, /periods longer than the loop/],
    [
      'foam that never fades',
      { foam: { coverage: 0.02, decayTime: 6 } },
      /c0: foam decays in 6\.00 s, too slowly for its loop: 26 % of it never fades \(taken out/,
    ],
    [
      'foam that is kept',
      { foam: { coverage: 0.02, decayTime: 6, residue: 'keep' } },
      /26 % of it never fades\./,
    ],
    [
      'a surface that folds',
      {
        systems: [{ ...swell, significantHeight: 0.5 }],
        loop: { frames: 64, frameRate: 8 },
        foam: 'off',
        maps: { height: 'exr' },
        shaping: { horizontalScale: 2.6 },
        cascades: [{ patch: 30, resolution: 128 }],
      },
      /c0: the surface folds over itself/,
    ],
    [
      '8-bit heights',
      { maps: { height: { format: 'png', bits: 8, range: '2 m' } }, foam: 'off' },
      /c0: height in 8 bits has steps of 16 mm, dithered/,
    ],
  ])('%s', (_, changes, words) => {
    expect(warningsOf(tinySea(changes))).toMatch(words);
    expect(calm).not.toMatch(words);
  });

  it('tiling that will be seen', () => {
    expect(warningsOf(tinyTwoCascadeSea())).toMatch(/c1: its tiling will be seen \(repetition 0\.\d\d/);
  });

  it('gaps between bands', () => {
    const cascades = [
      { patch: 30, resolution: 64, band: { shortest: 8 } },
      { patch: 20, resolution: 64, band: { longest: 4 } },
    ];
    expect(warningsOf(tinySea({ cascades }))).toMatch(/No cascade holds waves from 8\.00 m to 4\.00 m/);
  });
});
