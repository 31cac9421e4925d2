import type { Sea } from '../sea/sea.ts';
import { seaWarnings } from '../sea/warnings.ts';
import { HIGHEST_BREAKING_J } from './foam-plan.ts';
import type { Plan, PlannedCascade } from './plan.ts';

/** Waves per patch below which single crests are recognised when they come round again. */
const FEW_WAVES = 25;
/** Limits of what the lattice may do to a system: 5 % of frequency, 5 degrees, 8 waves, 0.5 % of energy at k = 0. */
const FREQUENCY_SHIFT = 0.05;
const DIRECTION_SHIFT_RAD = (5 * Math.PI) / 180;
const FEWEST_WAVES = 8;
const ZERO_CELL_SHARE = 0.005;
/** What the quadrature of the cells may miss of a band. */
const CELL_SUM_ERROR = 0.005;
/** Repetition of a finer cascade above which its tiling is seen. */
const SEEN_REPETITION = 0.2;
const FREQUENCY_ERROR = 0.1;
const LOST_SHARE = 0.005;
/** Foam of a loop shorter than this many decay times never fades in it. */
const DECAY_TIMES = 3;

const percent = (share: number, digits = 0): string => `${(100 * share).toFixed(digits)} %`;

/** Everything about a plan that its user should know before paying for the bake, in plain sentences. */
export function planWarnings(sea: Sea, plan: Omit<Plan, 'hash'>): readonly string[] {
  return [
    ...seaWarnings(sea),
    ...heightWarnings(plan),
    ...latticeWarnings(plan),
    ...loopWarnings(plan),
    ...foamWarnings(plan),
    ...mapWarnings(plan),
  ];
}

function heightWarnings({ report, water }: Omit<Plan, 'hash'>): string[] {
  const warnings: string[] = [];
  const { significantHeightM: Hs } = report.sea;
  // A stated height is checked with the sea file; here the height that growth laws and gains led to.
  if (Hs > 0.5 * water.depthM) {
    warnings.push(
      `The sea's height of ${Hs.toFixed(2)} m is ${percent(Hs / water.depthM)} of the depth: waves of that height would be breaking.`,
    );
  }
  const { notInAnyCascade, tooFastForFrames, gaps } = report.losses;
  if (notInAnyCascade > LOST_SHARE) {
    warnings.push(
      `${percent(notInAnyCascade, 1)} of the sea's energy is in no cascade: add a cascade, more resolution, or widen the bands.`,
    );
  }
  if (tooFastForFrames > LOST_SHARE) {
    warnings.push(
      `${percent(tooFastForFrames, 1)} of the energy turns too fast for the frame rate and is left out; a higher frame rate would show it.`,
    );
  }
  for (const gap of gaps) {
    warnings.push(
      `No cascade holds waves from ${gap.longestWavelengthM.toPrecision(3)} m to ${gap.shortestWavelengthM.toPrecision(3)} m.`,
    );
  }
  return warnings;
}

function latticeWarnings({ report }: Omit<Plan, 'hash'>): string[] {
  const warnings: string[] = [];
  for (const system of report.systems) {
    if (Math.abs(system.meanFrequencyShift) > FREQUENCY_SHIFT) {
      warnings.push(
        `${system.name}: the tiles shift its mean frequency by ${percent(system.meanFrequencyShift, 1)}; a longer first patch holds it better.`,
      );
    }
    if (Math.abs(system.meanDirectionShiftRad) > DIRECTION_SHIFT_RAD) {
      const degrees = (system.meanDirectionShiftRad * 180) / Math.PI;
      warnings.push(
        `${system.name}: the tiles turn its mean direction by ${degrees.toFixed(1)} degrees; a longer first patch holds it better.`,
      );
    }
    if (system.effectiveWaves < FEWEST_WAVES) {
      warnings.push(
        `${system.name}: only ${system.effectiveWaves.toFixed(0)} waves carry it, so it looks blotchy and repeats visibly; lengthen the first patch.`,
      );
    }
    if (system.zeroCellShare > ZERO_CELL_SHARE) {
      warnings.push(
        `${system.name}: ${percent(system.zeroCellShare, 1)} of its energy is in waves longer than the patch and is lost; lengthen the first patch.`,
      );
    }
  }
  const [first, ...finer] = report.cascades;
  if (first.effectiveWaves < FEW_WAVES && report.systems.every((s) => s.effectiveWaves >= FEWEST_WAVES)) {
    warnings.push(
      `The same ${first.effectiveWaves.toFixed(0)} waves carry the long tile: its crests are recognised when they return; keep less than two tiles in view.`,
    );
  }
  for (const { id, cellSumError } of report.cascades) {
    if (Math.abs(cellSumError) > CELL_SUM_ERROR) {
      warnings.push(
        `${id}: its waves hold ${percent(Math.abs(cellSumError), 1)} ${cellSumError > 0 ? 'more' : 'less'} than the band they stand for: the sea is too narrow for this tile; lengthen the patch.`,
      );
    }
  }
  for (const cascade of finer) {
    if ((cascade.repetition ?? 0) > SEEN_REPETITION) {
      warnings.push(
        `${cascade.id}: its tiling will be seen (repetition ${(cascade.repetition ?? 0).toFixed(2)}, good is 0.10 or less); give it a longer patch or the sea one more cascade.`,
      );
    }
  }
  return warnings;
}

