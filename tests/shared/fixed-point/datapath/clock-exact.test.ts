import { describe, expect, it } from 'vitest';
import { clockDatapath, type ClockStep } from '../../../../shared/fixed-point/datapath/clock-exact';
import { toStored } from '../../../../shared/fixed-point/format';
import { clockCases } from './cases';

const stored = ({ interpolants, update, stage, eta }: ClockStep) => ({
  interpolants: interpolants.map(({ value, ...rest }) => ({ ...rest, value: value.map(toStored) })),
  ...(update && {
    update: Object.fromEntries(Object.entries(update).map(([name, value]) => [name, toStored(value)])),
  }),
  ...(stage !== undefined && { stage }),
  eta: toStored(eta),
});

describe('clockDatapath', () => {
  it.each(clockCases)('reproduces every node of reference case $name', ({ words, steps }) => {
    const datapath = clockDatapath(words);
    for (const { x, ...nodes } of steps) expect(stored(datapath.step(x))).toEqual(nodes);
  });

  it('covers three detectors and three interpolators, with hold and without', () => {
    expect(clockCases).toHaveLength(21);
    expect(new Set(clockCases.map(({ words }) => words.detector)).size).toBe(3);
    expect(new Set(clockCases.map(({ words }) => words.interpolator)).size).toBe(3);
    expect(new Set(clockCases.map(({ words }) => words.hold)).size).toBe(2);
  });
});
