import type { ManifestFoam } from '../../manifest/manifest.ts';
import { JACOBIAN_RANGE_SIGMAS } from '../../plan/encodings.ts';
import type { CascadeFacts } from '../cascade-facts.ts';
import { channelTallier } from '../channel-tally.ts';
import type { CascadeInspection, Check } from '../check.ts';
import type { FieldValues } from '../field-values.ts';
import { type FoamLaw, foamLaw } from '../foam-law.ts';
import { residual } from '../residual.ts';
import { roundingBound } from '../rounding.ts';
import { jacobianOf } from '../surface-shape.ts';
import { answering, notApplicable, type Verdict, verdict } from '../verdict.ts';

/**
 * Foam lies between 0 and 1, never fades faster than it should, round the loop as well, is made where the surface is
 * compressed below the breaking level and nowhere else, and covers what it was asked to cover.
 */
export const FOAM: Check = {
  name: 'foam',
  question: 'Does foam fade by its law from each frame to the next, the last to the first among them?',
  quick: false,
  begin({ manifest }) {
    return {
      cascade(facts) {
        const { foam, maps } = facts.cascade;
        if (foam === null || maps.foam === undefined) {
          return { verdicts: () => [notApplicable('the cascade has no foam map')] };
        }
        return foamInspection(facts, foam, manifest.sea.foam?.residue ?? 'keep');
      },
    };
  },
};

/** Span of the J codes in deviations of the compression. */
const JACOBIAN_SPAN_SIGMAS = JACOBIAN_RANGE_SIGMAS.below + JACOBIAN_RANGE_SIGMAS.above;

/** The target is met within this, or the manifest says why not. */
const COVERAGE_PERCENT = 2;

function foamInspection(facts: CascadeFacts, foam: ManifestFoam, residue: string): CascadeInspection {
  const { frameCount } = facts.cascade.loop;
  const law = foamLaw(foam, facts.cascade.loop, residue);
  const decay = decayWatch(law, facts.cascade.resolution);
  const beforeKeyed = new Map<number, Float32Array>();
  const source = residual(facts.manifest.generator.engine);
  const correlation = correlationSums();
  const tallier = channelTallier();
  return {
    frame(frame) {
      const field = frame.field('foam');
      if (field === null) return;
      decay.add(frame.index, field);
      tallier.add(field);
      const next = (frame.index + 1) % frameCount;
      if (facts.keyedFrames.includes(next)) beforeKeyed.set(next, Float32Array.from(field.values));
    },
    keyedFrame(frame) {
      const field = frame.field('foam');
      const before = beforeKeyed.get(frame.index);
      const surface = facts.surface(frame);
      if (field === null || before === undefined || surface === null) return;
      const J = jacobianOf(surface);
      correlation.add(newFoam(field, before, law), J.values);
      const predicted = new Float64Array(field.values.length);
      for (let i = 0; i < predicted.length; i++) {
        predicted[i] = Math.max(law.fresh(J.values[i]), law.faded(before[i]));
      }
      source.add(
        field,
        predicted,
        foamError(field, J.errorSquare, law, facts.cascade.statistics.jacobianDeviation),
      );
    },
    verdicts() {
      const { count, min, max, mean } = tallier.tally();
      if (count === 0) return [notApplicable('no foam map was there to be read')];
      const rows: Verdict[] = [];
      const whole = decay.frames() === frameCount;
      rows.push(whole ? decay.verdict() : notApplicable('not every frame of the loop was there to be read'));
      rows.push(answering('Does foam lie between 0 and 1?', rangeVerdict(min, max)));
      const coverage = whole
        ? coverageVerdict(foam, mean)
        : notApplicable('not every frame of the loop was there to be read');
      rows.push(answering('Does it cover what it was asked to cover?', coverage));
      const noSurface = notApplicable('no map that holds the height to be read');
      const made = source.frames() === 0 ? noSurface : source.verdict();
      rows.push(answering('Is it made where the surface is compressed, and nowhere else?', made));
      const together = source.frames() === 0 ? noSurface : correlation.verdict();
      rows.push(answering('Does it rise where the surface is compressed?', together));
      return rows;
    },
  };
}

interface DecayWatch {
  readonly add: (index: number, field: FieldValues) => void;
  readonly frames: () => number;
  readonly verdict: () => Verdict;
}

