/** The only clock of the library: durations for `run.json` and the date of a run. Nothing a file holds depends on it. */
export function secondsNow(): number {
  return performance.now() / 1000;
}

/** Date and time of day, ISO 8601, UTC. */
export function dateNow(): string {
  return new Date().toISOString();
}

/** Now, as the stamps of files have it. */
export function millisecondsSince1970(): number {
  return Date.now();
}

/** Lets what waits in this thread, signals and timers too, have its turn. */
export function otherTurns(): Promise<void> {
  return new Promise((resolve) => setImmediate(resolve));
}
