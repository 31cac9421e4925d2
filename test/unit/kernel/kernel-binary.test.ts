import { afterEach, describe, expect, it, vi } from 'vitest';
import { kernelModule, simdAvailable } from '../../../src/kernel/kernel-binary.ts';
import { describeKernel } from '../../support/kernels.ts';

afterEach(() => {
  vi.unstubAllGlobals();
});

describe('SIMD', () => {
  it('is there on the machines this runs on', () => {
    expect(simdAvailable()).toBe(true);
  });

  it('is missed where WebAssembly does not know it, or is not there', () => {
    vi.stubGlobal('WebAssembly', { validate: () => false });
    expect(simdAvailable()).toBe(false);
    vi.stubGlobal('WebAssembly', undefined);
    expect(simdAvailable()).toBe(false);
  });

  it('is what the probe asks for, and nothing else', () => {
    const probes: Uint8Array[] = [];
    const { validate } = WebAssembly;
    vi.stubGlobal('WebAssembly', { validate: (bytes: Uint8Array) => probes.push(bytes) > 0 });
    simdAvailable();
    const [probe] = probes;
    expect(validate(probe)).toBe(true);
    // The same program with an operation number that SIMD does not have.
    expect(validate(probe.map((byte, i) => (i === probe.length - 2 ? 0x9a : byte)))).toBe(false);
  });
});

describeKernel('wave', 'a kernel', () => {
  it('is compiled once a thread', () => {
    expect(kernelModule('wave')).toBe(kernelModule('wave'));
  });
});
