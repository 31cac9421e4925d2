import type { Water } from '../physics/water.ts';
import { type BretschneiderParameters, bretschneider } from './bretschneider.ts';
import { type Cos2sParameters, cos2s } from './cos-2s.ts';
import { type DonelanBannerParameters, donelanBanner } from './donelan-banner.ts';
import { type DonelanHamiltonHuiParameters, donelanHamiltonHui } from './donelan-hamilton-hui.ts';
import {
  type ElfouhailyParameters,
  type ElfouhailySpreadingParameters,
  elfouhaily,
  elfouhailySpreading,
} from './elfouhaily.ts';
import type { DirectionalSpreading, FrequencySpectrum } from './form.ts';
import { type HasselmannParameters, hasselmann } from './hasselmann.ts';
import { type JonswapParameters, jonswap } from './jonswap.ts';
import { type MitsuyasuParameters, mitsuyasu } from './mitsuyasu.ts';
import { type OchiHubbleParameters, ochiHubble } from './ochi-hubble.ts';
import { type PiersonMoskowitzParameters, piersonMoskowitz } from './pierson-moskowitz.ts';
import { type TabulatedParameters, tabulated } from './tabulated.ts';
import { type TabulatedSpreadingParameters, tabulatedSpreading } from './tabulated-spreading.ts';
import { type TmaParameters, tma } from './tma.ts';
import { type TorsethaugenParameters, torsethaugen } from './torsethaugen.ts';
import { type WrappedNormalParameters, wrappedNormal } from './wrapped-normal.ts';

/** The parameters of a published frequency spectrum, by its form; plain numbers, so that they can be written down. */
export interface SpectrumForms {
  'pierson-moskowitz': PiersonMoskowitzParameters;
  jonswap: JonswapParameters;
  tma: TmaParameters;
  bretschneider: BretschneiderParameters;
  'donelan-hamilton-hui': DonelanHamiltonHuiParameters;
  elfouhaily: ElfouhailyParameters;
  'ochi-hubble': OchiHubbleParameters;
  torsethaugen: TorsethaugenParameters;
  tabulated: TabulatedParameters;
}

/** The parameters of a published directional spreading, by its form. */
export interface SpreadingForms {
  'cos-2s': Cos2sParameters;
  mitsuyasu: MitsuyasuParameters;
  hasselmann: HasselmannParameters;
  'donelan-banner': DonelanBannerParameters;
  'wrapped-normal': WrappedNormalParameters;
  elfouhaily: ElfouhailySpreadingParameters;
  tabulated: TabulatedSpreadingParameters;
}

export type SpectrumForm = keyof SpectrumForms;
export type SpreadingForm = keyof SpreadingForms;

/** A frequency spectrum to be built. */
export type SpectrumParameters = SpectrumForms[SpectrumForm] & {
  /** Multiplies S; 1 leaves the published form as it is, other values meet a stated height. */
  readonly energyFactor: number;
};

/** A directional spreading to be built. */
export type SpreadingParameters = SpreadingForms[SpreadingForm];

type SpectrumBuilder<P> = (parameters: P, water: Water) => FrequencySpectrum;
type SpreadingBuilder<P> = (parameters: P) => DirectionalSpreading;

const SPECTRUM_BUILDERS: { readonly [F in SpectrumForm]: SpectrumBuilder<SpectrumForms[F]> } = {
  'pierson-moskowitz': piersonMoskowitz,
  jonswap,
  tma,
  bretschneider,
  'donelan-hamilton-hui': donelanHamiltonHui,
  elfouhaily,
  'ochi-hubble': ochiHubble,
  torsethaugen,
  tabulated,
};

const SPREADING_BUILDERS: { readonly [F in SpreadingForm]: SpreadingBuilder<SpreadingForms[F]> } = {
  'cos-2s': cos2s,
  mitsuyasu,
  hasselmann,
  'donelan-banner': donelanBanner,
  'wrapped-normal': wrappedNormal,
  elfouhaily: elfouhailySpreading,
  tabulated: tabulatedSpreading,
};

/** The published forms there are, in the order of registration. */
export const SPECTRUM_FORMS: readonly SpectrumForm[] = Object.freeze(
  Object.keys(SPECTRUM_BUILDERS) as SpectrumForm[],
);
export const SPREADING_FORMS: readonly SpreadingForm[] = Object.freeze(
  Object.keys(SPREADING_BUILDERS) as SpreadingForm[],
);

/** The frequency spectrum of some parameters, on this water. */
export function frequencySpectrum(parameters: SpectrumParameters, water: Water): FrequencySpectrum {
  // The table's type pairs every builder with its own parameters; the compiler cannot follow that through a key.
  const build = SPECTRUM_BUILDERS[parameters.form] as SpectrumBuilder<SpectrumParameters>;
  const spectrum = build(parameters, water);
  const { energyFactor } = parameters;
  return { ...spectrum, density: (omega) => energyFactor * spectrum.density(omega) };
}

/** The directional spreading of some parameters. */
export function directionalSpreading(parameters: SpreadingParameters): DirectionalSpreading {
  const build = SPREADING_BUILDERS[parameters.form] as SpreadingBuilder<SpreadingParameters>;
  return build(parameters);
}
