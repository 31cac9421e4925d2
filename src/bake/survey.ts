import { isInteger, isSurveyed, surveyedDecode } from '../plan/encodings.ts';
import type { Plan, PlannedCascade } from '../plan/plan.ts';
import type { MapName } from '../sea/sea.ts';
import { type Crew, runJobs } from './crew.ts';
import type { SurveyedRules, SurveyJob, SurveyResult } from './jobs.ts';

/**
 * Finds the ranges that the plan left to a survey: the largest magnitude of each channel over the whole loop, so that
 * nothing is clipped and no code is wasted. A pass over all frames of the cascades concerned.
 *
 * @returns decode rules by map for each cascade; empty where the plan knows them all
 */
export async function surveyedRules(crew: Crew): Promise<readonly SurveyedRules[]> {
  const { plan } = crew;
  const largest = plan.cascades.map((): Partial<Record<MapName, number[]>> => ({}));
  const jobs = plan.cascades.flatMap((cascade, c): SurveyJob[] => {
    if (cascade.maps.every(isSurveyed)) return [];
    return Array.from({ length: cascade.loop.frameCount }, (_, frame) => ({
      kind: 'survey',
      cascade: c,
      frame,
    }));
  });
  let done = 0;
  await runJobs<SurveyResult>(crew, jobs, ({ extents }, { cascade }) => {
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
): SurveyedRules {
  const rules = cascade.maps.flatMap((planned) => {
    const { map, sample, channels } = planned;
    const found = extents[map];
    if (found === undefined || !isInteger(sample)) return [];
    return [
      [map, channels.map(({ quantity }, c) => surveyedDecode(quantity, sample, found[c], plan.output))],
    ];
  });
  return Object.fromEntries(rules);
}
