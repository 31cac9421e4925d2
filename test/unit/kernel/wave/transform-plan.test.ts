import { describe, expect, it } from 'vitest';
import {
  digitReversal,
  stageRadices,
  transformPlanBytes,
  writeTransformPlan,
} from '../../../../src/kernel/wave/transform-plan.ts';

const SIZES = [16, 32, 64, 128, 256, 512, 1024, 2048, 4096, 8192];

describe('a transform plan', () => {
  it.each(SIZES)('of %i has stages that multiply to the size, the last of radix 4', (N) => {
    const radices = stageRadices(N);
    expect(radices.reduce((product, radix) => product * radix, 1)).toBe(N);
    expect(radices.slice(1).every((radix) => radix === 4)).toBe(true);
    expect(radices.length).toBeGreaterThanOrEqual(2);
  });

  it.each(SIZES)('of %i stays within the bytes it says', (N) => {
    const bytes = transformPlanBytes(N);
    const memory = new ArrayBuffer(bytes + 256);
    new Uint8Array(memory).fill(0xa5);
    writeTransformPlan(memory, 128, N);
    const outside = [...new Uint8Array(memory, 0, 128), ...new Uint8Array(memory, 128 + bytes)];
    expect(outside.every((byte) => byte === 0xa5)).toBe(true);
    expect(bytes % 64).toBe(0);
  });

  it('reverses digits as positions and results of decimation in frequency do', () => {
    const radices = [8, 4, 4];
    const seen = new Set<number>();
    for (let d1 = 0; d1 < 8; d1++) {
      for (let d2 = 0; d2 < 4; d2++) {
        for (let d3 = 0; d3 < 4; d3++) {
          const result = d1 + 8 * (d2 + 4 * d3);
          expect(digitReversal((d1 * 4 + d2) * 4 + d3, radices)).toBe(result);
          seen.add(result);
        }
      }
    }
    expect(seen.size).toBe(128);
  });
});
