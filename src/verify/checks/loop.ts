import type { Quantity } from '../../image/image.ts';
import type { ManifestCascade, ManifestLoop } from '../../manifest/manifest.ts';
import type { Check } from '../check.ts';
import { relativeToMedian, STEADINESS_REASON, steadyLimit } from '../steadiness.ts';
import { answering, firstOf, notApplicable, type Verdict, verdict } from '../verdict.ts';
import { watchedChannels } from '../watched-channels.ts';

/**
 * The mean square difference of each frame and the next, the last and the first among them: a loop that pops, a frame
 * that is out of its place or there twice shows as a step unlike the others.
 */
export const LOOP: Check = {
  name: 'loop',
  question: 'Is the step from the last frame to the first no larger than the others?',
  quick: false,
  begin({ manifest }) {
    return {
      cascade({ cascade }) {
        const watched = watchedChannels(cascade).map((quantity) => stepWatch(quantity));
        return {
          frame(frame) {
            for (const { quantity, add } of watched) {
              const values = frame.field(quantity)?.values;
              if (values !== undefined) add(frame.index, values);
            }
          },
          verdicts() {
            const rows = [
              answering('Is the loop whole and of its stated length?', lengthVerdict(cascade, manifest.loop)),
            ];
            const { frameCount } = cascade.loop;
            const whole = watched.filter(({ frames }) => frames() === frameCount);
            if (whole.length < watched.length || whole.length === 0 || frameCount < 4) {
              const reason =
                frameCount < 4
                  ? 'a loop of fewer than four frames has no other steps to compare with'
                  : 'not every frame of the loop was there to be read';
              return [...rows, notApplicable(reason)];
            }
            const steps = whole.map(({ quantity, steps }) => ({ quantity, steps: steps() }));
            return [
              ...rows,
              closingVerdict(steps),
              answering('Does no other step stand out?', innerVerdict(steps)),
            ];
          },
        };
      },
    };
  },
};

interface StepWatch {
  readonly quantity: Quantity;
  readonly add: (index: number, values: Float64Array) => void;
  readonly frames: () => number;
  /** Mean square step from each frame to the next, the closing one last. */
  readonly steps: () => readonly number[];
}

function stepWatch(quantity: Quantity): StepWatch {
  // To seven digits, which is far more than a step has to be known to.
  let [first, previous] = [new Float32Array(0), new Float32Array(0)];
  const steps: number[] = [];
  let [frames, lastIndex] = [0, -1];
  return {
    quantity,
    add(index, values) {
      if (index !== lastIndex + 1) return;
      if (index === 0) {
        first = Float32Array.from(values);
        previous = new Float32Array(values.length);
      }
      if (index > 0) steps.push(meanSquareStep(previous, values));
      previous.set(values);
      lastIndex = index;
      frames++;
    },
    frames: () => frames,
    steps: () => [...steps, meanSquareStep(previous, first)],
  };
}

function meanSquareStep(from: Float32Array, to: Float32Array | Float64Array): number {
  let sum = 0;
  for (let i = 0; i < from.length; i++) {
    const step = to[i] - from[i];
    sum += step * step;
  }
  return sum / from.length;
}

interface Steps {
  readonly quantity: Quantity;
  readonly steps: readonly number[];
}

function closingVerdict(watched: readonly Steps[]): Verdict {
  return worst(
    watched.map(({ quantity, steps }) => {
      const inner = steps.slice(0, -1);
      return { quantity, step: relativeToMedian(steps[inner.length], inner), limit: steadyLimit(inner) };
    }),
  );
}

function innerVerdict(watched: readonly Steps[]): Verdict {
  return worst(
    watched.map(({ quantity, steps }) => {
      const inner = steps.slice(0, -1);
      return { quantity, step: relativeToMedian(Math.max(...inner), inner), limit: steadyLimit(inner) };
    }),
  );
}

/** The channel whose step is largest next to what is allowed. */
function worst(
  rows: readonly { readonly quantity: Quantity; readonly step: number; readonly limit: number }[],
): Verdict {
  const [most] = [...rows].sort((a, b) => b.step / b.limit - a.step / a.limit);
  const limit = { limit: most.limit, unit: 'x median', reason: `mean square steps: ${STEADINESS_REASON}` };
  return verdict(
    most.step,
    limit,
    firstOf(
      rows.map(
        ({ quantity, step, limit }) =>
          `${quantity}: ${step.toPrecision(4)} of at most ${limit.toPrecision(4)}`,
      ),
    ),
  );
}

/** How far frames, rate and seconds contradict each other and the whole loop, in frames. */
function lengthVerdict({ loop }: ManifestCascade, whole: ManifestLoop): Verdict {
  const seconds = ({ frameCount, frameRate: [numerator, denominator] }: ManifestLoop): number =>
    (frameCount * denominator) / numerator;
  const repeats = seconds(whole) / seconds(loop);
  const error = Math.abs(repeats - Math.max(1, Math.round(repeats))) * loop.frameCount;
  const apart = loop.firstFrame === whole.firstFrame ? 0 : Math.abs(loop.firstFrame - whole.firstFrame);
  const stated = (Math.abs(whole.seconds - seconds(whole)) / seconds(whole)) * whole.frameCount;
  const reason = 'the whole loop is a multiple of each cascade’s, to the rounding of seconds';
  const details = [
    `${loop.frameCount} frames at ${loop.frameRate.join('/')} per second, ${repeats} times in the whole loop`,
  ];
  return verdict(error + apart + stated, { limit: 1e-9, unit: 'frames', reason }, details);
}
