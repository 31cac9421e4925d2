import type { Plan } from '../index.ts';
import { type Colours, NO_COLOURS } from './colours.ts';
import { cascadesSection } from './plan-report-cascades.ts';
import { costSection } from './plan-report-cost.ts';
import { foamSection } from './plan-report-foam.ts';
import { loopSection } from './plan-report-loop.ts';
import { mapsSection, outputSection } from './plan-report-maps.ts';
import { seaSection, shapingSection, systemsSection, waterSection } from './plan-report-sea.ts';
import { indented } from './table.ts';
import { counted, WIDTH, wrapped } from './wording.ts';

/** One part of a report. */
export interface Section {
  readonly heading: string;
  /** Not indented; at most two columns narrower than the report. */
  readonly lines: readonly string[];
}

export interface PlanReportOptions {
  /** Threads that time and memory are told for. */
  readonly threads: number;
  readonly colours?: Colours;
}

/** Everything a plan decided and what it costs, in words; at most 100 columns wide. */
export function planReport(plan: Plan, { threads, colours = NO_COLOURS }: PlanReportOptions): string {
  const sections = [
    systemsSection(plan),
    seaSection(plan),
    waterSection(plan),
    shapingSection(plan),
    cascadesSection(plan),
    loopSection(plan),
    foamSection(plan),
    mapsSection(plan),
    outputSection(plan),
    costSection(plan, threads),
  ];
  const head = [
    ...wrapped(plan.title, WIDTH).map(colours.heading),
    `loopswell ${plan.generator.version}, engine ${plan.engine}, seed ${plan.seed}`,
    `plan ${plan.hash}`,
  ];
  const body = sections.flatMap(({ heading, lines }) => ['', colours.heading(heading), ...indented(lines)]);
  return `${[...head, ...body, '', ...warningLines(plan.report.warnings, colours)].join('\n')}\n`;
}

/** Warnings with their number, or the news that there is none. */
export function warningLines(warnings: readonly string[], colours: Colours): string[] {
  if (warnings.length === 0) return ['No warnings.'];
  const lines = warnings.flatMap((warning) =>
    wrapped(warning, WIDTH - 4).map((line, i) => `${i === 0 ? '  - ' : '    '}${line}`),
  );
  return [colours.warning(counted(warnings.length, 'warning')), ...lines];
}
