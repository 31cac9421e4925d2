import type { CascadeFacts } from '../cascade-facts.ts';
import { exponentialSumBounds, FALSE_ALARM_RATE } from '../chance.ts';
import type { Check } from '../check.ts';
import type { MeasuredWaves } from '../measured-waves.ts';
import { forEachBandWave } from '../surface.ts';
import { answering, FLAT, firstOf, notApplicable, type Verdict, verdict } from '../verdict.ts';

/**
 * Variance by bands of wavenumber, measured against what the asked-for spectrum gives the waves of the tile: bands of a
 * third of an octave, joined until each holds enough waves to say something.
 */
export const SPECTRUM: Check = {
  name: 'spectrum',
  question: 'Does each band of wavelengths carry the energy that the spectrum gives it?',
  quick: false,
  begin() {
    return {
      cascade(facts) {
        return {
          verdicts({ waves, withoutWaves }) {
            if (waves === null) return [notApplicable(withoutWaves)];
            if (waves.onShell === 0 || facts.target().m0 === 0) return [notApplicable(FLAT)];
            return [
              bandVerdict(facts, waves),
              answering('Is there no wave where the spectrum has none?', emptyVerdict(facts, waves)),
            ];
          },
        };
      },
    };
  },
};

const BAND_RATIO = 2 ** (1 / 3);
/** Effective waves that a band must hold. */
const LEAST_WAVES = 12;
/** Two rules of integration over the cells differ by less in any band. */
const QUADRATURE = 0.02;

interface Band {
  /** Wavenumbers of its first and last wave, rad/m. */
  kFirst: number;
  kLast: number;
  measured: number;
  /** Target variance of each wave, m^2. */
  targets: number[];
}

function bandVerdict(facts: CascadeFacts, measured: MeasuredWaves): Verdict {
  const { amplitudes, matchHeight } = facts.manifest.sea.shaping;
  const gaussian = amplitudes === 'gaussian';
  // Matching scaled all waves by one factor, which the waves drawn anew tell; what is left is the realisation.
  const { expectedVariance, drawnVariance } = facts.waves();
  const scale = matchHeight && drawnVariance > 0 ? drawnVariance / expectedVariance : 1;
  const bands = spectralBands(facts, measured);
  if (bands.length === 0) return notApplicable('the cascade holds no wave');
  // Every band may raise a false alarm.
  const probability = FALSE_ALARM_RATE / bands.length;
  const rows = bands.map((band) => {
    const target = band.targets.reduce((sum, P) => sum + P, 0);
    const ratio = (scale * band.measured) / target;
    const [low, high] = gaussian ? exponentialSumBounds(band.targets, probability) : [target, target];
    const limit =
      Math.abs((ratio < 1 ? low : high) / target - 1) + QUADRATURE + roundingShare(measured, band, target);
    return { band, ratio, error: Math.abs(ratio - 1), limit };
  });
  const [worst] = [...rows].sort((a, b) => b.error / b.limit - a.error / a.limit);
  const reason = gaussian
    ? `one realisation of a band’s waves stays inside this but for once in ${1 / FALSE_ALARM_RATE} of all bands together`
    : 'every wave has its expected amplitude; two rules of integration differ by less';
  return verdict(
    100 * worst.error,
    { limit: 100 * worst.limit, unit: '%', reason },
    firstOf(
      rows.map(({ band, ratio, limit }) => bandSentence(band, ratio, limit)),
      24,
    ),
  );
}

function spectralBands(facts: CascadeFacts, { variance }: MeasuredWaves): readonly Band[] {
  const { variance: target } = facts.target();
  const waves: { readonly k: number; readonly i: number }[] = [];
  forEachBandWave(facts, ({ i, kx, ky }) => {
    if (target[i] > 0) waves.push({ i, k: Math.sqrt(kx * kx + ky * ky) });
  });
  waves.sort((a, b) => a.k - b.k);
  const bands: Band[] = [];
  let band: Band | null = null;
  for (const { k, i } of waves) {
    if (band === null || (k > band.kFirst * BAND_RATIO && effectiveWaves(band.targets) >= LEAST_WAVES)) {
      band = { kFirst: k, kLast: k, measured: 0, targets: [] };
      bands.push(band);
    }
    band.kLast = k;
    band.measured += variance[i];
    band.targets.push(target[i]);
  }
  const last = bands.at(-1);
  if (last !== undefined && bands.length > 1 && effectiveWaves(last.targets) < LEAST_WAVES) {
    bands.pop();
    const before = bands[bands.length - 1];
    before.kLast = last.kLast;
    before.measured += last.measured;
    before.targets.push(...last.targets);
  }
  return bands;
}

function effectiveWaves(targets: readonly number[]): number {
  let [sum, squares] = [0, 0];
  for (const P of targets) {
    sum += P;
    squares += P * P;
  }
  return squares === 0 ? 0 : (sum * sum) / squares;
}

/** What white rounding noise adds to a band, as a share of its target. */
function roundingShare(
  { rounding, frameCount, lattice }: MeasuredWaves,
  { targets }: Band,
  target: number,
): number {
  return ((2 * rounding) / (frameCount * lattice.resolution ** 2)) * (targets.length / target);
}

function bandSentence({ kFirst, kLast }: Band, ratio: number, limit: number): string {
  const length = (k: number): string => ((2 * Math.PI) / k).toPrecision(3);
  return `${length(kFirst)} m to ${length(kLast)} m: ${ratio.toFixed(3)} of the target, 1 ± ${limit.toFixed(3)} allowed`;
}

/**
 * Variance on the shell where the target has no wave, nor next to one: rounding alone. The rim is left out because two
 * rules of integration may differ on a cell that the spectrum just touches.
 */
function emptyVerdict(
  facts: CascadeFacts,
  { variance, onShell, rounding, frameCount, lattice }: MeasuredWaves,
): Verdict {
  const N = lattice.resolution;
  const { variance: target } = facts.target();
  let [found, waves] = [0, 0];
  for (let i = 0; i < variance.length; i++) {
    if (hasTargetNearby(target, i, N)) continue;
    found += variance[i];
    waves++;
  }
  const noise = ((2 * rounding) / (frameCount * N * N)) * (waves / onShell);
  const reason = 'rounding of the files, evenly over all waves; twice as much is allowed';
  return verdict(found / onShell, { limit: 2 * noise + 1e-11, unit: 'of the variance', reason });
}

function hasTargetNearby(target: Float64Array, i: number, N: number): boolean {
  const x = i % N;
  const y = Math.floor(i / N);
  for (let dy = -1; dy <= 1; dy++) {
    const row = ((y + dy + N) % N) * N;
    for (let dx = -1; dx <= 1; dx++) if (target[row + ((x + dx + N) % N)] > 0) return true;
  }
  return false;
}
