import { describe, expect, it } from 'vitest';
import { reportFailure } from '../../../src/cli/failure.ts';
import {
  CannotCreateError,
  EXIT_STATUS,
  InputError,
  InternalError,
  ReadWriteError,
  StoppedError,
  UnavailableError,
  UsageError,
} from '../../../src/index.ts';
import { capturedIo } from './captured-io.ts';

const told = (error: unknown, debug = false): { status: number; text: string } => {
  const io = capturedIo();
  const status = reportFailure(io, error, debug);
  return { status, text: io.stderr.text };
};

describe('reportFailure', () => {
  const problem = {
    path: 'seed',
    line: 2,
    column: 7,
    expected: 'a number',
    found: '`x`',
    remedy: 'Write 1.',
  };

  it.each([
    [new UsageError('no'), EXIT_STATUS.usage],
    [new InputError('a.yaml', [problem]), EXIT_STATUS.badInput],
    [new UnavailableError('no'), EXIT_STATUS.unavailable],
    [new CannotCreateError('no'), EXIT_STATUS.cannotCreate],
    [new ReadWriteError('no'), EXIT_STATUS.readWrite],
  ])('prints the message of %s alone and gives its status', (error, status) => {
    expect(told(error)).toEqual({ status, text: `error: ${error.message}\n` });
  });

  it('does not call a stop an error', () => {
    expect(told(new StoppedError('Stopped early.'))).toEqual({
      status: EXIT_STATUS.stopped,
      text: 'Stopped early.\n',
    });
  });

  it.each([
    ['an unforeseen error', new TypeError('x is\n  undefined')],
    ['one of ours', new InternalError('x is undefined')],
    ['what is no error', 'x is undefined'],
  ])('asks in one line to report %s', (_case, error) => {
    const { status, text } = told(error);
    expect(status).toBe(EXIT_STATUS.internal);
    expect(text).toMatch(/^error: x is undefined\. .*report it.*--debug.*\n$/);
  });

  it('prints the stacks of an error and its cause when debugging', () => {
    const { text } = told(new InternalError('outer', { cause: new RangeError('inner') }), true);
    expect(text).toContain('InternalError: outer\n    at ');
    expect(text).toContain('caused by RangeError: inner\n    at ');
  });
});
