import { type ChildProcess, type SpawnOptions, spawn } from 'node:child_process';
import { existsSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import type * as Library from '../../src/index.ts';

// The built package, for tests of real threads and real processes. `npm test` builds it; a test run by hand does not.

const DIST = fileURLToPath(new URL('../../dist/', import.meta.url));

/** The built command line. */
export const PROGRAM: string = builtFile('cli/main.js');

function builtFile(path: string): string {
  const file = join(DIST, path);
  if (!existsSync(file))
    throw new Error(`${file} is missing: run node .ci/ready.mjs first, which builds it.`);
  return file;
}

/** The built library, which unlike the sources can start threads. */
export async function builtLibrary(): Promise<typeof Library> {
  return (await import(builtFile('index.js'))) as typeof Library;
}

/** How a process ended and what it said. */
export interface Ended {
  readonly status: number | null;
  readonly signal: NodeJS.Signals | null;
  readonly stdout: string;
  readonly stderr: string;
  readonly seconds: number;
}

/** A running command line. */
export interface Running {
  readonly child: ChildProcess;
  readonly ended: Promise<Ended>;
}

/** Starts the built command line. */
export function startProgram(args: readonly string[], options: SpawnOptions = {}): Running {
  return startCommand(process.execPath, [PROGRAM, ...args], options);
}

/** Starts a command and collects what it says. */
export function startCommand(command: string, args: readonly string[], options: SpawnOptions = {}): Running {
  const startedAt = performance.now();
  const child = spawn(command, args, { stdio: ['ignore', 'pipe', 'pipe'], ...options });
  const text = { stdout: '', stderr: '' };
  child.stdout?.on('data', (chunk) => {
    text.stdout += chunk;
  });
  child.stderr?.on('data', (chunk) => {
    text.stderr += chunk;
  });
  const ended = new Promise<Ended>((resolve, reject) => {
    child.on('error', reject);
    child.on('close', (status, signal) =>
      resolve({ status, signal, ...text, seconds: (performance.now() - startedAt) / 1000 }),
    );
  });
  return { child, ended };
}

/** Runs the built command line to its end. */
export function runProgram(args: readonly string[], options: SpawnOptions = {}): Promise<Ended> {
  return startProgram(args, options).ended;
}

/** Waits until a condition holds, looking again and again; not longer than the process lives that is to bring it about. */
export async function until(condition: () => boolean, { child }: Pick<Running, 'child'>): Promise<void> {
  while (!condition()) {
    if (child.exitCode !== null || child.signalCode !== null) throw new Error('It ended before that.');
    await new Promise((resolve) => setTimeout(resolve, 5));
  }
}

/** A sea that bakes in about a second: two cascades, 24 frames, every kind of file. */
export const BUILT_SEA_YAML = `seaFile: 1
title: Built wind sea
seed: 5
systems:
  - kind: wind-sea
    from: 250 deg
    significantHeight: 0.5 m
    peakPeriod: 3 s
    windSpeed: 8 m/s
loop: { frames: 24, frameRate: 4 }
shaping: { horizontalScale: 1.5 }
cascades:
  - patch: 60 m
    resolution: 128
  - patch: 13 m
    resolution: 64
    loop: { frames: 12, frameRate: 4 }
foam: { coverage: 0.5 % }
maps: { displacement: exr, normal: png, foam: png }
`;

/** Writes a sea file into a folder and returns its path. */
export function seaFile(folder: string, yaml: string = BUILT_SEA_YAML): string {
  const path = join(folder, 'built.yaml');
  writeFileSync(path, yaml);
  return path;
}
