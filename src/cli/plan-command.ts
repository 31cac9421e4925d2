import { basename, dirname } from 'node:path';
import type { Command } from 'commander';
import { machineThreads, type Plan, planText, writeFileAtomic } from '../index.ts';
import { coloursOf } from './colours.ts';
import { type ProgramIo, say, writeResult } from './io.ts';
import { planReport } from './plan-report.ts';
import { plannedInput } from './planned-input.ts';
import { seaDefaultsHelp } from './sea-defaults.ts';

interface PlanCommandOptions {
  readonly json?: boolean;
  readonly save?: string;
}

/** `plan`: all decisions of a bake, before a frame is made. */
export function definePlanCommand(command: Command, io: ProgramIo): void {
  command
    .argument('<sea>', 'a sea file, the name of a preset, or a saved plan')
    .option('--json', 'print the plan as JSON')
    .option('--save <file>', 'write the plan to a file that bake takes in place of the sea')
    .addHelpText('after', () => `\n${seaDefaultsHelp()}`)
    .action(async (sea: string, options: PlanCommandOptions) => {
      const { plan } = plannedInput(io, sea).planned;
      if (options.save !== undefined) {
        savePlan(plan, options.save);
        say(io, `Plan saved to ${options.save}`);
      }
      await printPlan(io, plan, { json: options.json === true, threads: machineThreads() });
    });
}

/** Prints a plan as its report, or as the text that `--save` writes. */
export async function printPlan(
  io: ProgramIo,
  plan: Plan,
  { json, threads }: { readonly json: boolean; readonly threads: number },
): Promise<void> {
  const colours = coloursOf(io.stdout, io.env);
  await writeResult(io.stdout, json ? planText(plan) : planReport(plan, { threads, colours }));
}

function savePlan(plan: Plan, path: string): void {
  writeFileAtomic(dirname(path), basename(path), planText(plan), { sync: true });
}
