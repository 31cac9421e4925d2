import { nyquistWavelengthM } from './cascades.ts';
import type { ListedCascade, Sea, WaveSystemRequest } from './sea.ts';
import {
  HEIGHT_PER_DEPTH,
  knownHeightM,
  metres,
  peakWavelengthM,
  STEEP,
  statedHeight,
  statedHeightM,
} from './wave-heights.ts';

/** Share of the Nyquist wavenumber above which bilinear filtering loses a tenth of a cascade's slopes. */
const LARGEST_HEAD_ROOM = 0.85;

/** Least dimensionless fetch g X / U^2 of the records behind the JONSWAP growth law (from memory). */
const LEAST_DIMENSIONLESS_FETCH = 10;

/** What is possible but most likely not meant, in plain words. Needs nothing but the sea. */
export function seaWarnings(sea: Sea): readonly string[] {
  return [
    ...sea.systems.flatMap((system) => [...steepnessWarnings(system, sea), ...fetchWarnings(system, sea)]),
    ...sea.systems.flatMap((system) => bothWaysWarnings(system, sea)),
    ...shortWaveWarnings(sea),
    ...depthWarnings(sea),
    ...cascadeWarnings(sea),
    ...foamWarnings(sea),
  ];
}

function steepnessWarnings(system: WaveSystemRequest, { water }: Sea): string[] {
  const stated = statedHeight(system);
  if (stated === null || system.kind === 'measured') return [];
  const Hs = knownHeightM(system) as number;
  const wavelength = peakWavelengthM(stated, water);
  if (Hs / wavelength <= STEEP[system.kind]) return [];
  const limit = Math.round(1 / STEEP[system.kind]);
  return [
    `${system.name}: a significant height of ${metres(Hs)} is 1/${(wavelength / Hs).toFixed(1)} of the peak ` +
      `wavelength of ${metres(wavelength)}; real ${system.kind === 'swell' ? 'swell' : 'wind seas'} ` +
      `rarely exceed 1/${limit}. Lower it or lengthen the period.`,
  ];
}

function fetchWarnings(system: WaveSystemRequest, { water }: Sea): string[] {
  if (system.kind !== 'wind-sea' || system.growth === null) return [];
  const { windSpeedMps: U, fetchM: X } = system.growth;
  const xHat = (water.gravityMps2 * X) / (U * U);
  if (xHat >= LEAST_DIMENSIONLESS_FETCH) return [];
  return [
    `${system.name}: a fetch of ${metres(X)} is too short for a wind of ${Number(U.toPrecision(3))} m/s: ` +
      `g X / U^2 is ${Number(xHat.toPrecision(2))}, and the growth law was measured above ` +
      `${LEAST_DIMENSIONLESS_FETCH}. Take at least ${metres((LEAST_DIMENSIONLESS_FETCH * U * U) / water.gravityMps2)}, ` +
      'or state the height and period.',
  ];
}

function bothWaysWarnings(system: WaveSystemRequest, { shaping }: Sea): string[] {
  if (system.kind !== 'wind-sea' || system.spreading.form !== 'elfouhaily' || shaping.againstWind < 1)
    return [];
  return [
    `${system.name}: the spreading \`elfouhaily\` cannot tell waves that run with the wind from those against it, and ` +
      'sends as many either way: the sea will seem to stand. Take out those against it with ' +
      '`shaping: { againstWind: 0 }`.',
  ];
}

/** Waves this many times shorter than the record's last are wanted for their detail. */
const MISSING_DETAIL = 2;

/** A buoy ends where its hull is as long as the waves: what a camera sees near by is not in its record. */
function shortWaveWarnings({ systems, cascades, water }: Sea): string[] {
  const measured = systems.flatMap((system) => (system.kind === 'measured' ? [system] : []));
  if (measured.length < systems.length) return [];
  const lastHz = Math.max(...measured.map(({ spectrum }) => spectrum.frequencyHz.at(-1) as number));
  const last = peakWavelengthM({ significantHeightM: 0, peakPeriodS: 1 / lastHz }, water);
  const wanted =
    cascades.plan === 'auto'
      ? cascades.shortestWavelengthM
      : Math.min(...cascades.list.map((own) => shortestOf(own, cascades.headRoom)));
  if (last <= MISSING_DETAIL * wanted) return [];
  return [
    `The record ends at ${Number(lastHz.toPrecision(3))} Hz: of waves shorter than ${metres(last)} there are none, though ` +
      `the cascades reach ${metres(wanted)}. Add a \`wind-sea\` of the same wind for the short waves, or ask for ` +
      'longer ones.',
  ];
}

function shortestOf(
  { patchLengthM, resolution, shortestWavelengthM }: ListedCascade,
  headRoom: number,
): number {
  return shortestWavelengthM ?? nyquistWavelengthM(patchLengthM, resolution) / headRoom;
}

function depthWarnings({ systems, water }: Sea): string[] {
  const total = statedHeightM(systems);
  if (total <= HEIGHT_PER_DEPTH.large * water.depthM) return [];
  return [
    `The waves have a significant height of ${metres(total)}, more than half the depth of ` +
      `${metres(water.depthM)}: real waves would be breaking, which linear waves do not show.`,
  ];
}

function cascadeWarnings({ cascades }: Sea): string[] {
  if (cascades.plan === 'auto') return [];
  return cascades.list.flatMap(({ patchLengthM, resolution, shortestWavelengthM }, i) => {
    if (shortestWavelengthM === null) return [];
    const texels = (shortestWavelengthM * resolution) / patchLengthM;
    if (2 / texels <= LARGEST_HEAD_ROOM) return [];
    const four = 2 * nyquistWavelengthM(patchLengthM, resolution);
    return [
      `c${i}: its shortest wave of ${metres(shortestWavelengthM)} spans only ${texels.toFixed(2)} texels and will ` +
        `be blurred by filtering; ${metres(four)} would span four.`,
    ];
  });
}

function foamWarnings({ foam, maps }: Sea): string[] {
  const isAskedFor = foam.target.by === 'coverage' || foam.target.by === 'breaking-level';
  if (!isAskedFor || maps.some(({ map }) => map === 'foam')) return [];
  return ['Foam is described but no foam map is written: add `foam: png` to maps, or write `foam: off`.'];
}
