import { InputError } from '../errors.ts';
import type { Manifest, ManifestSystem } from '../manifest/manifest.ts';
import type { Current, Water } from '../physics/water.ts';
import {
  directionalSpreading,
  frequencySpectrum,
  SPECTRUM_FORMS,
  SPREADING_FORMS,
} from '../spectrum/registry.ts';
import { type CascadeRequest, type SeaWavesRequest, seaWaves } from '../waves/cascade-waves.ts';
import type { CascadeWaves } from '../waves/wave-amplitudes.ts';
import { MANIFEST_PATH } from './manifest-file.ts';

/** The water a bake's waves run on. */
function waterOfManifest({ sea: { water } }: Manifest): Water {
  const { depthM, gravityMps2, densityKgpm3, surfaceTensionNpm } = water;
  return { depthM: depthM === 'deep' ? Infinity : depthM, gravityMps2, densityKgpm3, surfaceTensionNpm };
}

/** The current a bake's waves run on. */
function currentOfManifest({ sea: { water } }: Manifest): Current {
  return { eastMps: water.currentEastMps, northMps: water.currentNorthMps };
}

/**
 * What the waves of a bake were drawn from: all of it is in the manifest.
 *
 * @throws InputError where a wave system is of a form that is not known, or holds what is no number
 */
export function wavesRequest(manifest: Manifest): SeaWavesRequest {
  const { sea } = manifest;
  const water = waterOfManifest(manifest);
  sea.systems.forEach((system, s) => {
    requireKnownForm(system.spectrum, SPECTRUM_FORMS, `sea.systems.${s}.spectrum`);
    requireKnownForm(system.spreading, SPREADING_FORMS, `sea.systems.${s}.spreading`);
    requireBuildable(() => frequencySpectrum(system.spectrum, water), `sea.systems.${s}.spectrum`);
    requireBuildable(() => directionalSpreading(system.spreading), `sea.systems.${s}.spreading`);
  });
  return {
    water,
    current: currentOfManifest(manifest),
    systems: sea.systems.map(({ name, towardRad, spectrum, spreading, againstShare }: ManifestSystem) => {
      return { name, towardRad, spectrum, spreading, againstShare };
    }),
    gains: sea.shaping.bandGains,
    cascades: manifest.cascades.map(({ patchLengthM, resolution, band, loop }): CascadeRequest => {
      const { frameCount, frameRate } = loop;
      return {
        patchLengthM,
        resolution,
        band,
        frameCount,
        periodS: (frameCount * frameRate[1]) / frameRate[0],
      };
    }),
    seed: sea.seed,
    amplitudes: sea.shaping.amplitudes,
    matchHeight: sea.shaping.matchHeight,
  };
}

/**
 * The waves of a bake, drawn anew from its manifest alone, in the order of its cascades.
 *
 * @throws InputError where the manifest's sea gives no waves
 */
export function wavesOfManifest(manifest: Manifest): readonly CascadeWaves[] {
  return wavesOf(wavesRequest(manifest));
}

/** The waves of one cascade: the same as in `wavesOfManifest`, without the memory of the others. */
export function wavesOfCascade(manifest: Manifest, c: number): CascadeWaves {
  const request = wavesRequest(manifest);
  return wavesOf({ ...request, cascades: [request.cascades[c]] })[0];
}

function wavesOf(request: SeaWavesRequest): readonly CascadeWaves[] {
  let waves: readonly CascadeWaves[];
  try {
    waves = seaWaves(request);
  } catch (error) {
    // Numbers that no sea file allows can be beyond what a table or an array can be made for.
    if (!(error instanceof RangeError)) throw error;
    throw unusable('sea', 'a sea that gives waves', error.message);
  }
  const sound = waves.every(({ expectedVariance, drawnVariance }) =>
    Number.isFinite(expectedVariance + drawnVariance),
  );
  if (!sound) throw unusable('sea', 'a sea of finite height', 'one without');
  return waves;
}

/** Parameters are a form's key with numbers, or tables of numbers. */
function requireKnownForm(parameters: object, forms: readonly string[], place: string): void {
  const { form, ...numbers } = parameters as { readonly form: string };
  if (!forms.includes(form)) throw unusable(`${place}.form`, forms.join(' | '), form);
  for (const [key, value] of Object.entries(numbers)) {
    const entries: readonly unknown[] = Array.isArray(value) ? value : [value];
    const strange = entries.findIndex((entry) => typeof entry !== 'number');
    if (strange >= 0) throw unusable(`${place}.${key}`, 'a number', JSON.stringify(entries[strange]));
  }
}

/** Builds a form once: what its parameters lack shows as one error or another, whatever the form. */
function requireBuildable(build: () => unknown, place: string): void {
  try {
    build();
  } catch (error) {
    throw unusable(place, 'the parameters of its form', (error as Error).message);
  }
}

function unusable(path: string, expected: string, found: string): InputError {
  const remedy = 'Bake again: no bake writes such a manifest.';
  return new InputError(MANIFEST_PATH, [{ path, line: 0, column: 0, expected, found, remedy }]);
}
