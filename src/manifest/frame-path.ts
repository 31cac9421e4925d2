/** A printf pattern with one zero-padded frame number, as manifests have them. */
const PATTERN = /^([^%]*)%0(\d{1,2})d([^%]*)$/;

/** Whether a text is a pattern that `framePath` can fill in. */
export function isFramePattern(pattern: string): boolean {
  return PATTERN.test(pattern);
}

/** A pattern's path for one frame number, e.g. `c0/foam.%04d.png` and 7: `c0/foam.0007.png`. */
export function framePath(pattern: string, frameNumber: number): string {
  const number = (digits: string): string => String(frameNumber).padStart(Number(digits), '0');
  return pattern.replace(PATTERN, (_, before: string, digits: string, after: string) => {
    return before + number(digits) + after;
  });
}

/** The paths that a pattern can have: a regular expression with the frame number as its only group. */
export function framePathExpression(pattern: string): RegExp {
  const [, before, digits, after] = PATTERN.exec(pattern) ?? ['', pattern, '1', ''];
  const literal = (text: string): string => text.replace(/[.*+?^${}()|[\]\\]/g, '\\$&');
  return new RegExp(`^${literal(before)}(\\d{${Math.max(1, Number(digits))},})${literal(after)}$`);
}
