// Numbers and sentences as people read them. Units are written as sea files take them, so that they can be copied.

/** Widest line of a report, columns. */
export const WIDTH = 100;

/** A number of so many significant digits, without trailing zeros. */
export function rounded(value: number, digits = 3): string {
  return String(Number(value.toPrecision(digits)));
}

export function metres(lengthM: number, digits = 3): string {
  return `${rounded(lengthM, digits)} m`;
}

export function seconds(timeS: number, digits = 3): string {
  return `${rounded(timeS, digits)} s`;
}

/** A bearing or angle in degrees, to a tenth. */
export function degrees(angleRad: number): string {
  return `${Number(((angleRad * 180) / Math.PI).toFixed(1))} deg`;
}

/** A direction of any number of turns as a bearing of 0 to 359.9 deg. */
export function bearing(angleRad: number): string {
  const tenths = Math.round((10 * (angleRad * 180)) / Math.PI);
  return `${(((tenths % 3600) + 3600) % 3600) / 10} deg`;
}

/** A share: two digits, or three near the whole; what is too small to matter says so. */
export function percent(share: number): string {
  const value = 100 * share;
  const size = Math.abs(value);
  if (size === 0 || size < 1e-12) return '0 %';
  if (size < 0.01) return '<0.01 %';
  return `${rounded(value, size > 90 && size < 100 ? 3 : 2)} %`;
}

/** Bytes in decimal units: 944 kB, 117 MB, 2.04 GB. */
export function byteSize(bytes: number): string {
  const [unit, size] = [
    ['GB', 1e9],
    ['MB', 1e6],
    ['kB', 1e3],
  ].find(([, least]) => bytes >= 0.9995 * (least as number)) ?? ['bytes', 1];
  return `${rounded(bytes / (size as number))} ${unit}`;
}

/** How long something takes: 0.8 s, 45 s, 3 min 20 s, 1 h 05 min. */
export function duration(timeS: number): string {
  if (timeS < 9.95) return `${timeS.toFixed(1)} s`;
  const whole = Math.round(timeS);
  if (whole < 60) return `${whole} s`;
  const minutes = Math.floor(whole / 60);
  if (minutes < 60) return `${minutes} min ${String(whole % 60).padStart(2, '0')} s`;
  return `${Math.floor(minutes / 60)} h ${String(minutes % 60).padStart(2, '0')} min`;
}

/** `1 file`, `2 files`; the plural of a noun that takes an s. */
export function counted(count: number, noun: string): string {
  return `${count} ${noun}${count === 1 ? '' : 's'}`;
}

/** A text broken between words into lines of at most `width`, but not behind a number, which would lose its unit. */
export function wrapped(text: string, width: number): string[] {
  const lines: string[] = [];
  let line = '';
  for (const word of text.split(/(?<!\d) /)) {
    if (line !== '' && line.length + 1 + word.length > width) {
      lines.push(line);
      line = word;
    } else {
      line = line === '' ? word : `${line} ${word}`;
    }
  }
  return [...lines, line];
}
