import { key32, uniform } from '../math/random.ts';
import type { CascadeFacts } from './cascade-facts.ts';
import type { Surface } from './surface.ts';

/** Strain at keyed random texels of a few frames, and how much of the surface is folded over. */
export interface FoldWatch {
  readonly add: (surface: Surface, frame: number) => void;
  /** Share of the texels seen where J < 0; null where none was seen. */
  readonly share: () => number | null;
  /** Dxx, Dyy, Dxy of each sample in turn. */
  readonly samples: () => readonly number[];
}

/** Samples a frame: eight frames give 160 000 in all, enough for shares of a few in a hundred thousand. */
const SAMPLES_A_FRAME = 20_000;

export function foldWatch({ cascade, manifest }: CascadeFacts): FoldWatch {
  const key: [number, number] = [key32(`${manifest.planHash} ${cascade.id}`), key32('folding')];
  const samples: number[] = [];
  let [folded, texels] = [0, 0];
  return {
    add({ Dxx, Dyy, Dxy }, frame) {
      texels += Dxx.length;
      for (let i = 0; i < Dxx.length; i++) {
        if ((1 + Dxx[i]) * (1 + Dyy[i]) < Dxy[i] * Dxy[i]) folded++;
      }
      for (let draw = 0; draw < SAMPLES_A_FRAME; draw++) {
        const i = Math.floor(uniform([draw, frame, 0, 0], key) * Dxx.length);
        samples.push(Dxx[i], Dyy[i], Dxy[i]);
      }
    },
    share: () => (texels === 0 ? null : folded / texels),
    samples: () => samples,
  };
}

/** Share of the sea's surface where J of the summed strain is below 0: cascades are independent, so samples are paired. */
export function foldedShareOfSum(watches: readonly FoldWatch[]): number | null {
  const cascades = watches.map(({ samples }) => samples());
  const count = Math.min(...cascades.map(({ length }) => length));
  if (cascades.length === 0 || count === 0) return null;
  let folded = 0;
  for (let i = 0; i < count; i += 3) {
    let [Dxx, Dyy, Dxy] = [0, 0, 0];
    for (const samples of cascades) {
      Dxx += samples[i];
      Dyy += samples[i + 1];
      Dxy += samples[i + 2];
    }
    if ((1 + Dxx) * (1 + Dyy) < Dxy * Dxy) folded++;
  }
  return folded / (count / 3);
}
