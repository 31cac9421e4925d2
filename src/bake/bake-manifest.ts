import { InternalError } from '../errors.ts';
import type {
  Manifest,
  ManifestCascade,
  ManifestChannel,
  ManifestFoam,
  ManifestLoop,
  ManifestMap,
  ManifestSystem,
} from '../manifest/manifest.ts';
import { readingGuide } from '../manifest/reading.ts';
import type { ChannelStatistics } from '../maps/encoded-map.ts';
import type { Plan, PlannedCascade, PlannedMap, PlannedSystem } from '../plan/plan.ts';
import { loopSeconds } from '../sea/loop-length.ts';
import type { Loop, MapName } from '../sea/sea.ts';
import { CAUTION } from '../version.ts';
import { bandLimits } from '../waves/band.ts';
import { nyquistWavenumber, wavenumberStep } from '../waves/lattice.ts';
import { cascadeStatistics, seaStatistics, writtenHeights } from './bake-statistics.ts';
import { breakingJ, type FoamLevel } from './foam-level.ts';
import type { FrameEntry } from './journal-entry.ts';
import { isCodesPath } from './paths.ts';
import { writtenChannels } from './written-channels.ts';

/**
 * The manifest of a finished bake. Statistics are added in the order of frames, so that they come out the same to the
 * bit however the work was split.
 *
 * @param plan with all its ranges known
 * @param entries all frames and foam frames, by cascade, kind and frame
 * @param levels breaking level of each cascade
 * @throws InternalError if a frame is missing
 */
export function bakeManifest(
  plan: Plan,
  entries: readonly FrameEntry[],
  levels: readonly (FoamLevel | null)[],
): Manifest {
  const cascades = plan.cascades.map((cascade, c) => {
    const own = entries.filter((entry) => entry.cascade === c);
    requireWhole(cascade, own);
    return manifestCascade(plan, cascade, own, levels[c]);
  });
  const { report } = plan;
  const names = new Set(plan.cascades.flatMap(({ maps }) => maps.map(({ map }) => map)));
  return {
    format: 'loopswell-manifest',
    version: 1,
    generator: { ...plan.generator, engine: plan.engine },
    planHash: plan.hash,
    title: plan.title,
    caution: CAUTION,
    sea: manifestSea(plan),
    conventions: {
      axes: plan.output.axes,
      rowZero: plan.output.rowZero,
      uvOrigin: 'south-west',
      sampleLocation: 'texel-centre',
      uv: 'position / patchLength',
      normalGreen: plan.output.normalGreen,
      lengthUnit: plan.output.lengthUnit,
      colorSpace: 'data',
    },
    reading: readingGuide(plan.output, names),
    loop: manifestLoop(plan.loop),
    cascades,
    statistics: seaStatistics(
      plan,
      cascades,
      plan.cascades.map((_, c) => writtenHeights(entries.filter((entry) => entry.cascade === c))),
    ),
    losses: {
      notInAnyCascade: report.losses.notInAnyCascade,
      zeroCells: report.losses.zeroCells,
      tooFastForFrames: report.losses.tooFastForFrames,
      slopeVarianceLeftOut: report.losses.slopeVarianceLeftOut,
      frequencyError: report.loop.frequencyError,
    },
    files: entries
      .flatMap(({ files }) => files)
      .filter(({ path }) => !isCodesPath(path))
      .sort((a, b) => (a.path < b.path ? -1 : 1))
      .map(({ path, bytes, sha256 }) => ({ path, bytes, sha256 })),
  };
}

function requireWhole(cascade: PlannedCascade, entries: readonly FrameEntry[]): void {
  const count = (kind: FrameEntry['kind']): number => entries.filter((entry) => entry.kind === kind).length;
  const { frameCount } = cascade.loop;
  if (count('frame') !== frameCount || (cascade.foam !== null && count('foam') !== frameCount)) {
    throw new InternalError(
      `${cascade.id} has ${count('frame')} frames and ${count('foam')} of foam, not ${frameCount}`,
    );
  }
}

function manifestSea(plan: Plan): Manifest['sea'] {
  const { water, current, foam } = plan;
  const { horizontalScale, ...shaping } = plan.shaping;
  return {
    seed: plan.seed,
    water: {
      depthM: water.depthM === Infinity ? 'deep' : water.depthM,
      gravityMps2: water.gravityMps2,
      densityKgpm3: water.densityKgpm3,
      surfaceTensionNpm: water.surfaceTensionNpm,
      currentEastMps: current.eastMps,
      currentNorthMps: current.northMps,
    },
    horizontalScale,
    shaping,
    foam: foam === null ? null : { by: foam.by, coverage: foam.coverage, residue: foam.residue },
    systems: plan.systems.map(manifestSystem),
  };
}

