import { describe, expect, it } from 'vitest';
import { bandGaps, type CascadeLayout } from '../../../src/plan/cascade-layout.ts';
import { bandLimits, bandWeight } from '../../../src/waves/band.ts';
import { laidOut, seaOf, swellKeys, windSeaKeys, withCascades } from '../../support/planned-seas.ts';

const SEA = windSeaKeys(10, 100);

function listed(...cascades: Readonly<Record<string, unknown>>[]): readonly CascadeLayout[] {
  const list = cascades.map((cascade) => ({ resolution: 256, ...cascade }));
  return laidOut(seaOf([SEA], { cascades: list })).layouts;
}

/** Wavelengths at which a band begins and ends, m. */
function ends({ band }: CascadeLayout): [longestM: number, shortestM: number] {
  const { kMinRadPerM, kMaxRadPerM } = bandLimits(band);
  return [(2 * Math.PI) / kMinRadPerM, (2 * Math.PI) / kMaxRadPerM];
}

const close = (...values: number[]) => values.map((value) => expect.closeTo(value, 9));

/** Weights of all bands at the waves of one length. */
function weights(layouts: readonly CascadeLayout[], wavelengthM: number): number[] {
  return layouts.map(({ band }) => bandWeight((2 * Math.PI) / wavelengthM, band));
}

describe('cascades in a list', () => {
  it('without bands share a border that ends at four texels of the longer', () => {
    const layouts = listed({ patch: 256 }, { patch: 40 });
    expect(ends(layouts[0])).toEqual(close(Infinity, 4));
    expect(ends(layouts[1])).toEqual(close(4 * 1.25 ** 2, 0.625));
    expect(weights(layouts, 5)).toEqual(close(0.5, 0.5));
    expect(weights(layouts, 20)).toEqual([1, 0]);
    expect(weights(layouts, 2)).toEqual([0, 1]);
    expect(bandGaps(layouts)).toEqual([]);
  });

  it('cross-fade over the whole of an overlap', () => {
    const layouts = listed({ patch: 256, band: { shortest: 4 } }, { patch: 40, band: { longest: 16 } });
    expect(weights(layouts, 17)).toEqual([1, 0]);
    expect(weights(layouts, 8)).toEqual(close(0.5, 0.5));
    expect(weights(layouts, 3.9)).toEqual([0, 1]);
    expect(bandGaps(layouts)).toEqual([]);
  });

  it('that only touch share a standard border', () => {
    const layouts = listed({ patch: 256, band: { shortest: 10 } }, { patch: 40, band: { longest: 10 } });
    expect(layouts[0].band.high).toEqual(layouts[1].band.low);
    expect(ends(layouts[0])[1]).toBeCloseTo(10, 9);
    expect(ends(layouts[1])[0]).toBeCloseTo(15.625, 9);
  });

  it('with a gap between them keep it, and say so', () => {
    const layouts = listed({ patch: 256, band: { shortest: 12 } }, { patch: 40, band: { longest: 8 } });
    expect(weights(layouts, 12.1)[0]).toBeLessThan(0.01);
    expect(weights(layouts, 10)).toEqual([0, 0]);
    expect(weights(layouts, 7.9)[1]).toBeLessThan(0.01);
    expect(bandGaps(layouts)).toEqual([
      { longestWavelengthM: expect.closeTo(12, 9), shortestWavelengthM: expect.closeTo(8, 9) },
    ]);
  });

  it('begin and end inside the longest and the shortest wave asked for', () => {
    const [only] = listed({ patch: 100, band: { longest: 50, shortest: 5 } });
    expect(ends(only)).toEqual(close(50, 5));
    expect(weights([only], 40)).toEqual(close(0.5));
    expect(weights([only], 6.25)).toEqual(close(0.5));
  });

  it('with a narrow band carry it, fading over half its width', () => {
    const [only] = listed({ patch: 100, band: { longest: 8, shortest: 6 } });
    expect(ends(only)).toEqual(close(8, 6));
    expect(weights([only], Math.sqrt(48))).toEqual(close(1));
  });

  it('count no wave twice where three bands overlap', () => {
    const layouts = listed(
      { patch: 256, band: { shortest: 4 } },
      { patch: 90, band: { longest: 40, shortest: 2 } },
      { patch: 40, band: { longest: 20, shortest: 0.7 } },
    );
    for (let wavelength = 90; wavelength > 1.2; wavelength *= 0.97) {
      const sum = weights(layouts, wavelength).reduce((a, b) => a + b, 0);
      expect(sum).toBeCloseTo(1, 12);
    }
    expect(Math.min(...weights(layouts, 9))).toBeGreaterThan(0.05);
  });

  it('of which one ends before its longer neighbour leave nothing to it, and nothing twice', () => {
    const layouts = listed({ patch: 256, resolution: 512 }, { patch: 100, resolution: 16 }, { patch: 40 });
    for (let wavelength = 250; wavelength > 1; wavelength *= 0.97) {
      const [first, second, third] = weights(layouts, wavelength);
      expect(first + second + third).toBeCloseTo(1, 12);
      expect(second).toBe(0);
    }
  });
});

describe('planned cascades', () => {
  it('are no more than the shortest wave needs', () => {
    const { layouts } = laidOut(withCascades(seaOf([SEA]), { count: 6, shortestWavelengthM: 2 }));
    expect(layouts.length).toBeLessThan(6);
    expect(ends(layouts[layouts.length - 1])[1]).toBeLessThan(2.2);
  });

  it('begin with the patch asked for', () => {
    const { layouts } = laidOut(withCascades(seaOf([SEA]), { longestPatchM: 250 }));
    expect(layouts[0].patchLengthM).toBe(250);
  });

  it('take the longest patch that any system of a twentieth of the energy wants', () => {
    const mixed = (height: number) =>
      laidOut(seaOf([SEA, { ...swellKeys(14, 5, 75), significantHeight: height }])).layouts[0].patchLengthM;
    const alone = laidOut(seaOf([swellKeys(14, 5, 75)])).layouts[0].patchLengthM;
    // A wind sea of 2.14 m: a swell of 0.55 m is over a twentieth of the whole, one of 0.4 m is not.
    expect(mixed(0.55)).toBe(alone);
    expect(mixed(0.4)).toBe(laidOut(seaOf([SEA])).layouts[0].patchLengthM);
  });

  it('have loops of their own where asked, and the whole loop elsewhere', () => {
    const sea = seaOf([SEA], {
      loop: { seconds: 12, frameRate: 24 },
      cascades: { loops: ['whole', { seconds: 6 }, { seconds: 4, frameRate: 12 }] },
    });
    const loops = laidOut(sea).layouts.map(({ loop }) => [
      loop.frameCount,
      loop.frameRate[0] / loop.frameRate[1],
    ]);
    expect(loops).toEqual([
      [288, 24],
      [144, 24],
      [48, 12],
    ]);
  });

  it('end at the head room asked for', () => {
    const [tight] = laidOut(withCascades(seaOf([SEA]), { headRoom: 0.7 })).layouts;
    expect(ends(tight)[1]).toBeCloseTo((2 * tight.patchLengthM) / (0.7 * 256), 9);
  });
});
