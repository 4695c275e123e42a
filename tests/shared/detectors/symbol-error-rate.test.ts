import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { rotationalSymmetry } from '../../../shared/detectors/modulations';
import type { Modulation } from '../../../shared/detectors/modulations';
import { errorRateOf, symbolErrorRate } from '../../../shared/detectors/symbol-error-rate';
import { Noise } from './noise';

const ratio = (decibels: number): number => 10 ** (decibels / 10);
const rate = (modulation: Modulation, decibels: number, phase = 0) =>
  symbolErrorRate(modulation, { esN0: ratio(decibels), phase });

/** Q(x) by Craig's integral over an angle, trapezoids. */
function upperTail(x: number): number {
  const steps = 2000;
  let sum = 0;
  for (let i = 0; i < steps; i += 1)
    sum += Math.exp(-(x ** 2) / (2 * Math.sin(((i + 0.5) * Math.PI) / 2 / steps) ** 2));
  return sum / steps / 2;
}

describe('symbolErrorRate', () => {
  // J. Proakis, "Digital Communications": BPSK Q(√2γ), QPSK 2Q(√γ) − Q²(√γ), square QAM 1 − (1 − 2(1 − 1/√M) Q(√(3γ/(M−1))))².
  it.each([4, 8, 12])('is that of the textbooks at %i dB without a phase error', (decibels) => {
    const gamma = ratio(decibels);
    const qpsk = 2 * upperTail(Math.sqrt(gamma)) - upperTail(Math.sqrt(gamma)) ** 2;
    const square = (side: number) =>
      1 - (1 - 2 * (1 - 1 / side) * upperTail(Math.sqrt((3 * gamma) / (side ** 2 - 1)))) ** 2;
    expect(rate('BPSK', decibels) / upperTail(Math.sqrt(2 * gamma))).toBeCloseTo(1, 9);
    expect(rate('QPSK', decibels) / qpsk).toBeCloseTo(1, 9);
    expect(rate('OQPSK', decibels) / qpsk).toBeCloseTo(1, 9);
    expect(rate('16QAM', decibels) / square(4)).toBeCloseTo(1, 9);
    expect(rate('64QAM', decibels) / square(8)).toBeCloseTo(1, 9);
  });

  // Published: a static phase of 10° costs BPSK 0.133 dB, −20 log cos 10°.
  it('costs BPSK 0.133 dB at 10°', () => {
    expect(rate('BPSK', 8 + 0.133, Math.PI / 18) / rate('BPSK', 8)).toBeCloseTo(1, 2);
  });

  // Derived: scipy 1.17, the density of the phase of a noisy sample integrated over the wedge of ±π/8.
  it.each([
    [10, 0, 0.08700476011690317],
    [10, 0.1, 0.1156595034461314],
    [15, 0.1, 0.010960848496571307],
    [15, 0.3, 0.23081889572684489],
    [12, 0.5, 0.7267364251767461],
  ])('of 8PSK is the integral of the phase at %f dB, %f rad', (decibels, phase, value) => {
    expect(rate('8PSK', decibels, phase) / value).toBeCloseTo(1, 11);
  });

  // Derived: numpy, least distances counted over a grid of 2001 × 2001 noises of ±7 deviations, good to 2e-3.
  it.each([
    ['16APSK', 10, 0, 0.22788],
    ['16APSK', 15, 0.05, 0.03203],
    ['16APSK', 18, 0.1, 0.015904],
    ['32APSK', 10, 0.1, 0.48189],
    ['32APSK', 15, 0.05, 0.144575],
    ['32APSK', 18, 0.1, 0.093163],
  ] as const)(
    'of %s is the volume outside the nearest regions at %f dB, %f rad',
    (modulation, decibels, phase, value) => {
      expect(Math.abs(rate(modulation, decibels, phase) / value - 1)).toBeLessThan(2.5e-3);
    },
  );

  // Derived: each rail of QPSK turned by φ, cos(π/4 ± φ) of its amplitude.
  it('turns the rails of QPSK', () => {
    const [one, other] = [0.5, -0.5].map((x) => upperTail(Math.sqrt(2 * ratio(9)) * Math.cos(Math.PI / 4 + 0.4 * x)));
    expect(rate('QPSK', 9, 0.2) / (one! + other! - one! * other!)).toBeCloseTo(1, 9);
  });

  // Independent: decisions counted. 40000 symbols, four deviations.
  it.each(['16QAM', '64QAM', 'OQPSK'] as const)('of %s is what is counted', (modulation) => {
    const [symbols, phase, gamma] = [40_000, 0.2, ratio(modulation === '64QAM' ? 16 : 10)];
    const wrong =
      modulation === 'OQPSK' ? offsetErrors(symbols, phase, gamma) : gridErrors(modulation, symbols, phase, gamma);
    const expected = symbolErrorRate(modulation, { esN0: gamma, phase });
    expect(Math.abs(wrong / symbols - expected)).toBeLessThan(4 * Math.sqrt(expected / symbols));
  });

  it.each(Object.keys(rotationalSymmetry) as Modulation[])(
    'of %s is a probability, even, least at phase 0',
    (modulation) => {
      const of = errorRateOf(modulation);
      const decibels = fc.double({ min: -10, max: 60, noNaN: true });
      fc.assert(
        fc.property(decibels, fc.double({ min: 0, max: 1.5, noNaN: true }), (level, phase) => {
          const value = of(ratio(level), phase);
          expect(value).toBeGreaterThanOrEqual(0);
          expect(value).toBeLessThanOrEqual(1);
          expect(Math.abs(of(ratio(level), -phase) - value)).toBeLessThan(1e-11);
          expect(value).toBeGreaterThanOrEqual(of(ratio(level), 0) * (1 - 1e-9));
        }),
        { numRuns: 60, seed: 20261201 },
      );
    },
  );

  it('keeps its digits where errors are rare', () => {
    // Derived: two of the eight-point circle's borders, 2Q(√2γ sin π/8) but for their corner.
    expect(rate('8PSK', 23) / (2 * upperTail(Math.sqrt(2 * ratio(23)) * Math.sin(Math.PI / 8)))).toBeCloseTo(1, 9);
    expect(rate('8PSK', 23)).toBeLessThan(1e-13);
  });
});

