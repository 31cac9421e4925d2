import { readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { planReport } from '../../../src/cli/plan-report.ts';
import {
  CASCADES_DEFAULTS,
  EXIT_STATUS,
  LOOP_DEFAULTS,
  loadSea,
  machineThreads,
  type Plan,
  parsePlan,
  planBake,
  planText,
  SEA_WATER_DEFAULTS,
  surveyedBake,
} from '../../../src/index.ts';
import { TINY_SEA_YAML } from '../../support/tiny-seas.ts';
import { CapturedStream, capturedIo, inNewFolder, outcomeOf } from './captured-io.ts';

const POND: Plan = planBake(loadSea('mobile-pond')).plan;

describe('plan', () => {
  it("prints the report for all of the machine's threads", async () => {
    const { status, stdout, stderr } = await outcomeOf(['plan', 'mobile-pond']);
    expect(status).toBe(EXIT_STATUS.done);
    expect(stdout).toBe(planReport(POND, { threads: machineThreads() }));
    expect(stderr).toBe('');
  });

  it('says on a terminal that it is planning, and takes that back', async () => {
    const io = capturedIo({ stderr: new CapturedStream({ isTTY: true }) });
    const { stdout, stderr } = await outcomeOf(['plan', 'mobile-pond'], io);
    expect(stderr).toBe('planning mobile-pond ...\r\u001b[K');
    expect(stdout).toContain(POND.title);
  });

  it('prints the whole plan as JSON, deep water and all', async () => {
    const { status, stdout } = await outcomeOf(['plan', 'mobile-pond', '--json']);
    expect(status).toBe(EXIT_STATUS.done);
    expect(POND.water.depthM).toBe(Infinity);
    expect(parsePlan(stdout, 'stdout')).toEqual(POND);
  });

  it('saves the plan with its ranges surveyed, and shows a saved plan as it shows its sea', async () => {
    await inNewFolder(async (folder) => {
      const path = join(folder, 'deep', 'pond.json');
      const saved = await outcomeOf(['plan', 'mobile-pond', '--threads', '0', '--save', path]);
      expect(saved.status).toBe(EXIT_STATUS.done);
      expect(saved.stderr).toContain(path);
      const { plan } = await surveyedBake(planBake(loadSea('mobile-pond')), { threads: 0 });
      expect(readFileSync(path, 'utf8')).toBe(planText(plan));
      expect((await outcomeOf(['plan', path, '--threads', '0'])).stdout).toBe(saved.stdout);
    });
  });

  it('ends with 73 where the plan cannot be saved', async () => {
    await inNewFolder(async (folder) => {
      const file = join(folder, 'file');
      writeFileSync(file, '');
      const save = ['--threads', '0', '--save', join(file, 'pond.json')];
      const { status, stdout } = await outcomeOf(['plan', 'mobile-pond', ...save]);
      expect(status).toBe(EXIT_STATUS.cannotCreate);
      expect(stdout).toBe('');
    });
  });

  it('names the file in the problems of a sea', async () => {
    await inNewFolder(async (folder) => {
      const sea = join(folder, 'broken.yaml');
      writeFileSync(sea, TINY_SEA_YAML.replace('peakPeriod', 'peekPeriod'));
      const { status, stderr } = await outcomeOf(['plan', sea]);
      expect(status).toBe(EXIT_STATUS.badInput);
      expect(stderr).toContain(`${sea}:8:`);
      expect(stderr).toContain('`peakPeriod`');
    });
  });

  it('tells in its help what a sea file may leave out, from the defaults of the library', async () => {
    const { stdout } = await outcomeOf(['plan', '--help']);
    expect(stdout).toContain(`${LOOP_DEFAULTS.seconds} s at ${LOOP_DEFAULTS.frameRate[0]} frames a second`);
    expect(stdout).toContain(`${CASCADES_DEFAULTS.count} of ${CASCADES_DEFAULTS.resolution} texels`);
    expect(stdout).toContain(`gravity ${SEA_WATER_DEFAULTS.gravityMps2}`);
  });
});
