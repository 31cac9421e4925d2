import type { Quantity } from '../../src/image/image.ts';
import type { BakeFacts } from '../../src/verify/bake-facts.ts';
import { type CascadeFacts, cascadeFacts } from '../../src/verify/cascade-facts.ts';
import type { FieldValues } from '../../src/verify/field-values.ts';
import type { SeenFrame } from '../../src/verify/frame-reader.ts';
import { soundManifest } from '../../src/verify/manifest-file.ts';
import { wavesRequest } from '../../src/verify/waves-of-manifest.ts';

/** A finished bake as checks are given it. */
export function bakeFacts(folder: string): BakeFacts {
  const manifest = soundManifest(folder);
  return { folder, manifest, request: wavesRequest(manifest), range: null, everyFrame: true };
}

/** The first cascade of a finished bake as checks are given it. */
export function firstCascade(folder: string): CascadeFacts {
  return cascadeFacts(bakeFacts(folder), 0, [0]);
}

/** A frame that holds fields of numbers as they are, without a file; rounded with the given mean square error. */
export function frameOf(
  fields: Readonly<Partial<Record<Quantity, Float64Array>>>,
  facts: CascadeFacts,
  meanSquare = 0,
): SeenFrame {
  const [channel] = Object.values(facts.cascade.maps)[0].channels;
  const field = (quantity: Quantity): FieldValues | null => {
    const values = fields[quantity];
    if (values === undefined) return null;
    const rounding = {
      sample: 'float',
      scale: 1,
      step: 0,
      dithered: false,
      low: -Infinity,
      high: Infinity,
      meanSquare,
      clipping: 0,
    } as const;
    return { quantity, values, rounding, channel: { ...channel, quantity }, size: 0, extremes: 0 };
  };
  return { index: 0, number: 1, files: [], field };
}
