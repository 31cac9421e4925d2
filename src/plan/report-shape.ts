import type {
  CascadeLoopReport,
  CascadeReport,
  CostReport,
  LoopReport,
  LoopSuggestion,
  LossReport,
  PlanReport,
  SeaReport,
  SystemReport,
} from './plan.ts';
import { FINITE, listOf, numberFrom, orNull, record, type Shape, textOf } from './shape.ts';

const MANY = 1000;
const COUNT = numberFrom(0, Number.MAX_SAFE_INTEGER);

const sea = record<SeaReport>({
  significantHeightM: FINITE,
  expectedHeightM: FINITE,
  peakPeriodS: FINITE,
  peakWavelengthM: FINITE,
  meanZeroCrossingPeriodS: FINITE,
});

const system = record<SystemReport>({
  name: textOf(200),
  heightVarianceShare: FINITE,
  meanFrequencyShift: FINITE,
  meanDirectionShiftRad: FINITE,
  effectiveWaves: FINITE,
  zeroCellShare: FINITE,
});

const cascade = record<CascadeReport>({
  id: textOf(10),
  longestWavelengthM: FINITE,
  shortestWavelengthM: FINITE,
  heightVarianceShare: FINITE,
  slopeVarianceShare: FINITE,
  wavesAcross: FINITE,
  vertexSpacingM: FINITE,
  effectiveWaves: FINITE,
  repetition: orNull(FINITE),
  cellSumError: FINITE,
});

const losses = record<LossReport>({
  notInAnyCascade: FINITE,
  zeroCells: FINITE,
  tooFastForFrames: FINITE,
  slopeVarianceLeftOut: FINITE,
  gaps: listOf(
    record<LossReport['gaps'][number]>({ longestWavelengthM: FINITE, shortestWavelengthM: FINITE }),
    0,
    MANY,
  ),
});

const cascadeLoop = record<CascadeLoopReport>({
  id: textOf(10),
  seconds: FINITE,
  frameCount: FINITE,
  frequencyError: FINITE,
  slopeFrequencyError: FINITE,
  longerThanLoop: FINITE,
  aboveHalfFrames: FINITE,
  blendingLoss: FINITE,
  slopeBlendingLoss: FINITE,
});

const loop = record<LoopReport>({
  seconds: FINITE,
  askedSeconds: orNull(FINITE),
  frequencyError: FINITE,
  slopeFrequencyError: FINITE,
  longerThanLoop: FINITE,
  aboveHalfFrames: FINITE,
  blendingLoss: FINITE,
  slopeBlendingLoss: FINITE,
  peakSpeedError: FINITE,
  suggestions: listOf(
    record<LoopSuggestion>({ seconds: FINITE, frameCount: FINITE, frequencyError: FINITE }),
    0,
    MANY,
  ),
  cascades: listOf(cascadeLoop, 0, MANY),
});

const cost = record<CostReport>({
  files: COUNT,
  outputBytes: COUNT,
  scratchBytes: COUNT,
  sharedBytes: COUNT,
  bytesPerThread: COUNT,
  coreSeconds: COUNT,
});

/** The shape of a plan's report. */
export const REPORT: Shape<PlanReport> = record<PlanReport>({
  sea,
  systems: listOf(system, 0, MANY),
  cascades: listOf(cascade, 0, MANY),
  losses,
  loop,
  cost,
  warnings: listOf(textOf(2000), 0, MANY),
});
