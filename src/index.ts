// The public API, by name. The command line uses nothing else.

export { bake } from './bake/bake.ts';
export { gather } from './bake/gather.ts';
export { machineThreads } from './bake/machine.ts';
export { frameRuns } from './bake/missing.ts';
export {
  BAKE_DEFAULTS,
  type BakeOptions,
  type BakeProgress,
  type BakeResult,
  type BakeStage,
  type FrameRange,
  type GatherOptions,
  type Part,
  type RunOptions,
  SYNC_POLICIES,
  type SyncPolicy,
} from './bake/options.ts';
export { expectedMemoryBytes } from './bake/resources.ts';
export type { RunReport } from './bake/run-report.ts';
export {
  type BakeStatus,
  bakeStatus,
  type CascadeStatus,
  type ProcessStatus,
  type Progress,
} from './bake/status.ts';
export { surveyedBake } from './bake/survey.ts';
export {
  CannotCreateError,
  EXIT_STATUS,
  type ExitStatus,
  InputError,
  type InputProblem,
  InternalError,
  LoopswellError,
  ReadWriteError,
  StoppedError,
  UnavailableError,
  UsageError,
} from './errors.ts';
export { FARM_DEFAULTS, type FarmFile, type FarmJob, type FarmRequest, farmJob } from './farm/farm-job.ts';
export { commandText } from './farm/shell.ts';
export { slurmScripts } from './farm/slurm.ts';
export { FARM_TEMPLATES, type FarmTemplate, farmTemplate } from './farm/templates.ts';
export type { ChannelSpec, Decode, Quantity, SampleType, Unit } from './image/image.ts';
export { manifestJsonSchema } from './manifest/json-schema.ts';
export type {
  HeightFigures,
  Manifest,
  ManifestCascade,
  ManifestChannel,
  ManifestConventions,
  ManifestFile,
  ManifestFoam,
  ManifestLoop,
  ManifestLosses,
  ManifestMap,
  ManifestSea,
  ManifestSystem,
} from './manifest/manifest.ts';
export { parseManifest } from './manifest/manifest-text.ts';
export type { Current, Water } from './physics/water.ts';
export type {
  CascadeFoam,
  CascadeLoopReport,
  CascadeReport,
  Combine,
  CostReport,
  EngineName,
  JacobianCodes,
  LoopReport,
  LoopSuggestion,
  LossReport,
  Plan,
  PlannedCascade,
  PlannedChannel,
  PlannedFoam,
  PlannedMap,
  PlannedSystem,
  PlanReport,
  SeaReport,
  SystemReport,
} from './plan/plan.ts';
export { ENGINE_NAMES } from './plan/plan.ts';
export {
  PLAN_DEFAULTS,
  type PlannedBake,
  type PlanOptions,
  planBake,
  plannedBakeOf,
} from './plan/plan-bake.ts';
export { isPlanText, parsePlan, planText } from './plan/plan-text.ts';
export { CONTACT_SHEET_DEFAULTS, type ContactSheetOptions, contactSheet } from './report/contact-sheet.ts';
export { verifyReportLines } from './report/verify-text.ts';
export type { DataFile, FileReader } from './sea/data-file.ts';
export {
  CASCADES_DEFAULTS,
  FOAM_DEFAULTS,
  LOOP_DEFAULTS,
  MAPS_DEFAULTS,
  OUTPUT_DEFAULTS,
  RANGE_DEFAULTS,
  SEA_WATER_DEFAULTS,
  SEED_DEFAULT,
  SHAPING_DEFAULTS,
  SPREADING_DEFAULTS,
} from './sea/defaults.ts';
export { seaJsonSchema } from './sea/json-schema.ts';
export {
  loadSea,
  type PresetSummary,
  presetNames,
  presetSummaries,
  presetText,
  type SeaText,
  seaText,
} from './sea/load.ts';
export { loopSeconds } from './sea/loop-length.ts';
export { type ParseSeaOptions, parseSea, seaFromObject } from './sea/parse.ts';
export type {
  AutoCascades,
  BandGain,
  CascadesRequest,
  FoamRequest,
  FrameRate,
  GrowthName,
  ListedCascade,
  ListedCascades,
  Loop,
  MapName,
  MapRequest,
  MeasuredRequest,
  MeasuredSpectrum,
  OutputConventions,
  RangePolicy,
  Sea,
  Shaping,
  SpectrumName,
  SpreadingName,
  SpreadingRequest,
  StatedHeight,
  SwellRequest,
  WaveSystemRequest,
  WindGrowth,
  WindSeaRequest,
  WindWords,
} from './sea/sea.ts';
export type { SpectrumParameters, SpreadingParameters } from './spectrum/registry.ts';
export { writeFileAtomic } from './store/atomic-file.ts';
export type { CheckResult, VerifyReport } from './verify/report.ts';
export type { MeasuredStatistics } from './verify/statistics.ts';
export {
  VERIFY_DEFAULTS,
  type VerifyExtent,
  type VerifyOptions,
  type VerifyProgress,
  verifyBake,
} from './verify/verify-bake.ts';
export { CAUTION, OUTPUT_VERSION, VERSION } from './version.ts';
export type { Band, BandBorder } from './waves/band.ts';
export type { FieldDeviations } from './waves/field-deviations.ts';
export type { CascadeWaves, WaveAmplitudes } from './waves/wave-amplitudes.ts';