function manifestSystem(system: PlannedSystem): ManifestSystem {
  return {
    name: system.name,
    kind: system.kind,
    basis: system.basis,
    fromDeg: (system.fromRad * 180) / Math.PI,
    towardRad: system.towardRad,
    windSpeedMps: system.windSpeedMps,
    significantHeightM: system.significantHeightM,
    peakPeriodS: system.peakPeriodS,
    peakWavelengthM: system.peakWavelengthM,
    againstShare: system.againstShare,
    spectrum: system.spectrum,
    spreading: system.spreading,
  };
}

function manifestLoop(loop: Loop): ManifestLoop {
  const { frameRate, frameCount, firstFrame } = loop;
  return { seconds: loopSeconds(loop), frameRate, frameCount, firstFrame };
}

function manifestCascade(
  plan: Plan,
  cascade: PlannedCascade,
  entries: readonly FrameEntry[],
  level: FoamLevel | null,
): ManifestCascade {
  const maps: Partial<Record<MapName, ManifestMap>> = {};
  for (const planned of cascade.maps) maps[planned.map] = manifestMap(cascade, planned, entries);
  const { kMinRadPerM, kMaxRadPerM } = bandLimits(cascade.band);
  return {
    id: cascade.id,
    patchLengthM: cascade.patchLengthM,
    resolution: cascade.resolution,
    wavenumberRadPerM: [
      Math.max(kMinRadPerM, wavenumberStep(cascade)),
      Math.min(kMaxRadPerM, nyquistWavenumber(cascade)),
    ],
    band: cascade.band,
    loop: manifestLoop({ ...cascade.loop, firstFrame: plan.loop.firstFrame }),
    amplitudesHash: cascade.amplitudesHash,
    statistics: cascadeStatistics(plan, cascade, entries, maps),
    foam: level === null ? null : manifestFoam(cascade, level, maps.foam),
    maps,
  };
}

function manifestFoam(
  cascade: PlannedCascade,
  level: FoamLevel,
  written: ManifestMap | undefined,
): ManifestFoam | null {
  const { foam } = cascade;
  if (foam === null) return null;
  return {
    share: foam.share,
    // The level was solved on 16-bit codes; half floats hold a little more or less.
    coverage: { target: foam.coverage, measured: written?.channels[0].written.mean ?? level.coverage },
    note: level.note,
    breakingJ: breakingJ(foam, level.breakingCode),
    rampJ: foam.rampJ,
    decayTimeS: foam.decayTimeS,
    loopResidue: foam.loopResidue,
  };
}

function manifestMap(
  cascade: PlannedCascade,
  planned: PlannedMap,
  entries: readonly FrameEntry[],
): ManifestMap {
  const frames = entries.flatMap(({ statistics }) => {
    const own = statistics[planned.map];
    return own === undefined ? [] : [own];
  });
  const texels = cascade.resolution ** 2 * frames.length;
  const channels = writtenChannels(planned).map(
    ({ name, quantity, unit, decode }, c): ManifestChannel => ({
      name,
      quantity,
      unit,
      decode: { scale: decode.scale, offset: decode.offset },
      written: writtenFigures(
        frames.map((frame) => frame[c]),
        texels,
      ),
    }),
  );
  return {
    pattern: planned.pattern,
    format: planned.format,
    sample: planned.sample,
    combine: planned.combine,
    dither: planned.dither,
    range: planned.range.policy,
    channels,
  };
}

function writtenFigures(frames: readonly ChannelStatistics[], texels: number): ManifestChannel['written'] {
  let [min, max, sum, sumOfSquares, clipped] = [Infinity, -Infinity, 0, 0, 0];
  for (const frame of frames) {
    min = Math.min(min, frame.min);
    max = Math.max(max, frame.max);
    sum += frame.sum;
    sumOfSquares += frame.sumOfSquares;
    clipped += frame.clipped;
  }
  const mean = sum / texels;
  return { min, max, mean, deviation: Math.sqrt(Math.max(0, sumOfSquares / texels - mean * mean)), clipped };
}