function gridErrors(modulation: '16QAM' | '64QAM', symbols: number, phase: number, gamma: number): number {
  const noise = new Noise(7);
  const side = modulation === '16QAM' ? 4 : 8;
  const half = Math.sqrt(1.5 / (side ** 2 - 1));
  const sliced = (x: number) => Math.min(side - 1, Math.max(0, Math.round((x / half + side - 1) / 2)));
  let wrong = 0;
  for (let k = 0; k < symbols; k += 1) {
    const [i, q] = [noise.index(side), noise.index(side)];
    const [aI, aQ] = [(2 * i - side + 1) * half, (2 * q - side + 1) * half];
    const zI = aI * Math.cos(phase) - aQ * Math.sin(phase) + noise.normal() / Math.sqrt(2 * gamma);
    const zQ = aI * Math.sin(phase) + aQ * Math.cos(phase) + noise.normal() / Math.sqrt(2 * gamma);
    if (sliced(zI) !== i || sliced(zQ) !== q) wrong += 1;
  }
  return wrong;
}

/** Raised cosine of roll-off 0.35 at whole symbols and a half, from its own formula. */
const halfTap = (k: number): number => {
  const t = k + 0.5;
  return (Math.sin(Math.PI * t) / (Math.PI * t)) * (Math.cos(0.35 * Math.PI * t) / (1 - (0.7 * t) ** 2));
};

function offsetErrors(symbols: number, phase: number, gamma: number): number {
  const noise = new Noise(11);
  const reach = 10;
  const taps = Array.from({ length: 2 * reach }, (_, j) => halfTap(j - reach));
  const [a, b] = [0, 1].map(() => Array.from({ length: symbols + 2 * reach }, () => (noise.uniform() < 0.5 ? -1 : 1)));
  let wrong = 0;
  for (let k = reach; k < symbols + reach; k += 1) {
    // The in-phase strobe k lies half-way between the quadrature ones k − 1 and k, the latter between k and k + 1.
    const q = taps.reduce((sum, tap, j) => sum + tap * b![k - (j - reach) - 1]!, 0);
    const p = taps.reduce((sum, tap, j) => sum + tap * a![k - (j - reach)]!, 0);
    const zI = Math.SQRT1_2 * (a![k]! * Math.cos(phase) - q * Math.sin(phase)) + noise.normal() / Math.sqrt(2 * gamma);
    const zQ = Math.SQRT1_2 * (b![k]! * Math.cos(phase) + p * Math.sin(phase)) + noise.normal() / Math.sqrt(2 * gamma);
    if (zI * a![k]! < 0 || zQ * b![k]! < 0) wrong += 1;
  }
  return wrong;
}
