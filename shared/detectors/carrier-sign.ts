import erf from '@stdlib/math-base-special-erf';
import type { DetectorModel } from './detector';
import type { CarrierSignal } from './carrier-signal';

/** sgn(Re z) · Im z on BPSK: S(φ) = A sin φ · erf(√γ cos φ), Kd = A erf √γ, var e the noise of one rail. */
export function signBpsk({ amplitude, esN0 }: CarrierSignal): DetectorModel {
  const root = Math.sqrt(esN0);
  return {
    gain: amplitude * erf(root),
    gainWithoutNoise: amplitude,
    period: Math.PI,
    covariance: [amplitude ** 2 / (2 * esN0)],
    selfCovariance: [],
    amplitudeExponent: 1,
    noisy: (x) => amplitude * Math.sin(x) * erf(root * Math.cos(x)),
    noiseless: (x) => amplitude * Math.sin(x) * Math.sign(Math.cos(x)),
  };
}

/**
 * sgn(Re z) Im z − sgn(Im z) Re z on QPSK, points (±1 ± j)/√2. With ψ = φ + π/4
 *
 *     S(φ) = A [sin ψ erf(√γ cos ψ) − cos ψ erf(√γ sin ψ)],   Kd = A [√2 erf √(γ/2) − 2 √(γ/π) e^(−γ/2)]
 *
 * At lock e² averages to both rails' mean squares less twice the square of a rail's mean magnitude. For decided
 * points of unit modulus, Im(z · conj â), every value here is √2 smaller.
 *
 * @see U. Mengali, A. D'Andrea, "Synchronization Techniques for Digital Receivers", 1997, for the method
 */
export function signQpsk({ amplitude, esN0 }: CarrierSignal): DetectorModel {
  const root = Math.sqrt(esN0);
  const tail = Math.exp(-esN0 / 2);
  const spread = Math.SQRT1_2 * erf(Math.sqrt(esN0 / 2));
  const magnitude = spread + tail / Math.sqrt(Math.PI * esN0);
  const curve = (x: number, decided: (rail: number) => number): number => {
    const psi = x + Math.PI / 4;
    return amplitude * (Math.sin(psi) * decided(Math.cos(psi)) - Math.cos(psi) * decided(Math.sin(psi)));
  };
  return {
    gain: amplitude * (2 * spread - 2 * Math.sqrt(esN0 / Math.PI) * tail),
    gainWithoutNoise: Math.SQRT2 * amplitude,
    period: Math.PI / 2,
    covariance: [amplitude ** 2 * (1 + 1 / esN0 - 2 * magnitude ** 2)],
    selfCovariance: [],
    amplitudeExponent: 1,
    noisy: (x) => curve(x, (rail) => erf(root * rail)),
    noiseless: (x) => curve(x, Math.sign),
  };
}
