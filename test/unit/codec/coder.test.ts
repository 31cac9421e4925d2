import { afterEach, describe, expect, it, vi } from 'vitest';
import { FRAME_METADATA, sceneImage } from '../../support/image-scenes.ts';

const BINARY = '../../../src/kernel/kernel-binary.ts';

/** The library's codecs and errors, loaded anew where kernels cannot be had. */
async function withoutKernel(): Promise<
  typeof import('../../../src/codec/registry.ts') & typeof import('../../../src/errors.ts')
> {
  vi.resetModules();
  vi.doMock(BINARY, () => ({
    kernelModule: () => {
      throw new Error('no such file');
    },
  }));
  return { ...(await import('../../../src/codec/registry.ts')), ...(await import('../../../src/errors.ts')) };
}

afterEach(() => {
  vi.doUnmock(BINARY);
  vi.resetModules();
});

describe('where the kernel cannot run', () => {
  it.each(['png', 'exr'])(
    '%s is refused with status 69 and a remedy, not written by another coder',
    async (format) => {
      const { codecFor, UnavailableError } = await withoutKernel();
      const image = sceneImage(format === 'png' ? 'uint8' : 'half', ['Y'], [4, 4], 'waves');
      let refusal: unknown;
      try {
        codecFor(format).encode(image, FRAME_METADATA);
      } catch (error) {
        refusal = error;
      }
      expect(refusal).toBeInstanceOf(UnavailableError);
      const { exitStatus, message, cause } = refusal as InstanceType<typeof UnavailableError>;
      expect(exitStatus).toBe(69);
      expect(message).toMatch(/WebAssembly with SIMD.*npm run build.*--engine float64/);
      expect(String(cause)).toContain('no such file');
    },
  );

  it('zlib writes the same images, and files are read', async () => {
    const { codecFor, CODECS_BY_ZLIB } = await withoutKernel();
    for (const codec of CODECS_BY_ZLIB) {
      const image = sceneImage(codec.samples[0], ['Y'], [40, 40], 'waves');
      const file = codecFor(codec.format, 'zlib').encode(image, FRAME_METADATA);
      expect(codecFor(codec.format).decode(file).planes[0]).toEqual(image.planes[0]);
    }
  });
});
