import { describe, expect, it } from 'vitest';
import {
  falseLockSpacingHz,
  lockInOmega,
  pullInSeconds,
  unambiguousOffsetHz,
} from '../../../shared/budget/acquisition';
import { carrierDetector } from '../../../shared/detectors/carrier';
import { sCurveShape } from '../../../shared/detectors/detector';

const dynamics = { damping: Math.SQRT1_2, omegaN: 100 };
/** s = sin(Mφ)/M. */
const sine = (symmetry: number) => ({ largest: 1 / symmetry, meanSquare: 1 / (2 * symmetry ** 2) });

describe('ambiguity', () => {
  // Published: 18 kBd QPSK is unambiguous below Rs/(2M) = 2250 Hz, false locks lie at Rs/4.
  it('is half the spacing of the false locks', () => {
    expect(unambiguousOffsetHz({ symmetry: 4, symbolRateBd: 18e3, averaged: 1 })).toBe(2250);
    expect(falseLockSpacingHz(4, 18e3)).toBe(4500);
  });

  it('is no more than the first zero of an average', () => {
    expect(unambiguousOffsetHz({ symmetry: 4, symbolRateBd: 18e3, averaged: 2 })).toBe(2250);
    expect(unambiguousOffsetHz({ symmetry: 4, symbolRateBd: 18e3, averaged: 8 })).toBe(562.5);
  });
});

describe('lock-in and pull-in', () => {
  // F. Gardner 2005: 2ζωn for sin φ, 2ζωn/M for sin(Mφ)/M.
  it('locks in over 2ζωn/M', () => {
    expect(lockInOmega(dynamics, sine(1))).toBeCloseTo(141.42, 2);
    expect(lockInOmega(dynamics, sine(4))).toBeCloseTo(141.42 / 4, 2);
  });

  // Published: Δω²/(2ζωn³) for sin φ; for sin(4φ)/4 16 times that, for noiseless sign QPSK 2.75 times.
  it('pulls in as the books say for a sine, and slower for steeper shapes', () => {
    const book = 2000 ** 2 / (2 * dynamics.damping * 100 ** 3);
    expect(pullInSeconds(dynamics, sine(1), 2000)).toBeCloseTo(book, 12);
    expect(pullInSeconds(dynamics, sine(4), 2000) / book).toBeCloseTo(16, 10);
    const sign = sCurveShape(carrierDetector('sign', 'QPSK', { amplitude: 1, esN0: 1e6 }));
    expect(pullInSeconds(dynamics, sign, 2000) / book).toBeCloseTo(2.75, 2);
  });

  // Outside simulation: sign QPSK at 10 dB, BnT 0.01, ΔfT 0.01 took 3580 symbols. An estimate is good to a factor of
  // two; here it happens to be good to a few per cent.
  it('comes near a simulation', () => {
    const shape = sCurveShape(carrierDetector('sign', 'QPSK', { amplitude: 1, esN0: 10 }));
    const omegaN = (2 * 0.01) / (1.5 * Math.SQRT1_2);
    const symbols = pullInSeconds({ damping: Math.SQRT1_2, omegaN }, shape, 2 * Math.PI * 0.01);
    expect(Math.abs(symbols / 3580 - 1)).toBeLessThan(0.1);
  });

  it('takes no time within the lock-in range', () => {
    expect(pullInSeconds(dynamics, sine(1), 141)).toBe(0);
  });
});
