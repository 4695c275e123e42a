import type { DetectorModel } from './detector';
import type { CarrierSignal } from './carrier-signal';

/**
 * Im(z · conj a) with the symbols known: S(φ) = A sin φ over the whole turn, for nothing is ambiguous; Kd = A and
 * var e = E|a|² of the noise of one rail, A²/(2γ), so that the loop reaches the bound BnT/γ.
 */
export function knownSymbols({ amplitude, esN0 }: CarrierSignal): DetectorModel {
  const curve = (x: number): number => amplitude * Math.sin(x);
  return {
    gain: amplitude,
    gainWithoutNoise: amplitude,
    period: 2 * Math.PI,
    covariance: [amplitude ** 2 / (2 * esN0)],
    selfCovariance: [],
    amplitudeExponent: 1,
    noisy: curve,
    noiseless: curve,
  };
}
