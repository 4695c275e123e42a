import { ParameterError } from '../parameter-error';
import type { CompleteClock } from '../plan/complete';
import type { DetectorModel } from './detector';
import type { Modulation } from './modulations';

export interface ClockSignal {
  modulation: Modulation;
  amplitude: number;
  /** Roll-off α of the raised-cosine pulse, 0 to 1. */
  rollOff: number;
  samplesPerSymbol: number;
}

/**
 * The timing detector of a clock loop; x is how early the strobe comes, symbols.
 *
 * @throws {ParameterError} pointing at what is not worked out, or at a signal on which the detector has no slope
 */
export function clockDetector(detector: CompleteClock['detector'], signal: ClockSignal): DetectorModel {
  if (detector !== 'gardner') {
    throw new ParameterError('/clock/detector', `${detector} is not worked out yet; take gardner`);
  }
  if (signal.modulation === 'OQPSK') {
    throw new ParameterError('/signal/modulation', 'clock recovery of OQPSK is not worked out yet; take QPSK');
  }
  if (signal.samplesPerSymbol < 2) {
    throw new ParameterError('/signal/samplesPerSymbol', 'gardner needs at least 2 samples per symbol');
  }
  if (signal.rollOff === 0) {
    throw new ParameterError('/signal/rollOff', 'gardner has no slope at roll-off 0; take a roll-off above 0');
  }
  return gardner(signal);
}

/** Slope of the Gardner detector at lock over A², both rails added, per symbol: 2 sin(πα/2)/(1 − α²/4). */
export const gardnerSlope = (rollOff: number): number =>
  (2 * Math.sin((Math.PI * rollOff) / 2)) / (1 - rollOff ** 2 / 4);

/**
 * Re m*(y′ − y), m half-way between the strobes: a sine of one symbol's period, whatever the noise. Its error is
 * coloured, so no variance is given here that a flat spectrum could be made of.
 *
 * @see F. Gardner, "A BPSK/QPSK timing-error detector for sampled receivers", 1986
 */
function gardner({ amplitude, rollOff }: ClockSignal): DetectorModel {
  const gain = amplitude ** 2 * gardnerSlope(rollOff);
  const curve = (x: number): number => (gain / (2 * Math.PI)) * Math.sin(2 * Math.PI * x);
  return {
    gain,
    gainWithoutNoise: gain,
    period: 1,
    covariance: null,
    selfCovariance: [],
    amplitudeExponent: 2,
    noisy: curve,
    noiseless: curve,
  };
}