/** Largest shortfall below the faded foam of the frame before, in roundings of the two frames. */
function decayWatch(law: FoamLaw, resolution: number): DecayWatch {
  let [first, previous] = [new Float64Array(0), new Float64Array(0)];
  let opening: FieldValues | null = null;
  let [frames, lastIndex, most, where] = [0, -1, 0, ''];
  const compare = (from: Float64Array, to: Float64Array, field: FieldValues, step: string): void => {
    for (let i = 0; i < from.length; i++) {
      if (from[i] <= to[i]) continue;
      const least = law.faded(from[i]);
      if (least <= to[i]) continue;
      const allowed = roundingBound(field.rounding, from[i]) + roundingBound(field.rounding, to[i]);
      const shortfall = (least - to[i]) / allowed;
      if (shortfall > most) {
        most = shortfall;
        where = `largest from ${step}, texel ${i % resolution} east, ${Math.floor(i / resolution)} north`;
      }
    }
  };
  return {
    add(index, field) {
      if (index !== lastIndex + 1) return;
      if (index === 0) {
        first = Float64Array.from(field.values);
        previous = new Float64Array(first.length);
        opening = { ...field, values: first };
      } else compare(previous, field.values, field, `frame ${index - 1} to ${index} of the loop`);
      previous.set(field.values);
      lastIndex = index;
      frames++;
    },
    frames: () => frames,
    verdict() {
      if (opening !== null) compare(previous, first, opening, 'the last frame to the first');
      const reason =
        'foam may rise at once but never fall faster than it fades; each of the two frames is rounded by half a step';
      return verdict(most, { limit: 1 + 1e-9, unit: 'x rounding', reason }, where === '' ? [] : [where]);
    },
  };
}

function rangeVerdict(lowest: number, highest: number): Verdict {
  const beyond = Math.max(0, -lowest, highest - 1);
  const reason = 'foam is a share of a texel';
  return verdict(beyond, { limit: 0, unit: 'beyond', reason }, [`from ${lowest} to ${highest}`]);
}

function coverageVerdict({ coverage: { target }, note }: ManifestFoam, covered: number): Verdict {
  if (target === null) return notApplicable('the breaking level was given, not the coverage');
  const details = [`${(100 * covered).toPrecision(4)} % covered, ${(100 * target).toPrecision(4)} % asked`];
  if (note !== null) return { ...notApplicable(`the manifest says why it was missed: ${note}`), details };
  if (target === 0)
    return verdict(covered, { limit: 0, unit: 'covered', reason: 'none was asked for' }, details);
  const reason = 'the breaking level is solved to this';
  return verdict(
    100 * Math.abs(covered / target - 1),
    { limit: COVERAGE_PERCENT, unit: '%', reason },
    details,
  );
}

/**
 * Mean square error of predicted foam: that of J where the source is steep, that of the 16-bit codes in which J is kept
 * between frames and foam, and the rounding of the frame before.
 */
function foamError(
  field: FieldValues,
  jacobianError: number | Float64Array,
  law: FoamLaw,
  compression: number,
): Float64Array {
  const codes = (JACOBIAN_SPAN_SIGMAS * compression) / 65535;
  return Float64Array.from(field.values, (_, i) => {
    const square = typeof jacobianError === 'number' ? jacobianError : jacobianError[i];
    return (square + (codes * codes) / 12) * law.steepness ** 2 + field.rounding.meanSquare;
  });
}

/** What foam rises by from one frame to the next, beyond what rounding can feign: where waves break just then. */
function newFoam(field: FieldValues, before: Float32Array, law: FoamLaw): Float64Array {
  return Float64Array.from(field.values, (value, i) => {
    const rise = value - law.faded(before[i]);
    const feigned = roundingBound(field.rounding, value) + roundingBound(field.rounding, before[i]);
    return rise > feigned ? rise : 0;
  });
}

interface CorrelationSums {
  readonly add: (a: Float64Array, b: Float64Array) => void;
  readonly verdict: () => Verdict;
}

function correlationSums(): CorrelationSums {
  let [n, a1, b1, aa, bb, ab] = [0, 0, 0, 0, 0, 0];
  return {
    add(a, b) {
      n += a.length;
      for (let i = 0; i < a.length; i++) {
        a1 += a[i];
        b1 += b[i];
        aa += a[i] * a[i];
        bb += b[i] * b[i];
        ab += a[i] * b[i];
      }
    },
    verdict() {
      const spread = (aa / n - (a1 / n) ** 2) * (bb / n - (b1 / n) ** 2);
      if (!(spread > 0)) return notApplicable('no foam rises in the frames looked at');
      const correlation = (ab / n - (a1 / n) * (b1 / n)) / Math.sqrt(spread);
      const reason =
        'correlation of new foam and the Jacobian, which is low where the surface is compressed; foam that stays says nothing, as waves run on under it';
      return verdict(correlation, { limit: 0, unit: 'correlation', reason });
    },
  };
}
