import Ajv2020 from 'ajv/dist/2020';
import { describe, expect, it } from 'vitest';
import schema from '../../../schemas/words.schema.json';
import { exactRatio } from '../../../shared/fixed-point/exact-ratio';
import { carrierGains, clockGains } from '../../../shared/fixed-point/loop-scale';
import { carrierWords, clockWords, frequencyWord } from '../../../shared/fixed-point/words';
import { allWords } from './datapath/cases';
import { gardnerLink, qpskLink } from './link';

const validate = new Ajv2020().compile(schema);
const { carrier } = qpskLink;

const withNco = (change: Partial<typeof carrier.nco>, arithmetic = {}) =>
  carrierWords({
    ...qpskLink,
    carrier: { ...carrier, nco: { ...carrier.nco, ...change }, arithmetic: { ...carrier.arithmetic, ...arithmetic } },
  });

describe('words.schema.json', () => {
  it('accepts the words of every reference case, as stored', () => {
    expect(allWords).toHaveLength(48);
    for (const words of allWords) expect(validate(words), JSON.stringify(validate.errors)).toBe(true);
  });

  it('accepts what the two loops are given', () => {
    expect(validate(carrierWords(qpskLink)), JSON.stringify(validate.errors)).toBe(true);
    expect(validate(clockWords(gardnerLink)), JSON.stringify(validate.errors)).toBe(true);
  });

  it('refuses a key that it does not know', () => {
    expect(validate({ ...carrierWords(qpskLink), gain: 1 })).toBe(false);
  });
});

describe('frequencyWord', () => {
  // 7 MHz at 100 MHz, 32 bits: 0.07·2^32 = 300647710.72.
  it('is 300647711 for 7 MHz at 100 MHz', () => {
    expect(frequencyWord(exactRatio(7e6), exactRatio(100e6), 32)).toBe(300647711n);
  });

  it('wraps a negative frequency into the upper half', () => {
    expect(frequencyWord(exactRatio(-25e6), exactRatio(100e6), 32)).toBe(3n * 2n ** 30n);
  });

  // By hand: 2^64/3 = 6148914691236517205.33….
  it('keeps all 64 bits', () => {
    expect(frequencyWord(exactRatio(2 ** 40), exactRatio(3 * 2 ** 40), 64)).toBe(6148914691236517205n);
  });

  it('takes a half upward', () => {
    expect(frequencyWord(exactRatio(1), exactRatio(512), 8)).toBe(1n);
    expect(frequencyWord(exactRatio(-1), exactRatio(512), 8)).toBe(0n);
  });
});

describe('carrierWords', () => {
  // By hand: one error LSB is 2^−10, K0 = 2π/2^32, so the proportional gain is
  // 300/11401 / (0.5·2π/2^32) · 2^−10 = 35131.6… NCO LSB per error LSB = 1097.9·2^5, the mantissa in 1024 … 2047;
  // the integral one is 4/11401 / (0.5·2π/2^32)·2^−10·2^12 = 1918611 = 1873.6·2^10.
  it('turns gains into the nearest words', () => {
    const [stage] = carrierWords(qpskLink).stages;
    const perUnit = 0.5 * 2 * Math.PI * 2 ** -32 * 2 ** 10;
    expect(300 / 11401 / perUnit / 2 ** 5).toBeCloseTo(1097.86, 1);
    expect(stage!.proportional).toEqual({ mantissa: Math.round(300 / 11401 / perUnit / 2 ** 5), shift: -5 });
    expect(stage!.integral).toEqual({ mantissa: Math.round((4 / 11401 / perUnit / 2 ** 10) * 2 ** 12), shift: -10 });
  });

  it('negates the mantissas for the other polarity', () => {
    const [plain] = carrierWords(qpskLink).stages;
    const [turned] = carrierWords({ ...qpskLink, carrier: { ...carrier, polarity: -1 } }).stages;
    expect(turned!.proportional).toEqual({ ...plain!.proportional, mantissa: -plain!.proportional.mantissa });
  });

  // 77500/27.5e6·2^44, below 2^53 and so exact enough in doubles to round down.
  it('limits the integrator to a frequency, rounded down', () => {
    expect(withNco({}, { integratorLimitHz: 77500 }).integratorLimit).toBe(Math.floor((77500 / 27.5e6) * 2 ** 44));
    expect(withNco({}, { integratorLimitHz: 27.5e6 }).integratorLimit).toBe(2 ** 43 - 1);
    expect(withNco({}).integratorLimit).toBeNull();
  });

  it('counts m updates a symbol for an interval of 1/m', () => {
    const words = carrierWords({
      ...qpskLink,
      carrier: { ...carrier, updateInterval: 0.25, nco: { ...carrier.nco, stepsPerSymbol: 4 } },
    });
    expect([words.symbolsPerUpdate, words.updatesPerSymbol]).toEqual([1, 4]);
  });

  it.each([
    ['/carrier/updateInterval', { updateInterval: 1.5 }],
    ['/carrier/nco/stepsPerSymbol', { updateInterval: 0.5 }],
    ['/carrier/nco/phaseBits', { nco: { ...carrier.nco, widthBits: 10 } }],
    ['/carrier/arithmetic/guardBits', { arithmetic: { ...carrier.arithmetic, guardBits: 44 } }],
  ])('points at %s', (parameter, change) => {
    const input = { ...qpskLink, carrier: { ...carrier, ...change } };
    expect(() => carrierWords(input)).toThrow(expect.objectContaining({ parameter }));
  });

  // By hand: a sample LSB of 2^−43 and an error LSB of 2^(k − 1) lie k + 42 bits apart; rs(x, s) ends at s = ±63.
  it.each([
    [21, true],
    [22, false],
    [-32, true],
  ])('with an error scale of 2^%i can shift the detector value: %s', (errorFullScaleLog2, can) => {
    const signal = { ...qpskLink.signal, sampleBits: 12, sampleFullScaleLog2: -32 };
    const arithmetic = { ...carrier.arithmetic, errorBits: 2, errorFullScaleLog2 };
    const make = () => carrierWords({ ...qpskLink, signal, carrier: { ...carrier, arithmetic } });
    if (can) expect(make().errorFullScaleLog2).toBe(errorFullScaleLog2);
    else expect(make).toThrow(expect.objectContaining({ parameter: '/carrier/arithmetic/errorFullScaleLog2' }));
  });
});

