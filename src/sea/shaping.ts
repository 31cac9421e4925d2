import { SHAPING_DEFAULTS } from './defaults.ts';
import type { ShapingDocument } from './document.ts';
import type { Finding } from './findings.ts';
import type { BandGain, Shaping } from './sea.ts';
import { metres } from './wave-heights.ts';

/** Art direction with its defaults; bands that are empty or overlap are findings. */
export function resolvedShaping(document: ShapingDocument | undefined, findings: Finding[]): Shaping {
  const bandGains = (document?.bandGains ?? []).map(
    ({ shortest, longest, gain }): BandGain => ({
      shortestWavelengthM: shortest,
      longestWavelengthM: longest,
      gain,
    }),
  );
  bandGains.forEach((band, i) => {
    const path = ['shaping', 'bandGains', i];
    const { shortestWavelengthM, longestWavelengthM } = band;
    if (shortestWavelengthM >= longestWavelengthM) {
      findings.push({
        path: [...path, 'shortest'],
        expected: `a wave shorter than the longest of the band, ${metres(longestWavelengthM)}`,
        found: metres(shortestWavelengthM),
        remedy: 'Exchange the two or widen the band.',
      });
      return;
    }
    const other = bandGains.findIndex((earlier, j) => j < i && overlap(earlier, band));
    if (other < 0) return;
    const { shortestWavelengthM: from, longestWavelengthM: to } = bandGains[other];
    findings.push({
      path,
      expected: `a band clear of bandGains[${other}] (${metres(from)} to ${metres(to)})`,
      found: `${metres(shortestWavelengthM)} to ${metres(longestWavelengthM)}`,
      remedy: 'Let the bands touch but not overlap.',
    });
  });
  return {
    bandGains,
    againstWind: document?.againstWind ?? SHAPING_DEFAULTS.againstWind,
    horizontalScale: document?.horizontalScale ?? SHAPING_DEFAULTS.horizontalScale,
    matchHeight: document?.matchHeight ?? SHAPING_DEFAULTS.matchHeight,
    amplitudes: document?.amplitudes ?? SHAPING_DEFAULTS.amplitudes,
  };
}

function overlap(a: BandGain, b: BandGain): boolean {
  return a.shortestWavelengthM < b.longestWavelengthM && b.shortestWavelengthM < a.longestWavelengthM;
}
