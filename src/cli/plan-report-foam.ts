import type { CascadeFoam, Plan, PlannedFoam } from '../index.ts';
import type { Section } from './plan-report.ts';
import { numbers, paragraph, tableLines, words } from './table.ts';
import { percent, rounded, seconds } from './wording.ts';

const COLUMNS = [
  words('', ''),
  numbers('share of', 'the foam'),
  numbers('mean of', 'the map'),
  numbers('breaking', 'level of J'),
  numbers('ramp', 'of J'),
  numbers('decay', 'time'),
  numbers('left after', 'one loop'),
];

/** How much foam, what makes it and how long it stays. */
export function foamSection({ foam, cascades }: Plan): Section {
  if (foam === null) return { heading: 'Foam', lines: ['off'] };
  const rows = cascades.map((cascade) =>
    cascade.foam === null ? [cascade.id, '0 %', 'none', '', '', '', ''] : foamRow(cascade.id, cascade.foam),
  );
  return {
    heading: 'Foam',
    lines: [...[targetWords(foam), residueWords(foam)].flatMap(paragraph), '', ...tableLines(COLUMNS, rows)],
  };
}

function targetWords({ by, coverage }: PlannedFoam): string {
  const whole = coverage === null ? '' : `${percent(coverage)} of the water, all cascades together`;
  switch (by) {
    case 'wind':
      return `Covers ${whole}: whitecaps of this wind (Monahan & O'Muircheartaigh 1980).`;
    case 'coverage':
      return `Covers ${whole}, as the sea file says.`;
    case 'breaking-level':
      return 'Arises where J falls below the breaking level of the sea file; its coverage is what comes of that.';
  }
}

function residueWords({ residue }: PlannedFoam): string {
  return residue === 'remove'
    ? 'What foam a loop leaves behind of every breaker is taken out of the map (residue: remove).'
    : 'What foam a loop leaves behind of every breaker stays in the map (residue: keep).';
}

function foamRow(id: string, foam: CascadeFoam): string[] {
  return [
    id,
    percent(foam.share),
    foam.coverage === null ? 'open' : percent(foam.coverage),
    foam.breakingJ === null ? 'solved' : rounded(foam.breakingJ),
    rounded(foam.rampJ),
    seconds(foam.decayTimeS),
    percent(foam.loopResidue),
  ];
}
