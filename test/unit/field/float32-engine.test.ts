import { describe, expect, it } from 'vitest';
import { type Float32Fields, float32Engine, kernelBytes } from '../../../src/field/float32-engine.ts';
import type { SamplesRequest } from '../../../src/field/float32-requests.ts';
import { float64Engine } from '../../../src/field/float64-engine.ts';
import { FIELD_NAMES, type FieldName } from '../../../src/field/frame-fields.ts';
import { type SynthesisOptions, synthesis } from '../../../src/field/synthesis.ts';
import { sha256 } from '../../../src/hash.ts';
import { stripsBytes } from '../../../src/kernel/wave/layout.ts';
import type { WaveAmplitudes } from '../../../src/waves/wave-amplitudes.ts';
import { describeKernel } from '../../support/kernels.ts';
import { randomWaves } from '../../support/random-waves.ts';

/** What the engine promises: a difference in any field, over the largest value of its kind. Measured: 5.2e-7 at most. */
const ENGINE_AGREEMENT = 1e-6;

const ALL: ReadonlySet<FieldName> = new Set(FIELD_NAMES);
const KINDS: readonly (readonly FieldName[])[] = [
  ['displacementEast', 'displacementNorth', 'height'],
  ['slopeEast', 'slopeNorth', 'strainEastEast', 'strainNorthNorth', 'strainEastNorth'],
  ['velocityEast', 'velocityNorth', 'velocityUp'],
];

function optionsOf(changes: Partial<SynthesisOptions> = {}): SynthesisOptions {
  return { depthM: Infinity, horizontalScale: 1, fields: ALL, ...changes };
}

function largest(values: ArrayLike<number>): number {
  let most = 0;
  for (let i = 0; i < values.length; i++) most = Math.max(most, Math.abs(values[i]));
  return most;
}

/** Largest difference of each kind of field between the engines, over the largest value of the kind. */
function disagreements(waves: WaveAmplitudes, options: SynthesisOptions, frame: number): number[] {
  const reference = synthesis(waves, float64Engine(waves.lattice.resolution), options).frame(frame);
  const fields = float32Engine().synthesis(waves, options).frame(frame);
  return KINDS.flatMap((kind) => {
    const wanted = kind.filter((name) => options.fields.has(name));
    if (wanted.length === 0) return [];
    let difference = 0;
    let most = 0;
    for (const name of wanted) {
      const [a, b] = [fields[name] as Float32Array, reference[name] as Float64Array];
      for (let i = 0; i < b.length; i++) {
        // NaN stays and passes for no agreement.
        difference = Math.max(difference, Math.abs(a[i] - b[i]));
      }
      most = Math.max(most, largest(b));
    }
    return [difference / most];
  });
}

function hashOf(arrays: readonly (Float32Array | Uint8Array | Uint16Array)[]): string {
  return sha256(Buffer.concat(arrays.map((a) => new Uint8Array(a.buffer, a.byteOffset, a.byteLength))));
}

/** Hash of all fields in a fixed order. */
function fieldsHash(fields: Float32Fields): string {
  return hashOf(FIELD_NAMES.flatMap((name) => fields[name] ?? []));
}

