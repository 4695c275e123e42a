import { describe, expect, it } from 'vitest';
import { carrierDetector } from '../../../shared/detectors/carrier';
import { varianceOf } from '../../../shared/detectors/detector';
import type { Modulation } from '../../../shared/detectors/modulations';
import { overNoise } from './quadrature';

const decision = (modulation: Modulation, decibels: number, amplitude = 1, ringRatios?: readonly number[]) =>
  carrierDetector('decision', { modulation, amplitude, esN0: 10 ** (decibels / 10), rollOff: 0.35, ringRatios });

describe('decision detector', () => {
  // Derived: quadrature, good to the last digit given.
  it.each([
    ['8PSK', 10, 0.4355],
    ['8PSK', 15, 0.9589],
    ['16QAM', 10, 0.33],
    ['16QAM', 12, 0.5407],
    ['16QAM', 15, 0.869],
    ['64QAM', 15, 0.173],
    ['64QAM', 20, 0.7158],
    ['64QAM', 25, 0.9971],
  ] as const)('has its slope on %s at %i dB', (modulation, decibels, slope) => {
    expect(Math.abs(decision(modulation, decibels).gain - slope)).toBeLessThan(1e-4);
  });

  // Derived: simulation, ±1 %; ring ratios 2.85 and 2.84, 5.27 of ETSI EN 302 307-1, rate 3/4 (memory).
  it.each([
    ['16APSK', 15, 0.773],
    ['16APSK', 20, 0.999],
    ['32APSK', 15, 0.498],
    ['32APSK', 20, 0.961],
  ] as const)('has its slope on %s at %i dB', (modulation, decibels, slope) => {
    expect(Math.abs(decision(modulation, decibels).gain / slope - 1)).toBeLessThan(0.01);
  });

  // Derived: numpy, 24 million noisy symbols, standard deviation 4e-5.
  it('has its mean on 16APSK at 10 dB, 0.2 rad', () => {
    expect(Math.abs(decision('16APSK', 10).noisy(0.2) - 0.009483)).toBeLessThan(1.5e-4);
  });

  // Derived: numpy, Simpson's rule over a grid of 3001 × 3001 noises of ±7 deviations, good to 2e-5.
  it.each([
    ['8PSK', 5, 0.06342],
    ['8PSK', 10, 0.039607],
    ['16APSK', 5, 0.037514],
    ['16APSK', 10, 0.028468],
  ] as const)('has its variance on %s at %i dB', (modulation, decibels, variance) => {
    expect(Math.abs(varianceOf(decision(modulation, decibels))! - variance)).toBeLessThan(3e-5);
  });

  // By hand: with right decisions the error is the noise of one rail, A²/(2γ).
  it.each(['8PSK', '16QAM', '64QAM', '16APSK', '32APSK'] as const)(
    'leaves the noise of one rail on %s',
    (modulation) => {
      expect(varianceOf(decision(modulation, 40, 3))! / (9 / 2e4)).toBeCloseTo(1, 6);
      expect(decision(modulation, 40, 3).gain).toBeCloseTo(3, 8);
    },
  );

  it('is the sign detector on BPSK, and on QPSK the same over the square root of 2', () => {
    const of = (modulation: Modulation) =>
      carrierDetector('sign', { modulation, amplitude: 1, esN0: 4, rollOff: 0.35 });
    expect(decision('BPSK', 10 * Math.log10(4)).noisy(0.4)).toBeCloseTo(of('BPSK').noisy(0.4), 12);
    expect(decision('QPSK', 10 * Math.log10(4)).noisy(0.4)).toBeCloseTo(of('QPSK').noisy(0.4) * Math.SQRT1_2, 12);
  });

  // By hand: with the inner ring of no size, E|a|² = 1 puts the outer ring at √(4/3) and its sectors at ±15°; at high
  // Es/N0 its twelve points are mistaken at 15°, where the curve turns.
  it('follows the ring ratios', () => {
    const { noiseless } = decision('16APSK', 30, 1, [20]);
    expect(noiseless((14.9 * Math.PI) / 180)).toBeCloseTo(Math.sin((14.9 * Math.PI) / 180), 2);
    expect(noiseless((15.1 * Math.PI) / 180)).toBeLessThan(-0.2);
    expect(decision('16APSK', 15, 1, [2.85]).gain).toBe(decision('16APSK', 15).gain);
  });

  // Independent: slopes of a signal half a decibel up and down, thresholds left where they are, integrated over noise.
  it.each([
    ['16QAM', 4, 12],
    ['64QAM', 8, 18],
  ] as const)('says how the slope on %s goes with a wrong amplitude', (modulation, side, decibels) => {
    const [up, down] = [0.5, -0.5].map((level) => scaledSlope(side, 10 ** (decibels / 10), 10 ** (level / 20)));
    const exponent = Math.log(up! / down!) / Math.log(10 ** (1 / 20));
    expect(Math.abs(decision(modulation, decibels).amplitudeExponent / exponent - 1)).toBeLessThan(0.05);
  });

  it.each(['8PSK', '16QAM', '32APSK'] as const)(
    'goes with the amplitude on %s where decisions are right',
    (modulation) => {
      expect(decision(modulation, 40).amplitudeExponent).toBeCloseTo(1, 6);
    },
  );

  it('does not mind the amplitude on 8PSK, whose thresholds are angles', () => {
    expect(decision('8PSK', 5).amplitudeExponent).toBeCloseTo(1, 8);
  });
});

/** Slope of a square constellation that comes in `scale` times as large as its thresholds expect. */
function scaledSlope(side: number, gamma: number, scale: number): number {
  const half = Math.sqrt(1.5 / (side ** 2 - 1));
  const levels = Array.from({ length: side }, (_, k) => (2 * k - side + 1) * half);
  const sliced = (x: number) => levels[Math.min(side - 1, Math.max(0, Math.round((x / half + side - 1) / 2)))]!;
  const mean = (x: number) => overNoise(scale / Math.sqrt(2 * gamma), (n) => sliced(scale * x + n));
  const at = (phase: number): number => {
    const quadrant = levels.filter((level) => level > 0);
    const values = quadrant.flatMap((i) =>
      quadrant.map((q) => {
        const [mI, mQ] = [i * Math.cos(phase) - q * Math.sin(phase), i * Math.sin(phase) + q * Math.cos(phase)];
        return scale * (mQ * mean(mI) - mI * mean(mQ));
      }),
    );
    return values.reduce((sum, value) => sum + value, 0) / values.length;
  };
  return at(0.005) / 0.005;
}
