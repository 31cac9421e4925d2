import fc from 'fast-check';
import type { Water } from '../../src/physics/water.ts';
import type {
  SpectrumForm,
  SpectrumForms,
  SpreadingForm,
  SpreadingForms,
} from '../../src/spectrum/registry.ts';

/** A number between two bounds, both included. */
export function between(min: number, max: number): fc.Arbitrary<number> {
  return fc.double({ min, max, noNaN: true });
}

/** A positive number, even in its logarithm. */
export function spread(min: number, max: number): fc.Arbitrary<number> {
  return between(Math.log(min), Math.log(max)).map(Math.exp);
}

/** Water from a puddle to the deep sea. */
export const anyWater: fc.Arbitrary<Water> = fc.record({
  depthM: fc.oneof(spread(0.1, 1e4), fc.constant(Infinity)),
  gravityMps2: between(1, 25),
  densityKgpm3: between(990, 1040),
  surfaceTensionNpm: fc.oneof(fc.constant(0), between(0.02, 0.08)),
});

const omegaPeakRadPerS = spread(0.2, 20);
const significantHeightM = fc.oneof(fc.constant(0), spread(1e-3, 20));
const alpha = between(1e-3, 0.05);
const peakEnhancement = between(1, 10);
const swellNarrowing = between(0, 1);
const inverseWaveAge = spread(0.1, 6);

const elfouhailyWind = {
  windSpeedMps: between(0.5, 40),
  inverseWaveAge: between(0.5, 5),
  frictionVelocityMps: between(0.01, 3),
};

/** Frequencies of a table, Hz, ascending in steps of any width. */
const frequencyHz = fc
  .tuple(between(0.02, 0.1), fc.array(between(0.003, 0.1), { minLength: 2, maxLength: 12 }))
  .map(([first, steps]) => {
    const list = [first];
    for (const step of steps) list.push(list[list.length - 1] + step);
    return list;
  });

/** Moments of a distribution of two lobes, or now and then what noise makes of them: moments that no distribution has. */
const circularMoments = fc
  .record({
    r: between(0, 0.98),
    at: between(-Math.PI, Math.PI),
    r2: between(0, 1),
    at2: between(-Math.PI, Math.PI),
  })
  .map(({ r, at, r2, at2 }) => ({
    cos1: r * Math.cos(at),
    sin1: r * Math.sin(at),
    cos2: r2 * Math.cos(at2),
    sin2: r2 * Math.sin(at2),
  }));

/** Parameters for every registered spectrum: a new form does not compile until it is here, and so meets all laws. */
export const SPECTRUM_ARBITRARIES: { readonly [F in SpectrumForm]: fc.Arbitrary<SpectrumForms[F]> } = {
  'pierson-moskowitz': fc.record({
    form: fc.constant('pierson-moskowitz' as const),
    windSpeed19p5Mps: between(0.5, 40),
  }),
  jonswap: fc.record({ form: fc.constant('jonswap' as const), alpha, omegaPeakRadPerS, peakEnhancement }),
  tma: fc.record({ form: fc.constant('tma' as const), alpha, omegaPeakRadPerS, peakEnhancement }),
  bretschneider: fc.record({
    form: fc.constant('bretschneider' as const),
    significantHeightM,
    omegaPeakRadPerS,
  }),
  'donelan-hamilton-hui': fc.record({
    form: fc.constant('donelan-hamilton-hui' as const),
    omegaPeakRadPerS,
    inverseWaveAge,
  }),
  elfouhaily: fc.record({ form: fc.constant('elfouhaily' as const), ...elfouhailyWind }),
  'ochi-hubble': fc
    .record({ height: significantHeightM, share: between(0, 1), omega: spread(0.2, 3), ratio: between(1, 8) })
    .chain(({ height, share, omega, ratio }) =>
      fc.record({
        form: fc.constant('ochi-hubble' as const),
        lowHeightM: fc.constant(share * height),
        lowOmegaPeakRadPerS: fc.constant(omega),
        lowShape: between(0.7, 8),
        highHeightM: fc.constant((1 - share) * height),
        highOmegaPeakRadPerS: fc.constant(omega * ratio),
        highShape: between(0.7, 8),
      }),
    ),
  torsethaugen: fc.record({
    form: fc.constant('torsethaugen' as const),
    significantHeightM: fc.oneof(fc.constant(0), spread(0.1, 20)),
    omegaPeakRadPerS: between(2, 24).map((Tp) => (2 * Math.PI) / Tp),
  }),
  tabulated: frequencyHz.chain((frequencies) =>
    fc.record({
      form: fc.constant('tabulated' as const),
      frequencyHz: fc.constant(frequencies),
      densityM2PerHz: fc.array(fc.oneof(fc.constant(0), between(0, 50)), {
        minLength: frequencies.length,
        maxLength: frequencies.length,
      }),
    }),
  ),
};

/** Parameters for every registered spreading. */
export const SPREADING_ARBITRARIES: { readonly [F in SpreadingForm]: fc.Arbitrary<SpreadingForms[F]> } = {
  'cos-2s': fc.record({
    form: fc.constant('cos-2s' as const),
    s: fc.oneof(fc.constantFrom(0, 1e4), between(0, 100), spread(1e-3, 1e4)),
    omegaPeakRadPerS,
    swellNarrowing,
  }),
  mitsuyasu: fc.record({
    form: fc.constant('mitsuyasu' as const),
    omegaPeakRadPerS,
    inverseWaveAge,
    swellNarrowing,
  }),
  hasselmann: fc.record({
    form: fc.constant('hasselmann' as const),
    omegaPeakRadPerS,
    inverseWaveAge,
    swellNarrowing,
  }),
  'donelan-banner': fc.record({ form: fc.constant('donelan-banner' as const), omegaPeakRadPerS }),
  'wrapped-normal': fc.record({
    form: fc.constant('wrapped-normal' as const),
    standardDeviationRad: spread(0.01, 10),
  }),
  elfouhaily: fc.record({
    form: fc.constant('elfouhaily' as const),
    ...elfouhailyWind,
    gravityMps2: between(1, 25),
  }),
  tabulated: frequencyHz.chain((frequencies) =>
    fc
      .array(circularMoments, { minLength: frequencies.length, maxLength: frequencies.length })
      .map((moments) => ({
        form: 'tabulated' as const,
        frequencyHz: frequencies,
        cos1: moments.map(({ cos1 }) => cos1),
        sin1: moments.map(({ sin1 }) => sin1),
        cos2: moments.map(({ cos2 }) => cos2),
        sin2: moments.map(({ sin2 }) => sin2),
      })),
  ),
};
