import { basename, dirname } from 'node:path';
import type { Command } from 'commander';
import { type EngineName, type Plan, planText, surveyedBake, writeFileAtomic } from '../index.ts';
import { coloursOf } from './colours.ts';
import { engineOption } from './engine-option.ts';
import { type ProgramIo, say, writeResult } from './io.ts';
import { planReport } from './plan-report.ts';
import { plannedInput } from './planned-input.ts';
import { threadsOption, watchedRun } from './run-options.ts';
import { seaDefaultsHelp } from './sea-defaults.ts';

interface PlanCommandOptions {
  readonly json?: boolean;
  readonly save?: string;
  readonly engine?: EngineName;
  readonly threads: number;
}

/** `plan`: all decisions of a bake, before a frame is made. */
export function definePlanCommand(command: Command, io: ProgramIo): void {
  command
    .argument('<sea>', 'a sea file, the name of a preset, or a saved plan')
    .option('--json', 'print the plan as JSON')
    .option('--save <file>', 'write the plan to a file that bake takes in place of the sea')
    .addOption(threadsOption())
    .addOption(engineOption())
    .addHelpText('after', () => `\n${seaDefaultsHelp()}`)
    .action(async (sea: string, options: PlanCommandOptions) => {
      const { threads } = options;
      const { planned } = plannedInput(io, sea, options.engine);
      // A saved plan leaves nothing open: processes that share it must not each survey the loop.
      const { plan } =
        options.save === undefined
          ? planned
          : await watchedRun(io, false, (watch) => surveyedBake(planned, { threads, ...watch }));
      if (options.save !== undefined) {
        savePlan(plan, options.save);
        say(io, `Plan saved to ${options.save}`);
      }
      await printPlan(io, plan, { json: options.json === true, threads });
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
