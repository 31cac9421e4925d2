import { describe, expect, it } from 'vitest';
import { channelRange } from '../../../src/cli/channel-range.ts';
import type { FieldDeviations, PlannedChannel } from '../../../src/index.ts';

const DEVIATIONS: FieldDeviations = {
  height: 0.5,
  displacementEast: 0.4,
  displacementNorth: 0.3,
  velocityEast: 0.9,
  velocityNorth: 0.8,
  velocityUp: 1,
  slopeEast: 0.1,
  slopeNorth: 0.09,
  slopeProduct: 0,
  strainEastEast: 0.11,
  strainNorthNorth: 0.12,
  strainEastNorth: 0.05,
  compression: 0.2,
};

const channel = (changes: Partial<PlannedChannel>): PlannedChannel => ({
  name: 'R',
  quantity: 'displacement-up',
  unit: 'm',
  decode: { scale: 1, offset: 0 },
  ...changes,
});

describe('channelRange', () => {
  it('takes the range of integers from the decode rule, whatever its sign', () => {
    const decode = { scale: -65.535, offset: 32.768 };
    const range = channelRange(channel({ decode }), 'uint16', DEVIATIONS);
    expect(range.low).toBeCloseTo(-32.767, 12);
    expect(range.high).toBe(32.768);
    expect(range.step).toBeCloseTo(0.001, 15);
    expect(range.isEstimate).toBe(false);
  });

  it.each([
    ['displacement-up', 2],
    ['height', 2],
    ['displacement-east', 1.6],
    ['velocity-up', 4],
    ['slope-north', 0.36],
    ['strain-east-east', 0.44],
    ['strain-east-north', 0.2],
  ] as const)('estimates the range of %s in floats as four deviations', (quantity, largest) => {
    const range = channelRange(channel({ quantity }), 'half', DEVIATIONS);
    expect(range).toMatchObject({ low: -range.high, isEstimate: true });
    expect(range.high).toBeCloseTo(largest, 12);
  });

  it("gives the step of a float at the range's end: 10 and 23 bits below its leading one", () => {
    // 2 = 2^1, so the neighbours are 2^-9 and 2^-22 away.
    expect(channelRange(channel({}), 'half', DEVIATIONS).step).toBe(2 ** -9);
    expect(channelRange(channel({}), 'float', DEVIATIONS).step).toBe(2 ** -22);
  });

  it('measures in the unit of the channel', () => {
    expect(channelRange(channel({ unit: 'cm' }), 'float', DEVIATIONS).high).toBe(200);
    expect(channelRange(channel({ quantity: 'velocity-up', unit: 'cm/s' }), 'float', DEVIATIONS).high).toBe(
      400,
    );
  });

  it('estimates what a survey will find', () => {
    const range = channelRange(channel({ decode: null }), 'uint8', DEVIATIONS);
    expect(range).toMatchObject({ low: -2, high: 2, isEstimate: true });
    expect(range.step).toBeCloseTo(4 / 255, 15);
    const J = channelRange(channel({ decode: null, quantity: 'jacobian', unit: '1' }), 'uint16', DEVIATIONS);
    expect(J.low).toBeCloseTo(0.2, 12);
    expect(J.high).toBeCloseTo(1.8, 12);
    expect(J.step).toBeCloseTo(1.6 / 65535, 15);
  });

  it('knows the ranges of foam and normals in floats', () => {
    expect(channelRange(channel({ quantity: 'foam' }), 'half', DEVIATIONS)).toMatchObject({
      low: 0,
      high: 1,
    });
    expect(channelRange(channel({ quantity: 'normal-up' }), 'half', DEVIATIONS)).toMatchObject({
      low: -1,
      high: 1,
    });
  });
});
