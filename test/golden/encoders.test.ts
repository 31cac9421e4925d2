import { createHash } from 'node:crypto';
import { expect, it } from 'vitest';
import { EXR } from '../../src/codec/exr.ts';
import { PNG } from '../../src/codec/png.ts';
import { BYTE_SCENES } from '../support/byte-scenes.ts';
import { KINDS, type Kind, kernelStream } from '../support/code-streams.ts';
import { FRAME_METADATA, sceneImage } from '../support/image-scenes.ts';
import { describeKernel } from '../support/kernels.ts';

/*
 * The kernel uses integers only and no relaxed SIMD, so its bytes are the same on every processor. A change here is a
 * change of output: raise OUTPUT_VERSION, say so in the output-change log, and put the new hashes in. Scenes are made
 * with integer arithmetic too, but for the waves, whose sines are the runtime's; on another one look there first.
 */

function hash(bytes: Uint8Array): string {
  return createHash('sha256').update(bytes).digest('hex').slice(0, 16);
}

describeKernel('code', 'the encoders', () => {
  it('write the bytes they always wrote', () => {
    const files = [
      PNG.encode(sceneImage('uint16', ['R', 'G', 'B'], [301, 211], 'waves'), FRAME_METADATA),
      PNG.encode(sceneImage('uint8', ['R', 'G', 'B'], [301, 211], 'noise'), FRAME_METADATA),
      PNG.encode(sceneImage('uint8', ['Y'], [301, 211], 'mostly-zero'), FRAME_METADATA),
      EXR.encode(sceneImage('half', ['R', 'G', 'B'], [301, 70], 'waves'), FRAME_METADATA),
      EXR.encode(sceneImage('float', ['R', 'G', 'B'], [301, 70], 'waves'), FRAME_METADATA),
    ];
    expect(files.map(hash)).toMatchInlineSnapshot(`
      [
        "edc2f902ef43792e",
        "f49013afb8595ab0",
        "4a96c5c457defa44",
        "4cf18e24cdc6df00",
        "6572baa3ab61133d",
      ]
    `);
  });

  it('make the streams they always made', () => {
    const all = createHash('sha256');
    for (const scene of Object.values(BYTE_SCENES)) {
      for (const kind of Object.keys(KINDS) as Kind[]) {
        for (const length of [100, 5000, 150_000]) all.update(kernelStream(scene(length), kind));
      }
    }
    expect(all.digest('hex').slice(0, 16)).toMatchInlineSnapshot(`"622738a35582ed76"`);
  });
});
