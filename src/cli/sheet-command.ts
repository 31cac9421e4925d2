import { basename, dirname, join } from 'node:path';
import { type Command, InvalidArgumentError, Option } from 'commander';
import { CONTACT_SHEET_DEFAULTS, contactSheet, writeFileAtomic } from '../index.ts';
import { type ProgramIo, writeResult } from './io.ts';

interface SheetCommandOptions {
  readonly output?: string;
  readonly pictures: number;
  readonly cell: number;
}

/** `sheet`: every map of a finished bake in one picture. */
export function defineSheetCommand(command: Command, io: ProgramIo): void {
  command
    .argument('<bake>', 'folder of a finished bake')
    .option('-o, --output <file>', 'where the PNG goes (default: sheet.png in the folder)')
    .addOption(
      new Option('--pictures <n>', 'pictures of each map, spread over the loop')
        .argParser((text) => wholeNumber(text, 1, 64))
        .default(CONTACT_SHEET_DEFAULTS.pictures),
    )
    .addOption(
      new Option('--cell <pixels>', 'side of one picture')
        .argParser((text) => wholeNumber(text, 16, 4096))
        .default(CONTACT_SHEET_DEFAULTS.cell),
    )
    .addHelpText(
      'after',
      '\nA row for each cascade; in it the maps in the order of the manifest. Lengths, speeds and slopes are\ngrey around zero, normals as they are stored, foam and J grey.',
    )
    .action(async (folder: string, { output, pictures, cell }: SheetCommandOptions) => {
      const sheet = await contactSheet(folder, { pictures, cell });
      const path = output ?? join(folder, 'sheet.png');
      writeFileAtomic(dirname(path), basename(path), sheet);
      await writeResult(io.stdout, `${path}\n`);
    });
}

function wholeNumber(text: string, least: number, most: number): number {
  const value = Number(text);
  if (/^\d+$/.test(text) && value >= least && value <= most) return value;
  throw new InvalidArgumentError(`Expected a whole number from ${least} to ${most}.`);
}
