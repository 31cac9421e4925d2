import type { Command } from 'commander';
import { presetSummaries, presetText } from '../index.ts';
import { type ProgramIo, writeResult } from './io.ts';
import { fieldLines } from './table.ts';

/** `presets`: the shipped seas, or the text of one to start from. */
export function definePresetsCommand(command: Command, io: ProgramIo): void {
  command.argument('[name]', 'print the sea file of this preset').action(async (name: string | undefined) => {
    await writeResult(io.stdout, name === undefined ? presetList() : presetText(name));
  });
}

function presetList(): string {
  const lines = fieldLines(presetSummaries().map(({ name, purpose }) => [name, purpose] as const));
  return `${lines.join('\n')}\n`;
}
