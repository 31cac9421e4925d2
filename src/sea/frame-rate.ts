import type { Finding } from './findings.ts';
import { type DocumentPath, valueText } from './findings.ts';
import { decimalFraction, type Fraction, fraction, numberOf } from './fraction.ts';

const LOWEST = 0.1;
const HIGHEST = 1000;

/** OpenEXR keeps a frame rate as a 32-bit integer over a 32-bit integer; so do we. */
const LARGEST_TERM = 2n ** 31n - 1n;

/**
 * A frame rate as written, exactly: `24`, `24 fps`, `24000/1001`. Rates of broadcast rounded to decimals (23.976) are
 * refused with the fraction they stand for, because the rounding would move the loop's last frame.
 */
export function frameRateFraction(
  written: number | string,
  path: DocumentPath,
  findings: Finding[],
): Fraction | null {
  const text = String(written).replace('fps', '').trim();
  const expected = `an exact frame rate from ${LOWEST} to ${HIGHEST} frames a second`;
  const found = valueText(written);
  const [numerator, denominator] = text.split('/').map((part) => part.trim());
  const isZero =
    denominator !== undefined ? BigInt(numerator) * BigInt(denominator) === 0n : Number(text) === 0;
  if (isZero) {
    findings.push({ path, expected, found, remedy: 'Write for example `24` or `24000/1001`.' });
    return null;
  }
  const rate =
    denominator === undefined
      ? decimalFraction(Number(text))
      : fraction(BigInt(numerator), BigInt(denominator));
  const broadcast = broadcastRate(numberOf(rate));
  if (denominator === undefined && broadcast !== null) {
    findings.push({ path, expected, found, remedy: `Write \`${broadcast}\`, the exact rate.` });
    return null;
  }
  if (!isFrameRate(rate)) {
    findings.push({ path, expected, found, remedy: 'Write for example `24` or `24000/1001`.' });
    return null;
  }
  return rate;
}

/** Whether a rate lies within the limits and fits the headers of files. */
export function isFrameRate(rate: Fraction): boolean {
  const value = numberOf(rate);
  return (
    value >= LOWEST && value <= HIGHEST && rate.numerator <= LARGEST_TERM && rate.denominator <= LARGEST_TERM
  );
}

/** `24000/1001` for 23.976 or 23.98; null for a rate that is not a rounded n x 1000/1001. */
function broadcastRate(rate: number): string | null {
  const n = Math.round(rate * 1.001);
  return !Number.isInteger(rate) && Math.abs(n / 1.001 - rate) < 0.006 && n >= 10 ? `${n * 1000}/1001` : null;
}
