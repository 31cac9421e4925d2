import { describe, expect, it } from 'vitest';
import { canonicalJson, reviveInfinity } from '../../../src/plan/canonical-json.ts';

describe('canonicalJson', () => {
  it('keeps the order of keys and spells numbers one way', () => {
    expect(canonicalJson({ b: 1, a: [0.1, 1e21, -0] })).toBe('{"b":1,"a":[0.1,1e+21,0]}');
  });

  it('spells what has no end as a word, and reads it back in lengths alone', () => {
    const value = { depthM: Infinity, title: 'Infinity' };
    const text = canonicalJson(value);
    expect(text).toBe('{"depthM":"Infinity","title":"Infinity"}');
    expect(JSON.parse(text, reviveInfinity)).toEqual(value);
  });

  it.each([Number.NaN, -Infinity])('refuses %f, naming its key', (wrong) => {
    expect(() => canonicalJson({ a: { speedMps: wrong } })).toThrow(/speedMps/);
  });
});
