import { codecFor } from '../codec/registry.ts';
import type { Image } from '../image/image.ts';
import { framePath } from '../manifest/frame-path.ts';
import type { Plan, PlannedCascade, PlannedMap } from '../plan/plan.ts';
import { CAUTION, VERSION } from '../version.ts';

/** The file of one map of one frame: its path below the bake folder and its bytes. */
export function encodedFile(
  plan: Plan,
  cascade: PlannedCascade,
  planned: PlannedMap,
  image: Image,
  frame: number,
): { readonly path: string; readonly bytes: Uint8Array } {
  const frameNumber = plan.loop.firstFrame + frame;
  const bytes = codecFor(planned.format).encode(image, {
    software: `loopswell ${VERSION}`,
    frameRate: cascade.loop.frameRate,
    frameNumber,
    comments: `${plan.title}: ${planned.map} of cascade ${cascade.id}. ${CAUTION}`,
    attributes: {
      cascade: cascade.id,
      patchLengthM: cascade.patchLengthM,
      frameCount: cascade.loop.frameCount,
      planHash: plan.hash,
    },
  });
  return { path: framePath(planned.pattern, frameNumber), bytes };
}
