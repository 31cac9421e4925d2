import { expect, it } from 'vitest';
import { framePath, framePathExpression, isFramePattern } from '../../../src/manifest/frame-path.ts';

it('a path has the frame number in its digits, and more where they do not do', () => {
  expect(framePath('c0/foam.%04d.png', 7)).toBe('c0/foam.0007.png');
  expect(framePath('c0/foam.%04d.png', 12345)).toBe('c0/foam.12345.png');
  expect(framePath('%06d', 7)).toBe('000007');
});

it('a pattern has one frame number', () => {
  expect(['c0/foam.%04d.png', '%010d'].every(isFramePattern)).toBe(true);
  expect(['c0/foam.png', 'a%04db%04d', '%d', '%4d', '%04x', '%%04d', ''].some(isFramePattern)).toBe(false);
});

it('an expression matches the paths of its pattern and no others', () => {
  const expression = framePathExpression('c0/foam.%04d.png');
  expect(expression.exec('c0/foam.0007.png')?.[1]).toBe('0007');
  expect(expression.exec('c0/foam.12345.png')?.[1]).toBe('12345');
  for (const other of [
    'c0/foam.007.png',
    'c0/foamx0007.png',
    'c0/foam.0007.png.tmp',
    'xc0/foam.0007.png',
    'c0/foam..png',
  ]) {
    expect(expression.test(other)).toBe(false);
  }
});
