import colours from 'picocolors';
import { isTerminal, type OutputStream, type ProgramIo } from './io.ts';

/** What may be coloured; each is the identity where colour is not wanted. */
export interface Colours {
  readonly heading: (text: string) => string;
  readonly warning: (text: string) => string;
  readonly error: (text: string) => string;
}

export const NO_COLOURS: Colours = { heading: String, warning: String, error: String };

/** Colours for a stream: none off a terminal or where NO_COLOR is set to anything (no-color.org). */
export function coloursOf(stream: OutputStream, env: ProgramIo['env']): Colours {
  const refused = env.NO_COLOR !== undefined && env.NO_COLOR !== '';
  if (refused || !isTerminal(stream, env)) return NO_COLOURS;
  const { bold, yellow, red } = colours.createColors(true);
  return { heading: bold, warning: yellow, error: red };
}
