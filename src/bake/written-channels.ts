import { InternalError } from '../errors.ts';
import type { ChannelSpec } from '../image/image.ts';
import { isSurveyed } from '../plan/encodings.ts';
import type { PlannedMap } from '../plan/plan.ts';

/**
 * The channels of a map with their decode rules.
 *
 * @throws InternalError while a survey of the loop has still to find them
 */
export function writtenChannels(planned: PlannedMap): readonly ChannelSpec[] {
  if (isSurveyed(planned)) return planned.channels;
  throw new InternalError(`the range of ${planned.pattern} is not known yet`);
}
