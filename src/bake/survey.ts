import type { Decode } from '../image/image.ts';
import type { Manifest } from '../manifest/manifest.ts';
import { isInteger, isSurveyed, surveyedDecode } from '../plan/encodings.ts';
import type { Plan, PlannedCascade } from '../plan/plan.ts';
import { type PlannedBake, planHash } from '../plan/plan-bake.ts';
import type { MapName } from '../sea/sea.ts';
import { type Crew, withCrew } from './crew.ts';
import type { SurveyJob, SurveyResult } from './jobs.ts';
import { type RunOptions, threadCount } from './options.ts';
import { runJobs } from './run-jobs.ts';
import { type RunTally, runTally } from './run-report.ts';

/** Decode rules of one cascade by map, in channel order. */
export type DecodeRules = Readonly<Partial<Record<MapName, readonly Decode[]>>>;

/** Whether a plan leaves the range of some map to a survey of the loop. */
export function needsSurvey(plan: Plan): boolean {
  return !plan.cascades.every(({ maps }) => maps.every(isSurveyed));
}

/**
 * The same bake with all its ranges known: those that the plan left to a survey are found by a pass over the whole
 * loop, so that nothing is clipped and no code is wasted. A plan that is handed to many processes should be made this
 * way first: otherwise each of them surveys on its own.
 *
 * @throws UnavailableError, StoppedError
 */
export async function surveyedBake(planned: PlannedBake, options: RunOptions = {}): Promise<PlannedBake> {
  return surveyed(planned, threadCount(options.threads), options, runTally());
}

/** As `surveyedBake`, within a run. */
export async function surveyed(
  { plan, waves }: PlannedBake,
  threads: number,
  options: RunOptions,
  tally: RunTally,
): Promise<PlannedBake> {
  if (!needsSurvey(plan)) return { plan, waves };
  const amplitudes = waves.map((cascade) => cascade.amplitudes);
  // A survey neither reads nor writes files.
  const start = { plan, waves: amplitudes, folder: '', threads, options, tally };
  const rules = await withCrew(start, surveyedRules);
  tally.phase('survey');
  return { plan: withRules(plan, rules), waves };
}

async function surveyedRules(crew: Crew): Promise<readonly DecodeRules[]> {
  const { plan } = crew;
  const largest = plan.cascades.map((): Partial<Record<MapName, number[]>> => ({}));
  const jobs = plan.cascades.flatMap(({ maps, loop }, cascade): SurveyJob[] => {
    if (maps.every(isSurveyed)) return [];
    return Array.from({ length: loop.frameCount }, (_, frame) => ({ kind: 'survey', cascade, frame }));
  });
  let done = 0;
  await runJobs<SurveyJob, SurveyResult>(crew, jobs, ({ extents }, { cascade }) => {
    for (const [map, values] of Object.entries(extents) as [MapName, number[]][]) {
      const before = largest[cascade][map] ?? values.map(() => 0);
      largest[cascade][map] = values.map((value, channel) => Math.max(value, before[channel]));
    }
    crew.report('survey', ++done, jobs.length);
  });
  return plan.cascades.map((cascade, c) => rulesOf(plan, cascade, largest[c]));
}

function rulesOf(
  plan: Plan,
  cascade: PlannedCascade,
  extents: Partial<Record<MapName, number[]>>,
): DecodeRules {
  const rules = cascade.maps.flatMap(({ map, sample, channels }) => {
    const found = extents[map];
    if (found === undefined || !isInteger(sample)) return [];
    return [
      [map, channels.map(({ quantity }, c) => surveyedDecode(quantity, sample, found[c], plan.output))],
    ];
  });
  return Object.fromEntries(rules);
}

/** A plan with the decode rules it lacks filled in, and the hash that then is its own. */
export function withRules(plan: Plan, rules: readonly DecodeRules[]): Plan {
  const cascades = plan.cascades.map((cascade, c) => ({
    ...cascade,
    maps: cascade.maps.map((planned) => ({
      ...planned,
      channels: planned.channels.map((channel, i) => ({
        ...channel,
        decode: channel.decode ?? rules[c]?.[planned.map]?.[i] ?? null,
      })),
    })),
  }));
  const known = { ...plan, cascades };
  return { ...known, hash: planHash(known) };
}

/**
 * The decode rules that an earlier run found, from the manifest or the plan it left: with them the plan has that run's
 * hash, or it is another bake.
 */
export function rulesOfManifest({ cascades }: Manifest): readonly DecodeRules[] {
  return cascades.map(({ maps }) =>
    Object.fromEntries(Object.entries(maps).map(([map, { channels }]) => [map, decodesOf(channels)])),
  );
}

/** As `rulesOfManifest`; a plan may lack some itself. */
export function rulesOfPlan({ cascades }: Plan): readonly DecodeRules[] {
  return cascades.map(({ maps }) =>
    Object.fromEntries(
      maps.flatMap((planned) => (isSurveyed(planned) ? [[planned.map, decodesOf(planned.channels)]] : [])),
    ),
  );
}

function decodesOf(channels: readonly { readonly decode: Decode }[]): readonly Decode[] {
  return channels.map(({ decode }) => decode);
}
