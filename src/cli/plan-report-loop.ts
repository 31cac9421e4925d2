import type { CascadeLoopReport, FrameRate, Loop, Plan } from '../index.ts';
import { loopSeconds } from '../index.ts';
import type { Section } from './plan-report.ts';
import { numbers, paragraph, tableLines, words } from './table.ts';
import { counted, percent, rounded, seconds } from './wording.ts';

/** An error of wave speed this small is none to the eye, and not worth a sentence. */
const UNSEEN_SPEED_ERROR = 0.005;

/** What looping does to the motion, in words, then by cascade. */
export function loopSection({ loop, cascades, report }: Plan): Section {
  const rows = cascades.map((cascade, c) => loopRow(cascade.loop, report.loop.cascades[c]));
  return {
    heading: 'Loop',
    lines: [
      ...[lengthWords(loop), speedWords(report.loop), frameWords(report.loop)].flatMap(paragraph),
      '',
      ...tableLines(COLUMNS, rows),
    ],
  };
}

/** Seconds, frames and file numbers of a loop, and how that differs from what was asked for. */
function lengthWords(loop: Loop): string {
  const { frameCount, firstFrame, askedSeconds } = loop;
  const last = firstFrame + frameCount - 1;
  const length = loopSeconds(loop);
  const asked =
    askedSeconds === null || Math.abs(askedSeconds - length) < 1e-9
      ? ''
      : ` Asked for was ${seconds(askedSeconds, 6)}; a loop is a whole number of frames.`;
  return (
    `${seconds(length, 6)}: ${counted(frameCount, 'frame')} at ${frameRateWords(loop.frameRate)}, numbered ${firstFrame} to ` +
    `${last}. Frame ${last + 1} would be frame ${firstFrame} again and is not written.${asked}`
  );
}

/** How far the motion is from the true one, and which loop would cut that. */
export function speedWords(report: Plan['report']['loop']): string {
  const { peakSpeedError, frequencyError, slopeFrequencyError, longerThanLoop, suggestions } = report;
  const main =
    Math.abs(peakSpeedError) < UNSEEN_SPEED_ERROR
      ? 'The main waves run at their true speed'
      : `The main waves run ${percent(Math.abs(peakSpeedError))} ${peakSpeedError < 0 ? 'slow' : 'fast'}`;
  const cures = suggestions.map(
    (suggestion) =>
      `a loop of ${seconds(suggestion.seconds, 4)} (${counted(suggestion.frameCount, 'frame')}) would cut that to ` +
      percent(suggestion.frequencyError),
  );
  const longer =
    longerThanLoop < 0.0005
      ? ''
      : ` ${percent(longerThanLoop)} of the energy is in waves with periods longer than the loop, sped up to fit it.`;
  const all =
    `all waves together are off by ${percent(frequencyError)} (rms by energy; ` +
    `by slope ${percent(slopeFrequencyError)})`;
  return `${main}; ${all}${cures.length === 0 ? '' : `; ${cures.join(', ')}`}.${longer}`;
}

/** What frames can show: waves too fast for them, and blending between them. */
function frameWords({ aboveHalfFrames, blendingLoss, slopeBlendingLoss }: Plan['report']['loop']): string {
  const fast =
    aboveHalfFrames < 0.0005
      ? 'No wave worth mention is too fast for the frame rate.'
      : `${percent(aboveHalfFrames)} of the energy is in waves that would run backwards at this frame rate; they are ` +
        'faded out.';
  return (
    `${fast} A player that blends between frames loses ${percent(blendingLoss)} of the height variance and ` +
    `${percent(slopeBlendingLoss)} of the slope variance.`
  );
}

/** `24 frames a second`; a fraction with its decimal. */
function frameRateWords([numerator, denominator]: FrameRate): string {
  if (denominator === 1) return `${numerator} frames a second`;
  return `${numerator}/${denominator} (${rounded(numerator / denominator, 5)}) frames a second`;
}

const COLUMNS = [
  words('', ''),
  numbers('', 'loop'),
  numbers('', 'frames'),
  numbers('frames', 'a second'),
  numbers('speeds off', 'by energy'),
  numbers('', 'by slope'),
  numbers('longer', 'than loop'),
  numbers('too fast', 'for frames'),
  numbers('blending', 'loses height'),
  numbers('', 'slope'),
];

function loopRow({ frameRate }: Loop, report: CascadeLoopReport): string[] {
  const [numerator, denominator] = frameRate;
  return [
    report.id,
    seconds(report.seconds, 6),
    String(report.frameCount),
    rounded(numerator / denominator, 5),
    percent(report.frequencyError),
    percent(report.slopeFrequencyError),
    percent(report.longerThanLoop),
    percent(report.aboveHalfFrames),
    percent(report.blendingLoss),
    percent(report.slopeBlendingLoss),
  ];
}