function loopWarnings({ report }: Omit<Plan, 'hash'>): string[] {
  const warnings: string[] = [];
  for (const loop of report.loop.cascades) {
    const carries = report.cascades.find(({ id }) => id === loop.id)?.heightVarianceShare ?? 0;
    // A cascade of short waves is judged by what it shows, its slope; the one that carries the height, by both.
    const error = carries > 0.05 ? loop.frequencyError : loop.slopeFrequencyError;
    if (error > FREQUENCY_ERROR) {
      const grade = error > 0.25 ? 'The water will look wrong' : 'The water may look fast or slow';
      warnings.push(
        `${loop.id}: a loop of ${loop.seconds.toFixed(2)} s changes wave speeds by ${percent(error)} (rms). ${grade}; a longer loop is the cure.`,
      );
    }
    if (loop.longerThanLoop > 0.05 && carries > 0.05) {
      warnings.push(
        `${loop.id}: ${percent(loop.longerThanLoop)} of its energy is in waves with periods longer than the loop; they are sped up to fit.`,
      );
    }
  }
  return warnings;
}

function foamWarnings({ cascades, foam, water, shaping }: Omit<Plan, 'hash'>): string[] {
  const warnings: string[] = [];
  if (foam !== null && cascades.every((cascade) => cascade.foam === null)) {
    warnings.push(
      'No cascade holds waves of a metre or more, which is where foam comes from: the foam map is left out. State foam.shares to have it.',
    );
  }
  for (const cascade of cascades) {
    if (cascade.foam !== null && cascade.foam.loopResidue > Math.exp(-DECAY_TIMES) * 1.001) {
      warnings.push(
        `${cascade.id}: foam decays in ${cascade.foam.decayTimeS.toFixed(2)} s, too slowly for its loop: ${percent(cascade.foam.loopResidue)} of it never fades${foam?.residue === 'remove' ? ' (taken out of the map)' : ''}.`,
      );
    }
    if (cascade.foam?.breakingJ != null && cascade.foam.breakingJ > HIGHEST_BREAKING_J) {
      warnings.push(
        `${cascade.id}: a breaking level of ${cascade.foam.breakingJ} puts foam on water that is hardly compressed.`,
      );
    }
    if (cascade.deviations.compression > 0.3) {
      const depth = water.depthM < Infinity ? ' (or the water is very shallow for this sea)' : '';
      warnings.push(
        `${cascade.id}: the surface folds over itself in places (compression ${cascade.deviations.compression.toFixed(2)}, horizontalScale ${shaping.horizontalScale})${depth}; normals point down there.`,
      );
    }
  }
  return warnings;
}

function mapWarnings({ cascades }: Omit<Plan, 'hash'>): string[] {
  const coarse = cascades.flatMap((cascade) =>
    cascade.maps.flatMap((map) => coarseStep(cascade, map.map) ?? []),
  );
  return coarse;
}

/** The warning for an 8-bit map of lengths, with its step in millimetres where the plan knows it. */
function coarseStep(cascade: PlannedCascade, name: string): string | null {
  const map = cascade.maps.find(({ map: m }) => m === name);
  if (map === undefined || map.sample !== 'uint8' || !['displacement', 'height'].includes(name)) return null;
  const extent = 4 * cascade.deviations.height;
  const known = map.channels.every(({ decode }) => decode !== null);
  const steps = map.channels.map(({ decode, unit }) => {
    const metres = unit === 'cm' ? 0.01 : 1;
    return decode === null ? (2 * extent) / 255 : (Math.abs(decode.scale) * metres) / 255;
  });
  const largest = 1000 * Math.max(...steps);
  return `${cascade.id}: ${name} in 8 bits has steps of ${known ? '' : 'about '}${largest.toPrecision(2)} mm${map.dither ? ', dithered' : ''}; 16 bits would have 256 times finer ones.`;
}
