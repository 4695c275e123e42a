import { describe, expect, it } from 'vitest';
import { carrierDetector, carrierDetectorsFor } from '../../../shared/detectors/carrier';
import { sCurve, sCurveShape, varianceOf } from '../../../shared/detectors/detector';
import { rotationalSymmetry } from '../../../shared/detectors/modulations';
import type { Modulation } from '../../../shared/detectors/modulations';
import { overNoise } from './quadrature';

const ratio = (decibels: number): number => 10 ** (decibels / 10);
const signalOf = (modulation: Modulation, decibels: number, amplitude = 1) =>
  ({ modulation, amplitude, esN0: ratio(decibels), rollOff: 0.35 }) as const;
const qpsk = (decibels: number, amplitude = 1) => carrierDetector('sign', signalOf('QPSK', decibels, amplitude));
const bpsk = (detector: 'sign' | 'costas', decibels: number, amplitude = 1) =>
  carrierDetector(detector, signalOf('BPSK', decibels, amplitude));

describe('sign detector on QPSK', () => {
  // Derived after U. Mengali, A. D'Andrea 1997; unit amplitude.
  it.each([
    [0, 0.2811],
    [3, 0.6033],
    [6, 1.0415],
    [10, 1.388],
    [15, 1.4142],
  ])('has its slope at %i dB', (decibels, slope) => {
    expect(qpsk(decibels).gain).toBeCloseTo(slope, 4);
  });

  // Independent: E sgn(zI)·zQ − sgn(zQ)·zI and its square, integrated over the noise of both rails.
  it.each([3, 10])('matches the detector integrated over noise at %i dB', (decibels) => {
    const deviation = Math.sqrt(1 / (2 * ratio(decibels)));
    const sign = (mean: number): number => 1 - 2 * overNoise(deviation, (n) => Number(mean + n < 0));
    const magnitude = overNoise(deviation, (n) => Math.abs(Math.SQRT1_2 + n));
    for (const x of [-0.6, -0.2, 0.1, 0.5]) {
      const [re, im] = [Math.cos(x + Math.PI / 4), Math.sin(x + Math.PI / 4)];
      expect(Math.abs(qpsk(decibels).noisy(x) - (sign(re) * im - sign(im) * re))).toBeLessThan(2e-3);
    }
    const variance = 2 * (1 / 2 + deviation ** 2) - 2 * magnitude ** 2;
    expect(varianceOf(qpsk(decibels))).toBeCloseTo(variance, 6);
  });

  // Derived: var e/Kd² over 1/(2γ).
  it.each([
    [20, 1],
    [15, 1],
    [12, 1.0023],
    [10, 1.0354],
    [3, 4.36],
  ])('needs %i dB its own share of noise', (decibels, excess) => {
    const { gain } = qpsk(decibels);
    const variance = varianceOf(qpsk(decibels));
    expect(Math.abs(((variance as number) / gain ** 2) * 2 * ratio(decibels) - excess)).toBeLessThan(0.005 * excess);
  });

  it('goes with the amplitude, its variance with the square', () => {
    expect(qpsk(10, 3).gain).toBeCloseTo(3 * qpsk(10).gain, 14);
    expect(varianceOf(qpsk(10, 3))).toBeCloseTo(9 * (varianceOf(qpsk(10)) as number), 14);
  });

  it('repeats every quarter turn', () => {
    const { noisy, period } = qpsk(6);
    expect(period).toBe(Math.PI / 2);
    for (const x of [-0.3, 0.2]) expect(noisy(x + period)).toBeCloseTo(noisy(x), 14);
  });

  // Derived: the noiseless sign detector has ⟨s²⟩ = 0.1817.
  it('has the mean square of its noiseless shape', () => {
    expect(sCurveShape(qpsk(60)).meanSquare).toBeCloseTo(0.1817, 4);
  });
});

describe('detectors on BPSK', () => {
  // Derived: erf √γ.
  it.each([
    [0, 0.8427],
    [3, 0.9542],
    [6, 0.9952],
  ])('sign has the slope erf √γ at %i dB', (decibels, slope) => {
    expect(bpsk('sign', decibels).gain).toBeCloseTo(slope, 3);
  });

  it('sign leaves the noise of one rail', () => {
    expect(varianceOf(bpsk('sign', 10, 2))).toBeCloseTo(4 / 20, 14);
  });

  // Published: squaring loss 1 + 1/(2γ).
  it.each([
    [0, 1.5],
    [3, 1.251],
    [6, 1.126],
    [10, 1.05],
  ])('costas has the squaring loss at %i dB', (decibels, loss) => {
    const { gain } = bpsk('costas', decibels, 1.7);
    const variance = varianceOf(bpsk('costas', decibels, 1.7));
    expect(((variance as number) / gain ** 2) * 2 * ratio(decibels)).toBeCloseTo(loss, 3);
  });

  // Independent: the slope of each curve by differences is the slope that is named.
  it.each(['sign', 'costas'] as const)('%s names the slope of its own curve', (detector) => {
    const { noisy, noiseless, gain, gainWithoutNoise } = bpsk(detector, 3, 1.3);
    expect((noisy(1e-5) - noisy(-1e-5)) / 2e-5).toBeCloseTo(gain, 8);
    expect((noiseless(1e-5) - noiseless(-1e-5)) / 2e-5).toBeCloseTo(gainWithoutNoise, 8);
  });
});

