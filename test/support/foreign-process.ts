import { spawnSync } from 'node:child_process';

/** The number of a process that ran on this host and has ended. */
export function endedProcessId(): number {
  const { pid } = spawnSync(process.execPath, ['-e', '']);
  return pid;
}
