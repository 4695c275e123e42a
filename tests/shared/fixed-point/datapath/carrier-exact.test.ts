import { describe, expect, it } from 'vitest';
import { carrierDatapath, type CarrierStep } from '../../../../shared/fixed-point/datapath/carrier-exact';
import { inLock } from '../../../../shared/fixed-point/datapath/lock-detector';
import { toStored } from '../../../../shared/fixed-point/format';
import type { CarrierWords } from '../../../../shared/model/words';
import { carrierCases } from './cases';

const stored = ({ z, updates, phase, stage }: CarrierStep) => ({
  z: z.map(toStored),
  updates: updates.map((nodes) =>
    Object.fromEntries(Object.entries(nodes).map(([name, value]) => [name, toStored(value)])),
  ),
  phase: toStored(phase),
  stage,
});

describe('carrierDatapath', () => {
  it.each(carrierCases)('reproduces every node of reference case $name', ({ words, steps }) => {
    const datapath = carrierDatapath(words);
    for (const { x, ...nodes } of steps) expect(stored(datapath.step({ x }))).toEqual(nodes);
  });

  it('covers both rounding halves, all three orders and all overflow modes with the reference cases', () => {
    expect(carrierCases).toHaveLength(27);
    expect(new Set(carrierCases.map(({ words }) => words.order))).toEqual(new Set([1, 2, 3]));
    expect(new Set(carrierCases.map(({ words }) => words.rounding))).toEqual(
      new Set(['floor', 'nearest', 'convergent']),
    );
  });

  // By hand: one step adds the word once; neither integer is a double's neighbour of itself, 2^53 + 1 is no double.
  it.each([2n ** 53n - 1n, 2n ** 53n + 1n])('keeps the frequency word %d in a 64-bit NCO', (fcw) => {
    const words = carrierCases.find((each) => each.words.nco.widthBits === 64)!.words;
    const still = { mantissa: 0, shift: 0 };
    const stages = [
      { proportional: still, integral: still, integral2: still, untilSymbols: null, lockThreshold: null },
    ];
    const nco = { ...words.nco, stepsPerSymbol: 1, fcw: toStored(fcw) };
    const once = { symbolsPerUpdate: 1, updatesPerSymbol: 1 };
    const datapath = carrierDatapath({ ...words, ...once, order: 1, stages, nco });
    expect(datapath.step({ x: [0, 0] }).phase).toBe(fcw);
    expect(datapath.step({ x: [0, 0] }).phase).toBe(2n * fcw);
  });

  it('saturates a left shift of a negative product at the foot of a 64-bit word', () => {
    const words = carrierCases.find((each) => each.words.nco.widthBits === 64)!.words;
    const least = { mantissa: 1, shift: -63 };
    const none = { mantissa: 0, shift: 0 };
    const stages = [{ proportional: least, integral: none, integral2: none, untilSymbols: null, lockThreshold: null }];
    const overflow = Object.fromEntries(Object.keys(words.overflow).map((node) => [node, 'saturate']));
    const base = { ...words, detector: 'costas', modulation: 'bpsk', order: 1, delay: 0, overflow, stages };
    const once = { symbolsPerUpdate: 1, updatesPerSymbol: 1, errorFullScaleLog2: 0, sampleFullScaleLog2: 0 };
    const datapath = carrierDatapath({ ...base, ...once } as unknown as CarrierWords);
    const { updates } = datapath.step({ x: [2000, -2000] });
    expect(updates[0]!.e).toBeLessThan(0n);
    expect(updates[0]!.w).toBe(-(2n ** 63n));
  });
});

describe('inLock', () => {
  // T = 128: half the denominator, rounded down.
  it.each([
    [50n, 100n, true],
    [49n, 100n, false],
    [50n, 101n, true],
    [0n, 1n, true],
    [0n, 0n, false],
  ])('num %d of den %d at one half: %s', (num, den, locked) => {
    expect(inLock({ num, den }, 128)).toBe(locked);
  });
});
