import { LOOP_DEFAULTS } from './defaults.ts';
import type { CascadeLoopDocument, LoopDocument } from './document.ts';
import type { DocumentPath, Finding } from './findings.ts';
import {
  decimalFraction,
  type Fraction,
  fraction,
  nearestWhole,
  numberOf,
  product,
  quotient,
} from './fraction.ts';
import { frameRateFraction, isFrameRate } from './frame-rate.ts';
import type { Loop } from './sea.ts';

const MOST_FRAMES = 100000;

/** The whole loop from any two of its seconds, frame rate and frames; null if that cannot be, with findings. */
export function resolvedLoop(document: LoopDocument | undefined, findings: Finding[]): Loop | null {
  const path = ['loop'];
  const { seconds, frameRate, frames, firstFrame = LOOP_DEFAULTS.firstFrame } = document ?? {};
  const given = [seconds, frameRate, frames].filter((value) => value !== undefined).length;
  if (given === 0) {
    const [numerator, denominator] = LOOP_DEFAULTS.frameRate;
    const rate = fraction(BigInt(numerator), BigInt(denominator));
    return timedLoop(LOOP_DEFAULTS.seconds, rate, firstFrame, path, findings);
  }
  if (given === 1) {
    findings.push({
      path,
      expected: 'two of seconds, frameRate and frames',
      found: 'one of them',
      remedy: 'Add another, for example `frameRate: 24`.',
    });
    return null;
  }
  return loopOf({ seconds, frameRate, frames }, firstFrame, path, findings);
}

/**
 * A cascade's own loop; what it leaves out is as in the whole loop.
 *
 * @returns null if the whole loop is not a multiple of it, with a finding that names what would fit.
 */
export function resolvedCascadeLoop(
  document: CascadeLoopDocument,
  whole: Loop,
  path: DocumentPath,
  findings: Finding[],
): Loop | null {
  const loop = inheritedLoop(document, whole, path, findings);
  if (loop === null) return null;
  const repeats = quotient(loopSeconds(whole), loopSeconds(loop));
  if (repeats.denominator === 1n && repeats.numerator > 0n) return loop;
  findings.push({
    path,
    expected: `a loop that fits a whole number of times into the ${secondsText(loopSeconds(whole))} s of the whole loop`,
    found: `${loop.frameCount} frames, ${secondsText(loopSeconds(loop))} s, ${numberOf(repeats).toFixed(4)} times`,
    remedy: fittingLoop(loop, whole, nearestWhole(repeats)),
  });
  return null;
}

/** Exact length of a loop, s. */
export function loopSeconds({ frameCount, frameRate: [numerator, denominator] }: Loop): Fraction {
  return fraction(BigInt(frameCount) * BigInt(denominator), BigInt(numerator));
}

function inheritedLoop(
  document: CascadeLoopDocument,
  whole: Loop,
  path: DocumentPath,
  findings: Finding[],
): Loop | null {
  const { seconds, frameRate, frames } = document;
  const { firstFrame } = whole;
  if (seconds !== undefined && frames !== undefined) return loopOf(document, firstFrame, path, findings);
  const wholeRate = fraction(BigInt(whole.frameRate[0]), BigInt(whole.frameRate[1]));
  const rate =
    frameRate === undefined ? wholeRate : frameRateFraction(frameRate, [...path, 'frameRate'], findings);
  if (rate === null) return null;
  if (frames !== undefined) return countedLoop(frames, rate, firstFrame, null, path, findings);
  if (seconds !== undefined) return timedLoop(seconds, rate, firstFrame, path, findings);
  const count = product(loopSeconds(whole), rate);
  if (count.denominator === 1n)
    return countedLoop(Number(count.numerator), rate, firstFrame, null, path, findings);
  findings.push({
    path,
    expected: `a frame rate that gives whole frames in the ${secondsText(loopSeconds(whole))} s of the whole loop`,
    found: `${numberOf(count).toFixed(3)} frames`,
    remedy: 'Choose a rate that divides the frame rate of the whole loop.',
  });
  return null;
}

/** A loop from at least two of its three numbers. */
function loopOf(
  { seconds, frameRate, frames }: CascadeLoopDocument,
  firstFrame: number,
  path: DocumentPath,
  findings: Finding[],
): Loop | null {
  if (frameRate === undefined) {
    const rate = quotient(fraction(BigInt(frames as number), 1n), decimalFraction(seconds as number));
    return countedLoop(frames as number, rate, firstFrame, seconds as number, path, findings);
  }
  const rate = frameRateFraction(frameRate, [...path, 'frameRate'], findings);
  if (rate === null) return null;
  if (seconds === undefined) return countedLoop(frames as number, rate, firstFrame, null, path, findings);
  const loop = timedLoop(seconds, rate, firstFrame, path, findings);
  if (loop === null || frames === undefined || loop.frameCount === frames) return loop;
  findings.push({
    path: [...path, 'frames'],
    expected: `${loop.frameCount} frames (${seconds} s at ${numberOf(rate)} frames a second)`,
    found: `\`${frames}\``,
    remedy: 'Leave one of seconds, frameRate and frames out.',
  });
  return null;
}

/** The loop of whole frames nearest to a length. */
function timedLoop(
  seconds: number,
  rate: Fraction,
  firstFrame: number,
  path: DocumentPath,
  findings: Finding[],
): Loop | null {
  const frames = Number(nearestWhole(product(decimalFraction(seconds), rate)));
  return countedLoop(frames, rate, firstFrame, seconds, path, findings);
}

function countedLoop(
  frameCount: number,
  rate: Fraction,
  firstFrame: number,
  askedSeconds: number | null,
  path: DocumentPath,
  findings: Finding[],
): Loop | null {
  if (frameCount < 1 || frameCount > MOST_FRAMES) {
    findings.push({
      path,
      expected: `a loop of 1 to ${MOST_FRAMES} frames`,
      found: `${frameCount} frames`,
      remedy: frameCount < 1 ? 'Lengthen it or raise the frame rate.' : 'Shorten it or lower the frame rate.',
    });
    return null;
  }
  if (!isFrameRate(rate)) {
    findings.push({
      path,
      expected: 'a frame rate from 0.1 to 1000 frames a second, a fraction of 32-bit integers',
      found: `${rate.numerator}/${rate.denominator} (frames divided by seconds)`,
      remedy: 'Give the frameRate and leave seconds or frames out.',
    });
    return null;
  }
  return {
    frameCount,
    frameRate: [Number(rate.numerator), Number(rate.denominator)],
    firstFrame,
    askedSeconds,
  };
}

/** Names the loop nearest to the asked one that fits, at its own frame rate. */
function fittingLoop(loop: Loop, whole: Loop, repeats: bigint): string {
  const rate = fraction(BigInt(loop.frameRate[0]), BigInt(loop.frameRate[1]));
  const total = product(loopSeconds(whole), rate);
  if (total.denominator === 1n) {
    for (let step = 0n; step <= total.numerator; step++) {
      for (const r of [repeats + step, repeats - step]) {
        if (r >= 1n && total.numerator % r === 0n) {
          return `Take ${total.numerator / r} frames, which fit ${r === 1n ? 'once' : `${r} times`}.`;
        }
      }
    }
  }
  return 'Take a frame rate that divides the frame rate of the whole loop.';
}

function secondsText(seconds: Fraction): string {
  return String(Number(numberOf(seconds).toPrecision(7)));
}
