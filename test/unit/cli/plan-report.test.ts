import { describe, expect, it } from 'vitest';
import { planReport } from '../../../src/cli/plan-report.ts';
import {
  expectedMemoryBytes,
  loadSea,
  loopSeconds,
  type Plan,
  planBake,
  type Sea,
} from '../../../src/index.ts';
import { tinyCurrentSea, tinyEveryMapSea, tinySea, tinyTwoCascadeSea } from '../../support/tiny-seas.ts';
import { line, numberAfter, numbersIn, section, THREADS } from './report-text.ts';

// What a report says is compared with the plan it was made from, number by number; how it is laid out is free to change.

/** As wide and long as reports get: many cascades, a fraction for a frame rate, long names. */
const LARGEST_REPORT: Sea = tinySea({
  systems: [
    {
      kind: 'swell',
      name: 'a name of as many letters as are allowed',
      from: 10,
      significantHeight: 12,
      peakPeriod: 22,
    },
    { kind: 'wind-sea', from: 20, windSpeed: 24, fetch: 'unlimited', spreading: { form: 'mitsuyasu' } },
  ],
  cascades: { count: 8, resolution: 32, shortestWavelength: 0.05 },
  loop: { seconds: 101, frameRate: '24000/1001' },
  maps: {
    displacement: { format: 'png', bits: 8, range: 'survey' },
    velocity: 'exr',
    strain: 'exr',
    foam: 'png',
  },
  foam: { coverage: 'wind' },
  output: { padding: 8 },
});

const PLANS: readonly (readonly [string, Plan])[] = [
  ['demo', planBake(loadSea('demo')).plan],
  ['shallow-lagoon', planBake(loadSea('shallow-lagoon')).plan],
  ['river-mouth', planBake(loadSea('river-mouth')).plan],
  ['mobile-pond', planBake(loadSea('mobile-pond')).plan],
  ['eight cascades', planBake(LARGEST_REPORT).plan],
  ['two cascades', planBake(tinyTwoCascadeSea()).plan],
  ['every map', planBake(tinyEveryMapSea({ output: { exrChannels: 'layered', lengthUnit: 'cm' } })).plan],
  ['current', planBake(tinyCurrentSea({ shaping: { againstWind: 0.25, horizontalScale: 1.3 } })).plan],
];

/** Reports round to three digits or more: at most half of the third, which is 0.5 % of 1.00. */
function expectPrinted(printed: number, value: number): void {
  expect(Math.abs(printed - value)).toBeLessThanOrEqual(0.00501 * Math.abs(value));
}

/** Half of the second digit is 5 % of 1.0. */
function expectTwoDigits(printed: number, value: number): void {
  expect(Math.abs(printed - value)).toBeLessThanOrEqual(0.0501 * Math.abs(value));
}

/** Shares have two digits at least, and below a hundredth of a percent are told as less than that. */
function expectPercent(printed: number, share: number): void {
  if (printed === 0.01 && 100 * share < 0.01) return;
  expectTwoDigits(printed, 100 * share);
}