describe('carrierDetector', () => {
  const modulations = Object.keys(rotationalSymmetry) as Modulation[];
  const pairs = modulations.flatMap((modulation) =>
    carrierDetectorsFor(modulation).map((detector) => [detector, modulation] as const),
  );

  it.each([
    ['costas', 'QPSK', 'costas is for BPSK only; take sign or decision or power-law or known-symbols'],
    ['costas', '16QAM', 'costas is for BPSK only; take decision or power-law or known-symbols'],
    [
      'sign',
      '8PSK',
      'sign tells the rails apart by sign alone, too little for 8PSK; take decision or power-law or known-symbols',
    ],
    [
      'decision',
      'OQPSK',
      'decision needs both rails at one strobe, and those of OQPSK lie half a symbol apart; take sign',
    ],
    [
      'power-law',
      '16APSK',
      'the fourth powers of 16APSK cancel but for its innermost ring; take decision or known-symbols',
    ],
  ] as const)('refuses %s on %s and says what to take', (detector, modulation, message) => {
    const make = (): unknown => carrierDetector(detector, signalOf(modulation, 10));
    expect(make).toThrow(expect.objectContaining({ parameter: '/carrier/detector', message }));
  });

  it('keeps what it has worked out for the same signal, whatever else a plan says', () => {
    const model = carrierDetector('decision', signalOf('16APSK', 14));
    expect(carrierDetector('decision', { ...signalOf('16APSK', 14), rollOff: 0.2 })).toBe(model);
    expect(carrierDetector('decision', signalOf('16APSK', 14.1))).not.toBe(model);
    expect(carrierDetector('decision', { ...signalOf('16APSK', 14), ringRatios: [2.6] })).not.toBe(model);
    const offset = carrierDetector('sign', signalOf('OQPSK', 14));
    expect(carrierDetector('sign', { ...signalOf('OQPSK', 14), rollOff: 0.2 })).not.toBe(offset);
  });

  it('refuses decisions that leave no slope', () => {
    const make = (): unknown => carrierDetector('decision', signalOf('32APSK', -5));
    expect(make).toThrow(expect.objectContaining({ parameter: '/signal/esN0Db' }));
  });

  // Independent: the period is the symmetry's, except where symbols are known; odd; slope by differences.
  it.each(pairs)('%s on %s has an odd curve of its period and the slope that it names', (detector, modulation) => {
    const { noisy, noiseless, period, gain, gainWithoutNoise } = carrierDetector(
      detector,
      signalOf(modulation, 9, 1.3),
    );
    expect(period).toBeCloseTo((2 * Math.PI) / (detector === 'known-symbols' ? 1 : rotationalSymmetry[modulation]), 14);
    for (const x of [0.03, 0.17, 0.31]) {
      expect(noisy(-x)).toBeCloseTo(-noisy(x), 10);
      expect(noisy(x + period)).toBeCloseTo(noisy(x), 10);
      expect(noiseless(x + period)).toBeCloseTo(noiseless(x), 10);
    }
    expect(Math.abs((noisy(1e-4) - noisy(-1e-4)) / 2e-4 / gain - 1)).toBeLessThan(1e-5);
    expect((noiseless(1e-4) - noiseless(-1e-4)) / 2e-4 / gainWithoutNoise).toBeCloseTo(1, 5);
  });

  it.each(pairs)('%s on %s loses its noise with growing Es/N0', (detector, modulation) => {
    const { noisy, noiseless, gain, gainWithoutNoise, period } = carrierDetector(detector, signalOf(modulation, 100));
    expect(gain).toBeCloseTo(gainWithoutNoise, 6);
    for (const share of [0.11, 0.23, 0.41]) expect(noisy(share * period)).toBeCloseTo(noiseless(share * period), 4);
  });
});

describe('sCurve', () => {
  it('spans one period, lock in the middle', () => {
    const { x, noisy } = sCurve(qpsk(10), 2);
    expect(x[0]).toBeCloseTo(-Math.PI / 4, 14);
    expect(x.at(-1)).toBeCloseTo(Math.PI / 4, 14);
    expect(noisy[60]).toBeCloseTo(0, 14);
    expect(noisy[70]).toBeCloseTo(2 * qpsk(10).noisy(x[70]!), 14);
  });
});
