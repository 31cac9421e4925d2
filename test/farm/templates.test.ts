import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { parseAllDocuments } from 'yaml';
import { fileHashes, inTemporaryFolder } from '../support/bakes.ts';
import { runProgram, seaFile } from '../support/built.ts';

// The hosts of these formats are not here: what they would do with a template is done by hand, command for command.

interface OpenJob {
  readonly parameterDefinitions: readonly { readonly name: string; readonly default: string }[];
  readonly steps: readonly {
    readonly script: {
      readonly actions: { readonly onRun: { readonly command: string; readonly args: readonly string[] } };
    };
  }[];
}

interface KubernetesJob {
  readonly spec: {
    readonly template: {
      readonly spec: { readonly containers: readonly { readonly command: readonly string[] }[] };
    };
  };
}

/** The documents of a template, and the folder it bakes into. */
async function template<T>(
  outer: string,
  format: string,
): Promise<{ readonly folder: string; readonly documents: readonly T[] }> {
  const folder = join(outer, 'bake');
  const { stdout, status, stderr } = await runProgram([
    'farm',
    'template',
    format,
    seaFile(outer),
    '-o',
    folder,
    '--tasks',
    '3',
    '--cpus',
    '1',
  ]);
  expect(status, stderr).toBe(0);
  const documents = parseAllDocuments(readFileSync(stdout.trim(), 'utf8')).map((parsed) => parsed.toJS());
  return { folder, documents };
}

/** Runs a command of a template with the built program in the place of its own. */
async function run([program, ...args]: readonly string[], env: NodeJS.ProcessEnv = {}): Promise<void> {
  expect(program).toBe('loopswell');
  const { status, stderr } = await runProgram(args, { env: { ...process.env, ...env } });
  expect(status, stderr).toBe(0);
}

async function expectWhole(outer: string, folder: string): Promise<void> {
  const whole = join(outer, 'whole');
  await runProgram(['bake', seaFile(outer), '-o', whole]);
  expect(fileHashes(folder)).toEqual(fileHashes(whole));
}

describe('the commands of a template', () => {
  it('for Open Job Description make the bake', async () => {
    await inTemporaryFolder(async (outer) => {
      const { folder, documents } = await template<OpenJob>(outer, 'openjd');
      const [{ parameterDefinitions, steps }] = documents;
      const parameters = new Map(
        parameterDefinitions.map(({ name, default: value }) => [`Param.${name}`, value]),
      );
      const command = (step: number, shard: number): string[] => {
        const { onRun } = steps[step].script.actions;
        parameters.set('Task.Param.Shard', `${shard}`);
        return [onRun.command, ...onRun.args].map((word) =>
          word.replaceAll(/\{\{([\w.]+)\}\}/g, (_, name: string) => parameters.get(name) ?? 'undefined'),
        );
      };
      for (const shard of [3, 1, 2]) await run(command(0, shard));
      await run(command(1, 0));
      await expectWhole(outer, folder);
    });
  });

  it('for Kubernetes make the bake', async () => {
    await inTemporaryFolder(async (outer) => {
      const { folder, documents } = await template<KubernetesJob>(outer, 'kubernetes');
      const [frames, gather] = documents.map(({ spec }) => spec.template.spec.containers[0].command);
      for (const index of [2, 0, 1]) await run(frames, { JOB_COMPLETION_INDEX: `${index}` });
      await run(gather);
      await expectWhole(outer, folder);
    });
  });
});
