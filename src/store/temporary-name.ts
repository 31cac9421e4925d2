import { hostname } from 'node:os';

/** A temporary name's parts: which process on which host made it. */
export interface TemporaryOwner {
  readonly host: string;
  readonly pid: number;
}

/** `.loopswell~<host>~<process id>~<random>.tmp`; short whatever the file's own name, which may fill the limit. */
const TEMPORARY_NAME = /^\.loopswell~([A-Za-z0-9.-]+)~(\d+)~[0-9a-f-]{36}\.tmp$/;

/** This machine's name, with letters that any file system takes. */
export const HOST: string =
  hostname()
    .replaceAll(/[^A-Za-z0-9.-]/g, '-')
    .slice(0, 100) || 'host';

/** This process, as journals and temporaries name it. */
export const THIS_PROCESS: TemporaryOwner = Object.freeze({ host: HOST, pid: process.pid });

/** A name for a journal, that no other process and no other run in this one has. */
export function journalName(): string {
  return `${HOST}-${process.pid}-${crypto.randomUUID()}`;
}

/** A name for a file being written, that no other process and no other thread of this one makes. */
export function temporaryName(): string {
  return `.loopswell~${HOST}~${process.pid}~${crypto.randomUUID()}.tmp`;
}

/** Who made a temporary of ours; null where the name is not one. */
export function temporaryOwner(name: string): TemporaryOwner | null {
  const match = TEMPORARY_NAME.exec(name);
  return match === null ? null : { host: match[1], pid: Number(match[2]) };
}
