import { describe, expect, it } from 'vitest';
import {
  EXIT_STATUS,
  parseSea,
  presetNames,
  presetSummaries,
  presetText,
  seaText,
} from '../../../src/index.ts';
import { outcomeOf } from './captured-io.ts';

describe('presets', () => {
  it('lists every preset with what it is for', async () => {
    const { status, stdout } = await outcomeOf(['presets']);
    expect(status).toBe(EXIT_STATUS.done);
    for (const { name, purpose } of presetSummaries()) {
      expect(stdout).toMatch(new RegExp(`^${name} `, 'm'));
      expect(stdout.replaceAll(/\s+/g, ' ')).toContain(purpose);
    }
    expect(stdout.split('\n').filter((line) => line.length > 100)).toEqual([]);
  });

  it.each(presetNames())('prints the sea file of %s as it is', async (name) => {
    const { status, stdout } = await outcomeOf(['presets', name]);
    expect(status).toBe(EXIT_STATUS.done);
    expect(stdout).toBe(presetText(name));
    expect(() => parseSea(stdout, { readFile: seaText(name).readFile })).not.toThrow();
  });

  it('suggests the nearest name', async () => {
    const { status, stderr } = await outcomeOf(['presets', 'open-sea-gael']);
    expect(status).toBe(EXIT_STATUS.badInput);
    expect(stderr).toContain('Did you mean `open-sea-gale`?');
  });
});