describeKernel('wave', 'the float32 engine', () => {
  it.each([16, 32, 64, 128, 256, 512])('agrees with the float64 engine at %i', (N) => {
    for (const current of [false, true]) {
      for (const reach of N < 256 ? [N / 4 - 1, N / 3, N / 2 - 1] : [current ? N / 4 - 1 : N / 2 - 1]) {
        const waves = randomWaves({ resolution: N, reach, current, seed: N });
        for (const found of disagreements(waves, optionsOf({ depthM: 20 }), 7)) {
          expect(found, `reach ${reach}, current ${current}`).toBeLessThan(ENGINE_AGREEMENT);
        }
      }
    }
  });

  it.each([
    ['shallow water', {}, { depthM: 0.5 }],
    ['a reduced horizontal scale', {}, { horizontalScale: 0.3 }],
    ['waves along one axis', { breadth: 0 }, {}],
    ['waves nearly along one axis', { breadth: 1e-4 }, {}],
    ['a tile of a metre', { patchLengthM: 1 }, {}],
    ['a tile of ten kilometres', { patchLengthM: 10_000 }, {}],
    ['height alone', {}, { fields: new Set<FieldName>(['height']) }],
    ['shear alone', {}, { fields: new Set<FieldName>(['strainEastNorth']) }],
    ['one of a pair', {}, { fields: new Set<FieldName>(['slopeNorth', 'velocityUp']) }],
  ])('agrees in %s', (_what, waves, options) => {
    const drawn = randomWaves({ resolution: 64, ...waves });
    for (const found of disagreements(drawn, optionsOf(options), 11)) {
      expect(found).toBeLessThan(ENGINE_AGREEMENT);
    }
  });

  it('keeps the shear of nearly parallel waves to its own digits', () => {
    const waves = randomWaves({ resolution: 64, breadth: 1e-4 });
    const fields = new Set<FieldName>(['height', 'strainEastNorth']);
    const name = 'strainEastNorth';
    const reference = synthesis(waves, float64Engine(64), optionsOf({ fields })).frame(5)[
      name
    ] as Float64Array;
    const shear = float32Engine().synthesis(waves, optionsOf({ fields })).frame(5)[name] as Float32Array;
    const difference = largest(shear.map((value, i) => value - reference[i]));
    expect(difference / largest(reference)).toBeLessThan(ENGINE_AGREEMENT);
  });

  it('has horizontal scale 0 leave a flat map and no strain', () => {
    const surface = float32Engine().synthesis(
      randomWaves({ resolution: 32 }),
      optionsOf({ horizontalScale: 0 }),
    );
    const frame = surface.frame(3);
    for (const name of ['displacementEast', 'strainEastEast', 'strainEastNorth', 'velocityNorth'] as const) {
      expect(largest(frame[name] as Float32Array)).toBe(0);
    }
    expect(largest(frame.height as Float32Array)).toBeGreaterThan(0);
  });

  it('makes a flat sea of no waves', () => {
    const waves = randomWaves({ resolution: 32, reach: 0 });
    for (const field of Object.values(float32Engine().synthesis(waves, optionsOf()).frame(0))) {
      expect(largest(field)).toBe(0);
    }
  });

  it('moves one wave toward +k and gathers points at its crest', () => {
    const N = 32;
    const waves = randomWaves({ resolution: N, reach: 0, patchLengthM: 2 * Math.PI });
    // eta = 2 cos(2 x - phi), x counted from the first texel: A = 1 at n = (2, 0), which turns once.
    waves.amplitude[2 * 2] = 1;
    waves.turns[2] = 1;
    const surface = float32Engine().synthesis(waves, optionsOf());
    const quarter = waves.frameCount / 4;
    const { height, displacementEast, strainEastEast, velocityUp } = surface.frame(quarter);
    for (let x = 0; x < N; x++) {
      const theta = (4 * Math.PI * x) / N - Math.PI / 2;
      expect(height?.[5 * N + x]).toBeCloseTo(2 * Math.cos(theta), 5);
      expect(displacementEast?.[5 * N + x]).toBeCloseTo(-2 * Math.sin(theta), 5);
      expect(strainEastEast?.[5 * N + x]).toBeCloseTo(-4 * Math.cos(theta), 5);
      expect(velocityUp?.[5 * N + x]).toBeCloseTo(((2 * Math.PI) / 8) * 2 * Math.sin(theta), 5);
    }
  });

  it('has frame N be frame 0 to the bit, before and behind', () => {
    const waves = randomWaves({ resolution: 32, current: true, frameCount: 30 });
    const surface = float32Engine().synthesis(waves, optionsOf());
    const first = fieldsHash(surface.frame(4));
    for (const n of [34, -26, 30 * 1_000_000 + 4]) expect(fieldsHash(surface.frame(n))).toBe(first);
  });

  // Waves that end short of a quarter and of half the lattice leave rows that only a clearing keeps at zero.
  it.each([9, 15, 20, 31])('makes the same bytes in any order, company and memory: reach %i', (reach) => {
    const waves = randomWaves({ resolution: 64, current: true, reach });
    const expected = fieldsHash(float32Engine().synthesis(waves, optionsOf()).frame(9));

    const engine = float32Engine();
    const surface = engine.synthesis(waves, optionsOf());
    const other = engine.synthesis(randomWaves({ resolution: 128, reach: 63 }), optionsOf());
    surface.frame(2);
    other.frame(1);
    expect(fieldsHash(surface.frame(9))).toBe(expected);

    const { kept, lent } = kernelBytes(64, ALL, { reach, current: true });
    const little = float32Engine(kept + lent - 3 * stripsBytes(64));
    expect(fieldsHash(little.synthesis(waves, optionsOf()).frame(9))).toBe(expected);
  });

  it('refuses what its memory cannot hold, and to read a frame whose memory another has used', () => {
    const waves = randomWaves({ resolution: 64 });
    expect(() => float32Engine(1 << 18).synthesis(waves, optionsOf())).toThrow('do not fit');
    const engine = float32Engine();
    const surface = engine.synthesis(waves, optionsOf());
    const other = engine.synthesis(waves, optionsOf());
    surface.turnTo(0);
    other.turnTo(0);
    expect(() => surface.values('height')).toThrow('another cascade');
  });

  it('takes the memory it says, within a page', () => {
    for (const [N, fields] of [
      [256, ALL],
      [512, new Set<FieldName>(['displacementEast', 'height', 'slopeEast'])],
    ] as const) {
      const engine = float32Engine();
      engine.synthesis(randomWaves({ resolution: N }), optionsOf({ fields })).turnTo(0);
      const { kept, lent } = kernelBytes(N, fields, { reach: N / 4 - 1, current: false });
      expect(engine.memoryBytes).toBeLessThanOrEqual(kept + lent + 65536);
      expect(engine.memoryBytes).toBeGreaterThan(0.9 * (kept + lent));
    }
  });

  it('knows before there are waves what cannot be held', () => {
    const band = { reach: 2047, current: true };
    expect(kernelBytes(8192, ALL, band).lent).toBeLessThan(2 ** 32);
    expect(kernelBytes(8192, ALL, { reach: 4095, current: true }).lent).toBeLessThan(2 ** 32);
  });

  // The bytes themselves: relaxed SIMD, another order of sums or a fused operation would change them.
  it.each([
    [
      'still, inner',
      { resolution: 64 },
      'sha256:fd89a75680bc691ef394d1dd9606e4abfd0b312a7ac2bb59a0ddcb202d3eb1ec',
    ],
    [
      'still, full',
      { resolution: 32, reach: 15 },
      'sha256:00fe16e9007dcf3d89b46bfbeabb93f2a287eed19201d3961f3f44bdd4530c6d',
    ],
    [
      'current, inner',
      { resolution: 128, current: true },
      'sha256:b3e554b84656d4eb77727fc7291cd257271cbde0d80ee8f527e6c658f5148c78',
    ],
  ])('makes these bytes: %s', (_path, waves, golden) => {
    const surface = float32Engine().synthesis(randomWaves(waves), optionsOf());
    expect(fieldsHash(surface.frame(13))).toBe(golden);
  });

  it.each(['uint8', 'uint16', 'half', 'float'] as const)('makes these samples: %s', (sample) => {
    const N = 32;
    const surface = float32Engine().synthesis(randomWaves({ resolution: N }), optionsOf());
    surface.turnTo(5);
    const plane = sample === 'uint8' ? Uint8Array : sample === 'float' ? Float32Array : Uint16Array;
    const planes = [0, 1, 2].map(() => new plane(N * N));
    const gain = { uint8: 100, uint16: 30000, half: 1, float: 1 }[sample];
    const shift = { uint8: 128, uint16: 32768, half: 0, float: 0 }[sample];
    const values = ['displacementNorth', 'normalEast', 'jacobian'] as const;
    const channels = values.map((value) => ({ value, gain, shift, dither: null }));
    const request: SamplesRequest = { sample, channels, rowZero: 'north', target: { planes } };
    surface.samples([request]);
    const golden = {
      uint8: 'sha256:cb07967c30eae43b8d65a17920f0a0ee771d54c1e141eca3ffa63479011b311c',
      uint16: 'sha256:981372c2c3edfbd769c72e2b3d64be3a4c08de0186fa8df29dc0e1f5dd07e241',
      half: 'sha256:98ca8e3559d1e6821e97ce11a9d83a77677260d9eeec560032c48644455e3f2d',
      float: 'sha256:9c67eb2ae9a11fa89183a584612ba60de111a713007c5c5fd16b825f56d30671',
    };
    expect(hashOf(planes)).toBe(golden[sample]);
  });
});

describe('kernel memory', () => {
  it('is larger for more fields, more waves and a current', () => {
    const few = kernelBytes(256, new Set(['height']), { reach: 63, current: false });
    const all = kernelBytes(256, ALL, { reach: 63, current: false });
    const wide = kernelBytes(256, ALL, { reach: 127, current: false });
    const moving = kernelBytes(256, ALL, { reach: 127, current: true });
    expect(all.lent).toBeGreaterThan(few.lent);
    expect(wide.kept).toBeGreaterThan(all.kept);
    expect(moving.kept).toBeGreaterThan(wide.kept);
  });
});
