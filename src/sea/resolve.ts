import type { Current, Water } from '../physics/water.ts';
import { resolvedCascades } from './cascades.ts';
import { CURRENT_DEFAULTS, OUTPUT_DEFAULTS, SEA_WATER_DEFAULTS, SEED_DEFAULT } from './defaults.ts';
import type { OutputDocument, SeaDocument, SystemDocument, WaterDocument } from './document.ts';
import type { Finding } from './findings.ts';
import { resolvedFoam } from './foam.ts';
import { resolvedLoop } from './loop.ts';
import { resolvedMaps } from './maps.ts';
import type { DataFiles } from './measured.ts';
import type { OutputConventions, Sea, WaveSystemRequest } from './sea.ts';
import { resolvedShaping } from './shaping.ts';
import { heightFindings } from './wave-heights.ts';
import { resolvedSystems } from './wave-systems.ts';

/** A document whose sections passed the schema one by one: null in place of those that did not. */
export type CheckedSections = {
  readonly [K in keyof Omit<SeaDocument, 'systems'>]: SeaDocument[K] | null;
} & { readonly systems: readonly (SystemDocument | null)[] | null };

/**
 * The sea that a document asks for, every default filled in. Rules that tie several keys together are checked as far
 * as the sections they need are sound, so that one report holds all problems.
 *
 * @param files reads the files of measured systems, and collects what is wrong inside them
 * @returns null if a section is missing; then, or if `findings` or `files.errors` grew, there is no sea.
 */
export function resolvedSea(sections: CheckedSections, files: DataFiles, findings: Finding[]): Sea | null {
  const { title } = sections;
  const water = sections.water === null ? null : resolvedWater(sections.water);
  const current = sections.water === null ? null : resolvedCurrent(sections.water, findings);
  const systems =
    sections.systems === null ? null : resolvedSystems(sections.systems, water, files, findings);
  if (systems !== null && water !== null) findings.push(...heightFindings(systems, water));
  const shaping = sections.shaping === null ? null : resolvedShaping(sections.shaping, findings);
  const loop = sections.loop === null ? null : resolvedLoop(sections.loop, findings);
  const cascades = sections.cascades === null ? null : resolvedCascades(sections.cascades, loop, findings);

  const isComplete = (
    all: readonly (WaveSystemRequest | null)[] | null,
  ): all is readonly WaveSystemRequest[] => all !== null && !all.includes(null);
  const foam =
    sections.foam !== null && sections.maps !== null && isComplete(systems)
      ? resolvedFoam(
          sections.foam,
          systems,
          sections.cascades ?? undefined,
          sections.maps?.foam !== undefined,
          findings,
        )
      : null;
  const hasFoam = foam !== null && foam.target.by !== 'off';
  const maps = sections.maps === null ? null : resolvedMaps(sections.maps, hasFoam, findings);
  const output = sections.output === null ? null : resolvedOutput(sections.output);

  if (title === null || water === null || current === null || !isComplete(systems)) return null;
  if (shaping === null || loop === null || cascades === null || foam === null || maps === null) return null;
  if (sections.seed === null || output === null) return null;
  const seed = sections.seed ?? SEED_DEFAULT;
  return { seaFile: 1, title, seed, water, current, systems, shaping, loop, cascades, foam, maps, output };
}

function resolvedWater(document: WaterDocument | undefined): Water {
  return {
    depthM: document?.depth ?? SEA_WATER_DEFAULTS.depthM,
    gravityMps2: document?.gravity ?? SEA_WATER_DEFAULTS.gravityMps2,
    densityKgpm3: document?.density ?? SEA_WATER_DEFAULTS.densityKgpm3,
    surfaceTensionNpm: document?.surfaceTension ?? SEA_WATER_DEFAULTS.surfaceTensionNpm,
  };
}

/** A current runs toward its direction, unlike wind and waves: clockwise from north, so east is the sine. */
function resolvedCurrent(document: WaterDocument | undefined, findings: Finding[]): Current {
  const current = document?.current;
  if (current === undefined || (current.speed === 0 && current.toward === undefined)) return CURRENT_DEFAULTS;
  if (current.toward === undefined) {
    findings.push({
      path: ['water', 'current', 'toward'],
      expected: 'the direction the current runs toward',
      found: 'nothing',
      remedy: 'Add for example `toward: 90 deg` for a current to the east.',
    });
    return CURRENT_DEFAULTS;
  }
  const { speed, toward } = current;
  return { eastMps: componentMps(speed, Math.sin(toward)), northMps: componentMps(speed, Math.cos(toward)) };
}

/** sin(pi) is 1e-16, not 0: a current due north must not give every wave two frequencies for that. */
function componentMps(speed: number, share: number): number {
  return Math.abs(share) < 1e-12 ? 0 : speed * share;
}

function resolvedOutput(document: OutputDocument | undefined): OutputConventions {
  return {
    axes: document?.axes ?? OUTPUT_DEFAULTS.axes,
    rowZero: document?.rowZero ?? OUTPUT_DEFAULTS.rowZero,
    normalGreen: document?.normalGreen ?? OUTPUT_DEFAULTS.normalGreen,
    lengthUnit: document?.lengthUnit ?? OUTPUT_DEFAULTS.lengthUnit,
    exrChannels: document?.exrChannels ?? OUTPUT_DEFAULTS.exrChannels,
    padding: document?.padding ?? OUTPUT_DEFAULTS.padding,
  };
}
