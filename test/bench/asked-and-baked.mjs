// Heights and periods asked, expected and measured, for each spectrum and a few winds: the table of the README.
// Bakes each sea and measures its files. Run after a build: node test/bench/asked-and-baked.mjs
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { bake, planBake, seaFromObject, verifyBake } from '../../dist/index.js';

const WINDS = [7, 12, 18];
const SEAS = [
  ['jonswap', { windSpeed: 0, fetch: '100 km' }],
  ['tma, 15 m deep', { windSpeed: 0, fetch: '100 km', spectrum: 'tma' }, { depth: 15 }],
  ['pierson-moskowitz', { windSpeed: 0, fetch: 'unlimited', spectrum: 'pierson-moskowitz' }],
  ['donelan-hamilton-hui', { windSpeed: 0, fetch: '100 km', spectrum: 'donelan-hamilton-hui' }],
  ['elfouhaily', { windSpeed: 0, fetch: '100 km', spectrum: 'elfouhaily' }],
  ['bretschneider', { windSpeed: 0, spectrum: 'bretschneider', stated: true }],
  ['ochi-hubble', { windSpeed: 0, spectrum: 'ochi-hubble', stated: true }],
  ['torsethaugen', { windSpeed: 0, spectrum: 'torsethaugen', stated: true }],
];

console.log('| spectrum | wind m/s | Hs asked | expected | measured | Tp asked | measured |');
console.log('|---|---|---|---|---|---|---|');
for (const [name, { stated = false, ...system }, water = {}] of SEAS) {
  for (const wind of WINDS) {
    // Two-parameter forms are asked for by the height and period of a fully developed sea of that wind.
    const given = stated
      ? {
          significantHeight: 0.0246 * wind ** 2,
          ...(name === 'ochi-hubble' ? {} : { peakPeriod: 0.77 * wind }),
        }
      : { windSpeed: wind };
    await row(name, wind, { ...system, ...given }, water, stated);
  }
}

async function row(name, wind, system, water, stated) {
  const { windSpeed, ...rest } = system;
  const keys = { kind: 'wind-sea', from: 240, ...rest, ...(stated ? {} : { windSpeed }) };
  const sea = (seconds) =>
    seaFromObject({
      seaFile: 1,
      title: name,
      seed: 5,
      water,
      systems: [keys],
      loop: { frames: 128, frameRate: `128000/${Math.round(1000 * seconds)}` },
      cascades: { count: 1, resolution: 128 },
      foam: 'off',
      maps: { displacement: { format: 'exr', sample: 'float' } },
    });
  const asked = planBake(sea(60)).plan.report.sea;
  // Sixteen peak periods: the measured period is one of whole turns, so known to 6 %.
  const planned = planBake(sea(16 * asked.peakPeriodS));
  const folder = mkdtempSync(join(tmpdir(), 'loopswell-table-'));
  try {
    await bake(planned, folder, { threads: 0 });
    const { statistics } = await verifyBake(folder);
    const [{ significantHeightM, peakPeriodS }] = statistics.cascades;
    const figures = [
      asked.significantHeightM,
      significantHeightM.expected,
      significantHeightM.measured,
      asked.peakPeriodS,
      peakPeriodS,
    ];
    console.log(`| ${name} | ${wind} | ${figures.map((figure) => figure.toFixed(2)).join(' | ')} |`);
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}