describe.each(PLANS)('the report on %s', (_name, plan) => {
  it('fits 100 columns, hash and all', () => {
    const lines = planReport(plan, { threads: THREADS }).split('\n');
    expect(lines.filter((text) => text.length > 100)).toEqual([]);
    expect(lines.filter((text) => text !== text.trimEnd())).toEqual([]);
  });

  it('names the plan, its seed and its engine', () => {
    const head = planReport(plan, { threads: THREADS }).split('\n\n')[0];
    expect(head).toContain(plan.title);
    expect(head).toContain(plan.hash);
    expect(head).toContain(`seed ${plan.seed}`);
    expect(head).toContain(plan.engine);
  });

  it('shows every number of every wave system', () => {
    const text = section(plan, 'Wave systems');
    for (const [s, system] of plan.systems.entries()) {
      const own = text.slice(text.indexOf(`${system.name} (${system.kind})`));
      expect(own).toContain(system.basis);
      expectPrinted(numberAfter(own, 'significant height '), system.significantHeightM);
      expectPrinted(numberAfter(own, 'peak period '), system.peakPeriodS);
      expectPrinted(numberAfter(own, 'peak wavelength '), system.peakWavelengthM);
      expect(numberAfter(own, 'direction from ')).toBeCloseTo((system.fromRad * 180) / Math.PI, 1);
      const toward = (90 - (system.towardRad * 180) / Math.PI + 720) % 360;
      expect(numberAfter(own, 'toward ')).toBeCloseTo(toward, 1);
      if (system.windSpeedMps !== null) expectPrinted(numberAfter(own, ' wind '), system.windSpeedMps);
      for (const form of [system.spectrum, system.spreading]) {
        const words = own.slice(own.indexOf(` ${form.form},`));
        const values = Object.values(form).filter((value) => typeof value === 'number');
        // In the order of the form's own keys; heights of names such as 19p5 come in between.
        const printed = numbersIn(words.slice(form.form.length + 2));
        for (const value of values)
          expect(printed.some((n) => Math.abs(n - value) <= 1e-4 * value)).toBe(true);
      }
      expectPercent(numberAfter(own, 'against it '), system.againstShare);
      const { effectiveWaves } = plan.report.systems[s];
      expect(numberAfter(own, 'carried by ')).toBe(Math.round(effectiveWaves));
    }
  });

  it('shows the sums of the sea', () => {
    const { sea } = plan.report;
    const text = section(plan, 'The sea they make');
    expectPrinted(numberAfter(text, 'asked for significant height '), sea.significantHeightM);
    expectPrinted(numberAfter(text, 'peak period '), sea.peakPeriodS);
    expectPrinted(numberAfter(text, 'peak wavelength '), sea.peakWavelengthM);
    expectPrinted(numberAfter(text, 'zero-crossing period '), sea.meanZeroCrossingPeriodS);
    expectPrinted(numberAfter(text, 'in cascades significant height '), sea.expectedHeightM);
  });

  it('shows the water, exactly, and the current', () => {
    const text = section(plan, 'Water');
    const { water, current } = plan;
    if (water.depthM === Infinity) expect(text).toContain('depth deep');
    else expect(numberAfter(text, 'depth ')).toBe(water.depthM);
    expect(numberAfter(text, 'density ')).toBe(water.densityKgpm3);
    expect(numberAfter(text, 'surface tension ')).toBe(water.surfaceTensionNpm);
    expect(numberAfter(text, 'gravity ')).toBe(water.gravityMps2);
    const speed = Math.hypot(current.eastMps, current.northMps);
    if (speed === 0) expect(text).toContain('current none');
    else {
      expectPrinted(numberAfter(text, 'current '), speed);
      const towardRad = numberAfter(text, 'm/s toward ') * (Math.PI / 180);
      expect(speed * Math.sin(towardRad)).toBeCloseTo(current.eastMps, 2);
      expect(speed * Math.cos(towardRad)).toBeCloseTo(current.northMps, 2);
    }
  });

  it('shows the shaping', () => {
    const text = section(plan, 'Shaping');
    expect(numberAfter(text, 'horizontal scale ')).toBe(plan.shaping.horizontalScale);
    expect(numberAfter(text, 'against wind ')).toBe(plan.shaping.againstWind);
    expect(text).toContain(plan.shaping.amplitudes);
  });

  it('shows each cascade in one row', () => {
    for (const [c, cascade] of plan.cascades.entries()) {
      const report = plan.report.cascades[c];
      const [, patch, texels, longest, shortest, height, slope, across, vertex, waves, ...rest] = numbersIn(
        line(plan, 'Cascades', cascade.id),
      );
      expect(patch).toBe(cascade.patchLengthM);
      expect(texels).toBe(cascade.resolution);
      expectPrinted(longest, report.longestWavelengthM);
      expectPrinted(shortest, report.shortestWavelengthM);
      expectPercent(height, report.heightVarianceShare);
      expectPercent(slope, report.slopeVarianceShare);
      expectPrinted(across, report.wavesAcross);
      expectTwoDigits(vertex, report.vertexSpacingM);
      expect(waves).toBe(Math.round(report.effectiveWaves));
      expectPrinted(rest.at(-1) as number, loopSeconds(cascade.loop));
      if (report.repetition !== null) expect(rest[0]).toBeCloseTo(report.repetition, 2);
    }
  });

  it('shows what no cascade covers', () => {
    const text = section(plan, 'Cascades');
    const { notInAnyCascade, slopeVarianceLeftOut } = plan.report.losses;
    if (notInAnyCascade >= 1e-4) expectPercent(numberAfter(text, "of the sea's energy: "), notInAnyCascade);
    expectPrinted(numberAfter(text, 'slope variance (both axes) of '), slopeVarianceLeftOut);
    expectPrinted(numberAfter(text, 'an rms slope of '), Math.sqrt(slopeVarianceLeftOut));
  });

  it('shows the loop as a whole and by cascade', () => {
    const { loop } = plan.report;
    const text = section(plan, 'Loop');
    const { firstFrame, frameCount } = plan.loop;
    expect(numbersIn(text)[0]).toBeCloseTo(loopSeconds(plan.loop), 3);
    expect(text).toContain(`${frameCount} frames`);
    expect(text).toContain(`numbered ${firstFrame} to ${firstFrame + frameCount - 1}.`);
    expectPercent(numberAfter(text, 'off by '), loop.frequencyError);
    expectPercent(numberAfter(text, 'blends between frames loses '), loop.blendingLoss);
    for (const suggestion of loop.suggestions) {
      expect(text).toContain(`(${suggestion.frameCount} frames) would cut that to`);
    }
    for (const [c, { id, loop: own }] of plan.cascades.entries()) {
      const [, seconds, frames, rate, error, slopeError] = numbersIn(line(plan, 'Loop', id));
      expect(seconds).toBeCloseTo(loopSeconds(own), 3);
      expect(frames).toBe(own.frameCount);
      expect(rate).toBeCloseTo(own.frameRate[0] / own.frameRate[1], 3);
      expectPercent(error, loop.cascades[c].frequencyError);
      expectPercent(slopeError, loop.cascades[c].slopeFrequencyError);
    }
  });

  it('shows the foam', () => {
    const text = section(plan, 'Foam');
    if (plan.foam === null) {
      expect(text).toBe('Foam off');
      return;
    }
    if (plan.foam.coverage !== null) expectPercent(numberAfter(text, 'Covers '), plan.foam.coverage);
    expect(text).toContain(`residue: ${plan.foam.residue}`);
    for (const { id, foam } of plan.cascades) {
      const [, share, coverage, ramp, decay, left] = numbersIn(line(plan, 'Foam', id));
      if (foam === null) {
        expect(share).toBe(0);
        continue;
      }
      expectPercent(share, foam.share);
      expectPercent(coverage, foam.coverage as number);
      expectPrinted(ramp, foam.rampJ);
      expectPrinted(decay, foam.decayTimeS);
      expectPercent(left, foam.loopResidue);
    }
  });

  it('shows every kind of file and the pattern of every sequence', () => {
    const text = section(plan, 'Maps');
    for (const { maps } of plan.cascades) {
      for (const { map, pattern, channels } of maps) {
        expect(text).toContain(map);
        expect(text).toContain(pattern);
        for (const { name } of channels) expect(text).toContain(`${name} `);
      }
    }
  });

  it('shows range and step of integer files as their decode rules give them', () => {
    for (const { maps } of plan.cascades) {
      for (const { pattern, sample, channels } of maps) {
        if (sample !== 'uint16') continue;
        const decodes = channels.flatMap(({ decode }) => decode ?? []);
        const ends = decodes.flatMap(({ scale, offset }) => [offset, offset + scale]);
        const perUnit = channels[0].unit.startsWith('cm') ? 10 : channels[0].unit === '1' ? 1 : 1000;
        const printed = numbersIn(line(plan, 'Maps', pattern).slice(pattern.length));
        expectPrinted(printed.at(-2) as number, Math.max(...ends));
        const step = (Math.max(...decodes.map(({ scale }) => Math.abs(scale))) / 65535) * perUnit;
        expectTwoDigits(printed.at(-1) as number, step);
      }
    }
  });

  it('shows what the bake costs', () => {
    const text = section(plan, 'Cost (estimates)');
    const { files, outputBytes, coreSeconds } = plan.report.cost;
    expect(numberAfter(text, 'files ')).toBe(files);
    const [, disk, unit] = /disk ([\d.]+) (kB|MB|GB)/.exec(text) as RegExpExecArray;
    expectPrinted(Number(disk) * { kB: 1e3, MB: 1e6, GB: 1e9 }[unit as 'kB'], outputBytes);
    expectPrinted(numberAfter(text, 'memory ') * 1e6, expectedMemoryBytes(plan, THREADS));
    // To a tenth of a second.
    expect(Math.abs(numberAfter(text, 'time ') - coreSeconds / THREADS)).toBeLessThanOrEqual(0.0501);
  });

  it('ends with the warnings', () => {
    const text = planReport(plan, { threads: THREADS }).replaceAll(/\s+/g, ' ');
    const { warnings } = plan.report;
    if (warnings.length === 0) expect(text.endsWith('No warnings. ')).toBe(true);
    for (const warning of warnings) expect(text).toContain(`- ${warning}`);
    if (warnings.length > 0) expect(text.trimEnd().endsWith(warnings.at(-1) as string)).toBe(true);
  });
});
