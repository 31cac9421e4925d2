import { describe, expect, it } from 'vitest';
import { speedWords } from '../../../src/cli/plan-report-loop.ts';
import { type Plan, planBake } from '../../../src/index.ts';
import { tinySea } from '../../support/tiny-seas.ts';
import { line, section } from './report-text.ts';

describe('words of a report', () => {
  const of = (changes: Record<string, unknown>): Plan => planBake(tinySea(changes)).plan;

  it('tells when a loop is not the length that was asked for', () => {
    const text = section(of({ loop: { seconds: 2, frameRate: '24000/1001' } }), 'Loop');
    expect(text).toContain('2.002 s: 48 frames at 24000/1001 (23.976) frames a second');
    expect(text).toContain('Asked for was 2 s');
    expect(section(of({ loop: { seconds: 2, frameRate: 24 } }), 'Loop')).not.toContain('Asked for');
  });

  it('tells how far the motion is off, in words, and which loop would cut that', () => {
    const words = (changes: Partial<Plan['report']['loop']>): string =>
      speedWords({ ...of({}).report.loop, longerThanLoop: 0, suggestions: [], ...changes });
    const off = { frequencyError: 0.08, slopeFrequencyError: 0.05 };
    const all = 'all waves together are off by 8 % (rms by energy; by slope 5 %)';
    const suggestion = { seconds: 8.875, frameCount: 213, frequencyError: 0.039 };
    expect(words({ ...off, peakSpeedError: -0.04, suggestions: [suggestion] })).toBe(
      `The main waves run 4 % slow; ${all}; a loop of 8.875 s (213 frames) would cut that to 3.9 %.`,
    );
    expect(words({ ...off, peakSpeedError: 0.04 })).toBe(`The main waves run 4 % fast; ${all}.`);
    expect(words({ ...off, peakSpeedError: -0.004 })).toBe(`The main waves run at their true speed; ${all}.`);
    expect(words({ ...off, longerThanLoop: 0.2 })).toContain(
      '20 % of the energy is in waves with periods longer than the loop',
    );
  });

  it('tells of waves too fast for the frames', () => {
    // At 1 frame a second waves shorter than 2 s run backwards.
    const plan = of({ loop: { frames: 8, frameRate: 1 } });
    expect(section(plan, 'Loop')).toContain('would run backwards');
    expect(section(of({ loop: { frames: 64, frameRate: 8 } }), 'Loop')).toContain('No wave worth mention');
  });

  it('tells of gaps between bands', () => {
    const plan = of({
      cascades: [
        { patch: 30, resolution: 32, band: { shortest: 8 } },
        { patch: 6.3, resolution: 32, band: { longest: 1.5 } },
      ],
    });
    expect(plan.report.losses.gaps).toHaveLength(1);
    expect(section(plan, 'Cascades')).toMatch(/No cascade holds waves between [\d.]+ m and [\d.]+ m\./);
  });

  it('lists band gains', () => {
    const bandGains = [{ shortest: '1 m', longest: '3 m', gain: 0.5 }];
    const text = section(of({ shaping: { bandGains } }), 'Shaping');
    expect(text).toContain('waves of 1 m to 3 m times 0.5');
  });

  it('tells the breaking level where that was given', () => {
    const plan = of({ foam: { breakingLevel: 0.7 } });
    expect(section(plan, 'Foam')).toContain('falls below the breaking level');
    expect(line(plan, 'Foam', 'c0')).toContain('0.7');
  });

  it('signs the channels of y-up files, whether their range is known or will be surveyed', () => {
    const maps = (range: string): Record<string, unknown> => ({
      displacement: { format: 'png', bits: 16, range },
    });
    for (const range of ['6 sigmas', 'survey']) {
      const upright = of({ maps: maps(range), output: { axes: 'y-up' }, foam: 'off' });
      expect(section(upright, 'Maps')).toContain('R east, G up, B -north;');
      expect(section(of({ maps: maps(range), foam: 'off' }), 'Maps')).toContain('R east, G north, B up;');
    }
    const normals = of({ maps: { normal: 'png' }, output: { normalGreen: 'south' }, foam: 'off' });
    expect(section(normals, 'Maps')).toContain('R east, G -north, B up;');
  });
});
