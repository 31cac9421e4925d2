import type { CascadeFacts } from '../cascade-facts.ts';
import { exponentialSumBounds, FALSE_ALARM_RATE } from '../chance.ts';
import type { Check } from '../check.ts';
import type { MeasuredWaves } from '../measured-waves.ts';
import { type BandWave, forEachBandWave } from '../surface.ts';
import { answering, FLAT, notApplicable, type Verdict, verdict } from '../verdict.ts';

/**
 * Energy-weighted mean direction of travel and spread, of the waves as the moving height shows them: a wave counts
 * where it goes, so that a sea that runs backwards fails as much as one that was turned.
 *
 *     (a, b) = sum of E (cos theta, sin theta) / sum of E,   spread = sqrt(2 (1 - |(a, b)|))
 *
 * Source: Kuik et al. 1988 (from memory), with the energy of every wave instead of one frequency's.
 */
export const DIRECTION: Check = {
  name: 'direction',
  question: 'Do the waves go where they were asked to go?',
  quick: false,
  begin() {
    return {
      cascade(facts) {
        return {
          verdicts({ waves, withoutWaves }) {
            if (waves === null) return [notApplicable(withoutWaves)];
            if (waves.onShell === 0 || facts.target().m0 === 0) return [notApplicable(FLAT)];
            const [mean, spread] = directionVerdicts(facts, waves);
            return [mean, answering('Do they spread about that direction as they were asked to?', spread)];
          },
        };
      },
    };
  },
};

/** Two rules of integration over the cells differ by less. */
const QUADRATURE_DEG = 0.1;
const DEGREES = 180 / Math.PI;

interface Moments {
  readonly toward: number;
  /** |(a, b)|: 1 for one direction, 0 for none. */
  readonly concentration: number;
}

function moments(energy: Float64Array, waves: readonly BandWave[]): Moments {
  let [sum, east, north] = [0, 0, 0];
  for (const { i, kx, ky } of waves) {
    const k = Math.sqrt(kx * kx + ky * ky);
    sum += energy[i];
    east += (energy[i] * kx) / k;
    north += (energy[i] * ky) / k;
  }
  return { toward: Math.atan2(north, east), concentration: Math.hypot(east, north) / sum };
}

function spreadDeg(concentration: number): number {
  return DEGREES * Math.sqrt(2 * (1 - Math.min(1, Math.max(-1, concentration))));
}

function directionVerdicts(facts: CascadeFacts, measured: MeasuredWaves): readonly [Verdict, Verdict] {
  const band: BandWave[] = [];
  forEachBandWave(facts, (wave) => band.push(wave));
  const { variance: P, m0 } = facts.target();
  const asked = moments(P, band);
  const found = moments(measured.variance, band);
  const chance = facts.manifest.sea.shaping.amplitudes === 'gaussian';

  // To first order, across: sum of E sin(theta - asked) / sum of E r; along: sum of E (cos(theta - asked) - r) / sum of E.
  const across: number[] = [];
  const along: number[] = [];
  for (const { i, kx, ky } of band) {
    if (P[i] === 0) continue;
    const theta = Math.atan2(ky, kx) - asked.toward;
    across.push((P[i] / m0) * (Math.sin(theta) / asked.concentration));
    along.push((P[i] / m0) * (Math.cos(theta) - asked.concentration));
  }
  const noChance: readonly [number, number] = [0, 0];
  const [right, left] = chance ? exponentialSumBounds(across, FALSE_ALARM_RATE) : noChance;
  const [wide, narrow] = chance ? exponentialSumBounds(along, FALSE_ALARM_RATE) : noChance;

  const turn = Math.atan2(Math.sin(found.toward - asked.toward), Math.cos(found.toward - asked.toward));
  const turnLimit = DEGREES * Math.abs(turn < 0 ? right : left) + QUADRATURE_DEG;
  const askedSpread = spreadDeg(asked.concentration);
  const foundSpread = spreadDeg(found.concentration);
  const bound = spreadDeg(asked.concentration + (foundSpread > askedSpread ? wide : narrow));
  const spreadLimit = Math.abs(bound - askedSpread) + QUADRATURE_DEG;
  const reason = chance
    ? `one realisation of the waves stays inside this but for once in ${1 / FALSE_ALARM_RATE}`
    : 'every wave has its expected amplitude; two rules of integration differ by less';
  const limit = (degrees: number): { limit: number; unit: string; reason: string } => {
    return { limit: Math.min(180, degrees), unit: 'deg', reason };
  };
  return [
    verdict(DEGREES * Math.abs(turn), limit(turnLimit), [
      `toward ${compass(found.toward)} (from ${compass(found.toward + Math.PI)}), asked ${compass(asked.toward)}`,
    ]),
    verdict(Math.abs(foundSpread - askedSpread), limit(spreadLimit), [
      `spread ${foundSpread.toFixed(2)} deg, asked ${askedSpread.toFixed(2)} deg`,
    ]),
  ];
}

/** An angle counter-clockwise from east as degrees clockwise from north. */
function compass(rad: number): string {
  const degrees = 90 - DEGREES * rad;
  return `${(((degrees % 360) + 360) % 360).toFixed(1)} deg`;
}
