import { Argument, type Command } from 'commander';
import { manifestJsonSchema, seaJsonSchema } from '../index.ts';
import { type ProgramIo, writeResult } from './io.ts';

const SCHEMAS = { sea: seaJsonSchema, manifest: manifestJsonSchema } as const;

/** `schema`: JSON Schema of the files that go in and come out. */
export function defineSchemaCommand(command: Command, io: ProgramIo): void {
  command
    .addArgument(new Argument('<of>', 'which file it describes').choices(Object.keys(SCHEMAS)))
    .action(async (of: keyof typeof SCHEMAS) => {
      await writeResult(io.stdout, `${JSON.stringify(SCHEMAS[of](), null, 2)}\n`);
    });
}
