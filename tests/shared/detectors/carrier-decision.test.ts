import { describe, expect, it } from 'vitest';
import { carrierDetector } from '../../../shared/detectors/carrier';
import type { Modulation } from '../../../shared/detectors/modulations';

const gainOf = (modulation: Modulation, decibels: number): number =>
  carrierDetector('decision', { modulation, amplitude: 1, esN0: 10 ** (decibels / 10), rollOff: 0.35 }).gain;

describe('decision detector', () => {
  // Derived: quadrature, 1e-3.
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
    expect(Math.abs(gainOf(modulation, decibels) - slope)).toBeLessThan(1e-4);
  });
});
