import { describe, expect, it } from 'vitest';
import { paceOf, paceWords } from '../../../src/cli/pace.ts';
import { progressDisplay, progressLines } from '../../../src/cli/progress.ts';
import { type CapturedIo, CapturedStream, capturedIo } from './captured-io.ts';

/** An outside world whose clock is set by hand. */
function clocked(stderr = new CapturedStream()): { io: CapturedIo; clock: { timeS: number } } {
  const clock = { timeS: 1000 };
  return { io: capturedIo({ stderr, secondsNow: () => clock.timeS }), clock };
}

describe('paceOf', () => {
  it('measures from the first mark on, so that reused frames do not count', () => {
    const pace = paceOf({ timeS: 10, done: 100 });
    expect(pace({ timeS: 20, done: 150 }, 200)).toEqual({ perSecond: 5, secondsLeft: 10 });
  });

  it('knows nothing before something was made', () => {
    const pace = paceOf({ timeS: 10, done: 100 });
    expect(pace({ timeS: 20, done: 100 }, 200)).toBeNull();
    expect(pace({ timeS: 10, done: 101 }, 200)).toBeNull();
    expect(paceWords(null)).toBe('');
  });

  it('never has less than nothing left, where a total was a guess', () => {
    expect(paceOf({ timeS: 0, done: 0 })({ timeS: 1, done: 5 }, 4)).toEqual({ perSecond: 5, secondsLeft: 0 });
  });
});

describe('progress off a terminal', () => {
  it('is one line each 30 s with what is done, the rate and the time left', () => {
    const { io, clock } = clocked();
    const progress = progressLines(io);
    progress.update({ stage: 'frames', done: 0, total: 400 });
    for (let done = 1; done <= 100; done++) {
      clock.timeS += 1;
      progress.update({ stage: 'frames', done, total: 400 });
    }
    expect(io.stderr.text).toBe(
      'frames 30/400, 1/s, 6 min 10 s left\nframes 60/400, 1/s, 5 min 40 s left\nframes 90/400, 1/s, 5 min 10 s left\n',
    );
  });

  it('measures each stage for itself', () => {
    const { io, clock } = clocked();
    const progress = progressLines(io);
    progress.update({ stage: 'frames', done: 0, total: 10 });
    clock.timeS += 20;
    progress.update({ stage: 'foam', done: 0, total: 10 });
    clock.timeS += 10;
    progress.update({ stage: 'foam', done: 5, total: 10 });
    expect(io.stderr.text).toBe('foam 5/10, 0.5/s, 10 s left\n');
  });

  it('ends', () => {
    const { io, clock } = clocked();
    const progress = progressLines(io);
    progress.end();
    clock.timeS += 60;
    progress.update({ stage: 'frames', done: 1, total: 2 });
    expect(io.stderr.text).toBe('');
  });
});

describe('progress on a terminal', () => {
  const escapes = new RegExp(`${String.fromCharCode(27)}(?:\\[[0-9;?]*[A-Za-z]|[78])`, 'g');

  it('is a bar for each stage, cleared at the end', async () => {
    const { io, clock } = clocked(new CapturedStream({ isTTY: true }));
    const progress = await progressDisplay(io, false);
    progress.update({ stage: 'frames', done: 10, total: 40 });
    clock.timeS += 4;
    progress.update({ stage: 'frames', done: 20, total: 40 });
    progress.update({ stage: 'foam', done: 1, total: 4 });
    progress.end();
    progress.end();
    progress.update({ stage: 'foam', done: 2, total: 4 });
    const shown = io.stderr.text
      .replaceAll(escapes, '\n')
      .split('\n')
      .filter((line) => line !== '');
    expect(shown[0]).toBe('frames [########......................] 10/40');
    expect(shown).toContain('frames [###############...............] 20/40, 2.5/s, 8.0 s left');
    expect(shown.at(-1)).toBe('foam [########......................] 1/4');
    // The last thing done is to clear the line.
    expect(io.stderr.text.endsWith('\u001b[2K')).toBe(true);
  });

  it('is lines on a dumb terminal, and nothing where that was asked for', async () => {
    for (const [env, quiet] of [
      [{ TERM: 'dumb' }, false],
      [{}, true],
    ] as const) {
      const io = capturedIo({ stderr: new CapturedStream({ isTTY: true }), env });
      const progress = await progressDisplay(io, quiet);
      progress.update({ stage: 'frames', done: 1, total: 2 });
      progress.end();
      expect(io.stderr.text).toBe('');
    }
  });
});
