import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { run } from '../../../src/cli/program.ts';
import { CAUTION, EXIT_STATUS, VERSION } from '../../../src/index.ts';
import { CapturedStream, capturedIo, inNewFolder, outcomeOf } from './captured-io.ts';

const COMMANDS = ['bake', 'plan', 'presets', 'schema'];
const spaced = (text: string): string => text.replaceAll(/\s+/g, ' ');

describe('help and version', () => {
  it('prints the overview with every command and the caution', async () => {
    const { status, stdout, stderr } = await outcomeOf(['--help']);
    expect(status).toBe(EXIT_STATUS.done);
    for (const command of COMMANDS) expect(stdout).toMatch(new RegExp(`^  ${command} `, 'm'));
    expect(spaced(stdout)).toContain(CAUTION);
    expect(stderr).toBe('');
  });

  it.each(COMMANDS)('prints help on %s with the caution, asked for in either way', async (command) => {
    const asked = await outcomeOf(['help', command]);
    expect(asked.status).toBe(EXIT_STATUS.done);
    expect(asked.stdout).toContain(`Usage: loopswell ${command}`);
    expect(spaced(asked.stdout)).toContain(CAUTION);
    expect((await outcomeOf([command, '--help'])).stdout).toBe(asked.stdout);
  });

  it('has no line wider than 100 columns in any help', async () => {
    for (const argv of [['--help'], ...COMMANDS.map((command) => ['help', command])]) {
      const { stdout } = await outcomeOf(argv);
      expect(stdout.split('\n').filter((line) => line.length > 100)).toEqual([]);
    }
  });

  it('prints the version of package.json', async () => {
    const { version } = JSON.parse(readFileSync(new URL('../../../package.json', import.meta.url), 'utf8'));
    expect(VERSION).toBe(version);
    expect(await outcomeOf(['--version'])).toEqual({ status: 0, stdout: `${version}\n`, stderr: '' });
  });
});

describe('a wrong command line ends with 64 and help on stderr', () => {
  it.each([
    ['nothing at all', [], 'Usage: loopswell'],
    ['an unknown command', ['pln', 'demo'], 'Did you mean plan?'],
    ['an unknown option', ['plan', 'demo', '--jsn'], 'Did you mean --json?'],
    ['a missing argument', ['bake'], "missing required argument 'sea'"],
    ['one argument too many', ['plan', 'demo', 'demo'], 'too many arguments'],
    ['a schema of nothing', ['schema', 'seas'], 'Allowed choices are sea, manifest'],
    ['threads that are no number', ['bake', 'demo', '--threads', 'two'], 'whole number from 0'],
    ['a negative number of threads', ['bake', 'demo', '--threads=-1'], 'whole number from 0'],
    ['too many threads', ['bake', 'demo', '--threads', '1025'], 'whole number from 0'],
    ['frames that are no range', ['bake', 'demo', '--frames', '1..5'], 'Expected first-last'],
  ])('%s', async (_case, argv, message) => {
    const { status, stdout, stderr } = await outcomeOf(argv);
    expect(status).toBe(EXIT_STATUS.usage);
    expect(stdout).toBe('');
    expect(stderr).toContain(message);
    expect(stderr).toContain('loopswell');
  });
});

describe('errors', () => {
  it('says what is wrong with a sea, without a stack, and ends with 65', async () => {
    const { status, stdout, stderr } = await outcomeOf(['plan', 'demmo']);
    expect(status).toBe(EXIT_STATUS.badInput);
    expect(stdout).toBe('');
    expect(stderr).toMatch(/^error: demmo: .*Did you mean `demo`\?\n$/);
  });

  it('ends with 74 where a sea file cannot be read', async () => {
    await inNewFolder(async (folder) => {
      const { status, stderr } = await outcomeOf(['plan', folder]);
      expect(status).toBe(EXIT_STATUS.readWrite);
      expect(stderr).toContain('no regular file');
    });
  });

  it('adds the stack with --debug or LOOPSWELL_DEBUG', async () => {
    const stack = /\n +at .*\.ts/;
    expect((await outcomeOf(['plan', 'demmo'])).stderr).not.toMatch(stack);
    expect((await outcomeOf(['plan', 'demmo', '--debug'])).stderr).toMatch(stack);
    expect(
      (await outcomeOf(['plan', 'demmo'], capturedIo({ env: { LOOPSWELL_DEBUG: '1' } }))).stderr,
    ).toMatch(stack);
  });
});

describe('colour', () => {
  const ESCAPE = '\u001b[';
  const failing = async (isTTY: boolean, env: Record<string, string>): Promise<string> => {
    const io = capturedIo({ stderr: new CapturedStream({ isTTY }), env });
    return (await outcomeOf(['plan', 'demmo'], io)).stderr;
  };

  it('is for terminals only, and not where NO_COLOR or a dumb terminal refuses it', async () => {
    expect(await failing(true, {})).toContain(ESCAPE);
    expect(await failing(false, {})).not.toContain(ESCAPE);
    expect(await failing(true, { NO_COLOR: '1' })).not.toContain(ESCAPE);
    expect(await failing(true, { TERM: 'dumb' })).not.toContain(ESCAPE);
  });

  it('asks each stream for itself', async () => {
    const io = capturedIo({ stdout: new CapturedStream({ isTTY: true }) });
    const { stdout, stderr } = await outcomeOf(['plan', 'mobile-pond'], io);
    expect(stdout).toContain(ESCAPE);
    expect(stderr).toBe('');
    expect((await outcomeOf(['plan', 'mobile-pond'])).stdout).not.toContain(ESCAPE);
  });
});

describe('results that cannot be written', () => {
  it.each([['presets'], ['--help']])('are no error where the reader has gone: %s', async (argument) => {
    const io = capturedIo({ stdout: new CapturedStream({ failure: 'EPIPE' }) });
    expect(await outcomeOf([argument], io)).toEqual({ status: 0, stdout: '', stderr: '' });
  });

  it.each([['presets'], ['--help']])('end with 74 on a full disk: %s', async (argument) => {
    const io = capturedIo({ stdout: new CapturedStream({ failure: 'ENOSPC' }) });
    const { status, stderr } = await outcomeOf([argument], io);
    expect(status).toBe(EXIT_STATUS.readWrite);
    expect(stderr).toContain('ENOSPC');
  });

  it('say nothing where even messages cannot be written', async () => {
    const io = capturedIo({ stderr: new CapturedStream({ failure: 'EPIPE' }) });
    expect(await run(['plan', 'demmo'], io)).toBe(EXIT_STATUS.badInput);
  });
});