describe('clockWords', () => {
  // 2 samples per symbol: half of 2^32; 3: 2^32/3 = 1431655765.33.
  it('steps the counter by 2^Wc/N to nearest', () => {
    expect(clockWords(gardnerLink).counter.nominalStep).toBe(2 ** 31);
    const three = { ...gardnerLink, signal: { ...gardnerLink.signal, samplesPerSymbol: 3 } };
    expect(clockWords(three).counter.nominalStep).toBe(1431655765);
  });

  // 100 ppm of 2^31 with 12 guard bits: 2^43·10^−4 = 879609302.2; without hold twice that.
  it('limits the integrator to a rate error', () => {
    const limited = (hold: boolean) => ({
      ...gardnerLink,
      clock: { ...gardnerLink.clock, hold, arithmetic: { ...carrier.arithmetic, integratorLimitPpm: 100 } },
    });
    expect(clockWords(limited(true)).integratorLimit).toBe(879609302);
    expect(clockWords(limited(false)).integratorLimit).toBe(1759218604);
  });

  // By hand: the Gardner detector multiplies two samples, an LSB of 2^−42 here; 2^(22 − 1) is 63 bits above it.
  it('points at an error scale that the detector value cannot be shifted to', () => {
    const signal = { ...gardnerLink.signal, sampleBits: 12, sampleFullScaleLog2: -10 };
    const scaled = (errorFullScaleLog2: number) => {
      const arithmetic = { ...gardnerLink.clock.arithmetic, errorBits: 2, errorFullScaleLog2 };
      return () => clockWords({ ...gardnerLink, signal, clock: { ...gardnerLink.clock, arithmetic } });
    };
    expect(scaled(22)().errorFullScaleLog2).toBe(22);
    expect(scaled(23)).toThrow(expect.objectContaining({ parameter: '/clock/arithmetic/errorFullScaleLog2' }));
  });

  it('keeps the lock threshold in 1/256, rounded down', () => {
    const stage = { ...gardnerLink.stages[0]!, lockThreshold: 0.66 };
    expect(clockWords({ ...gardnerLink, stages: [stage] }).stages[0]!.lockThreshold).toBe(168);
  });
});

describe('gains from words', () => {
  it('come back within half a mantissa LSB', () => {
    const [gains] = carrierGains(carrierWords(qpskLink), qpskLink.detectorGain);
    expect(gains!.g1 / (300 / 11401)).toBeCloseTo(1, 3);
    expect(gains!.g2 / (4 / 11401)).toBeCloseTo(1, 3);
    const [clock] = clockGains(clockWords(gardnerLink), gardnerLink.detectorGain, 2);
    expect(clock!.g1 / 0.01).toBeCloseTo(1, 3);
    expect(clock!.g2 / 0.00005).toBeCloseTo(1, 3);
  });
});
