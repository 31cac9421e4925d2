/** An argument as a shell takes it. */
export function quoted(argument: string): string {
  return /^[A-Za-z0-9_./:@%+=,-]+$/.test(argument) ? argument : `'${argument.replaceAll("'", "'\\''")}'`;
}

/** Words of a command as a shell takes them. */
export function commandText(words: readonly string[]): string {
  return words.map(quoted).join(' ');
}

/** A text that cannot leave its line: for comments, names of jobs, messages. */
export function oneLine(text: string): string {
  return text.replaceAll(/[\p{Cc}\p{Zl}\p{Zp}]+/gu, ' ').trim();
}
