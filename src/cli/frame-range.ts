import { InvalidArgumentError } from 'commander';

/** Frames as file numbers, inclusive. */
export interface FrameRange {
  readonly first: number;
  readonly last: number;
}

/** `10-20`, or `10` for one frame. */
export function frameRange(text: string): FrameRange {
  const match = /^(\d{1,9})(?:-(\d{1,9}))?$/.exec(text);
  if (match === null) throw new InvalidArgumentError('Expected first-last, for example 1-48.');
  const first = Number(match[1]);
  return { first, last: match[2] === undefined ? first : Number(match[2]) };
}
