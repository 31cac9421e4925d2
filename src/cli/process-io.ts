import { spawnSync } from 'node:child_process';
import type { ProgramIo } from './io.ts';

const STOP_SIGNALS = ['SIGINT', 'SIGTERM'] as const;

/** The outside world of the real process. */
export function processIo(): ProgramIo {
  return {
    stdout: process.stdout,
    stderr: process.stderr,
    env: process.env,
    program: [process.execPath, process.argv[1]],
    runProgram: (command) => spawnSync(command, { encoding: 'utf8', stdio: ['ignore', 'pipe', 'pipe'] }),
    secondsNow: () => performance.now() / 1000,
    onStopSignal(listener) {
      for (const signal of STOP_SIGNALS) process.on(signal, listener);
      return () => {
        for (const signal of STOP_SIGNALS) process.off(signal, listener);
      };
    },
    exitNow: (status) => process.exit(status),
  };
}
