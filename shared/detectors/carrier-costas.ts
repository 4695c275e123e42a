import type { DetectorModel } from './detector';
import type { CarrierSignal } from './carrier-signal';

/**
 * Re z · Im z on BPSK: S(φ) = ½A² sin 2φ whatever the noise, Kd = A². The rails' noises are independent, so
 * var e = (A² + σ²)·σ² at lock.
 */
export function costasBpsk({ amplitude, esN0 }: CarrierSignal): DetectorModel {
  const gain = amplitude ** 2;
  const curve = (x: number): number => (gain / 2) * Math.sin(2 * x);
  const variance = (gain ** 2 * (1 + 1 / (2 * esN0))) / (2 * esN0);
  return {
    gain,
    gainWithoutNoise: gain,
    period: Math.PI,
    covariance: [variance],
    selfCovariance: [],
    amplitudeExponent: 2,
    noisy: curve,
    noiseless: curve,
  };
}
