import { Command, CommanderError } from 'commander';
import { EXIT_STATUS, type ExitStatus } from '../errors.ts';
import { CAUTION, VERSION } from '../version.ts';
import { coloursOf } from './colours.ts';
import { reportFailure } from './failure.ts';
import { guardStreams, type ProgramIo, writeResult } from './io.ts';
import { WIDTH, wrapped } from './wording.ts';

/** A command as the overview knows it; the rest, and the library behind it, is loaded when it is asked for. */
interface CommandEntry {
  readonly name: string;
  readonly summary: string;
  readonly usage: string;
  readonly load: () => Promise<(command: Command, io: ProgramIo) => void>;
}

const COMMANDS: readonly CommandEntry[] = [
  {
    name: 'bake',
    summary: 'Make the image sequences of a sea and their manifest.',
    usage: '[options] <sea>',
    load: async () => (await import('./bake-command.ts')).defineBakeCommand,
  },
  {
    name: 'gather',
    summary: 'Join the shards of a bake: check them, make foam and the manifest.',
    usage: '[options] <folder>',
    load: async () => (await import('./gather-command.ts')).defineGatherCommand,
  },
  {
    name: 'plan',
    summary: 'Show what a bake would make, cost and lose.',
    usage: '[options] <sea>',
    load: async () => (await import('./plan-command.ts')).definePlanCommand,
  },
  {
    name: 'verify',
    summary: 'Check a finished bake from its files alone.',
    usage: '[options] <bake>',
    load: async () => (await import('./verify-command.ts')).defineVerifyCommand,
  },
  {
    name: 'sheet',
    summary: 'Draw a finished bake as one picture.',
    usage: '[options] <bake>',
    load: async () => (await import('./sheet-command.ts')).defineSheetCommand,
  },
  {
    name: 'farm',
    summary: 'Write the scripts of a bake on many machines, or show how far it is.',
    usage: 'slurm|template|status',
    load: async () => (await import('./farm-command.ts')).defineFarmCommand,
  },
  {
    name: 'presets',
    summary: 'List the included seas, or print one to start from.',
    usage: '[name]',
    load: async () => (await import('./presets-command.ts')).definePresetsCommand,
  },
  {
    name: 'schema',
    summary: 'Print the JSON Schema of sea files or of manifests.',
    usage: 'sea|manifest',
    load: async () => (await import('./schema-command.ts')).defineSchemaCommand,
  },
];

const CAUTION_LINES = wrapped(CAUTION, WIDTH).join('\n');

const HELP_FOOTER = `
A sea is the name of a preset, a sea file (YAML or JSON) or a saved plan.
Begin with: loopswell presets, loopswell plan demo, loopswell bake demo

${CAUTION_LINES}`;

/**
 * Runs a command line.
 *
 * @param argv arguments without the names of node and script
 * @param io where it reads and writes
 * @returns the exit status, see EXIT_STATUS
 */
export async function run(argv: readonly string[], io: ProgramIo): Promise<ExitStatus> {
  guardStreams(io);
  // Read before parsing, so that a fault in parsing can be looked into as well.
  const debug = argv.includes('--debug') || (io.env.LOOPSWELL_DEBUG ?? '') !== '';
  try {
    const { program, output } = await commandLine(argv, io);
    let status: ExitStatus = EXIT_STATUS.done;
    try {
      await program.parseAsync(argv, { from: 'user' });
    } catch (error) {
      if (!(error instanceof CommanderError)) throw error;
      // Help and version end this way too. Commander has printed its message.
      if (error.exitCode !== 0) status = EXIT_STATUS.usage;
    }
    await writeResult(io.stdout, output.join(''));
    return status;
  } catch (error) {
    return reportFailure(io, error, debug);
  }
}

interface CommandLine {
  readonly program: Command;
  /** What the parser itself prints as a result: help and the version. */
  readonly output: readonly string[];
}

/** The commands; only those that the arguments name are loaded. */
async function commandLine(argv: readonly string[], io: ProgramIo): Promise<CommandLine> {
  const output: string[] = [];
  const { error } = coloursOf(io.stderr, io.env);
  const program = new Command('loopswell')
    .description('Bakes looping, tiling image sequences of the sea surface.')
    .version(VERSION, '-V, --version', 'print the version')
    .option('--debug', 'print where an error happened (or set LOOPSWELL_DEBUG)')
    .helpOption('-h, --help', 'print help')
    .helpCommand('help [command]', 'Print help on a command.')
    .addHelpText('after', HELP_FOOTER)
    .showHelpAfterError('Run loopswell --help, or loopswell help <command>.')
    .exitOverride()
    .configureOutput({
      writeOut: (text) => output.push(text),
      writeErr: (text) => io.stderr.write(text),
      outputError: (text, write) => write(text.replace(/^error:/, error('error:'))),
      getOutHelpWidth: () => WIDTH,
      getErrHelpWidth: () => WIDTH,
    });
  for (const { name, summary, usage, load } of COMMANDS) {
    const command = program.command(name).description(summary).usage(usage);
    if (argv.includes(name)) (await load())(command, io);
    command.addHelpText(
      'after',
      `
${CAUTION_LINES}`,
    );
  }
  return { program, output };
}
