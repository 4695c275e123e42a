import erf from '@stdlib/math-base-special-erf';
import { ParameterError } from '../parameter-error';
import type { CompleteCarrier } from '../plan/complete';
import type { DetectorModel } from './detector';
import type { Modulation } from './modulations';

export interface CarrierSignal {
  /** Amplitude A of the symbols at the detector, above 0. */
  amplitude: number;
  /** Es/N0 γ as a ratio, above 0; noise of variance A²/(2γ) on each rail. */
  esN0: number;
}

type MakeModel = (signal: CarrierSignal) => DetectorModel;

/** What is worked out, by modulation and detector. The first entry of a modulation is the one to recommend. */
const models: Partial<Record<Modulation, Partial<Record<CompleteCarrier['detector'], MakeModel>>>> = {
  BPSK: { sign: signBpsk, costas: costasBpsk },
  QPSK: { sign: signQpsk },
};

/**
 * The phase error detector of a carrier loop.
 *
 * @throws {ParameterError} pointing at the detector or the modulation when the pair is not worked out
 */
export function carrierDetector(detector: CompleteCarrier['detector'], modulation: Modulation, signal: CarrierSignal) {
  const known = models[modulation];
  if (!known) {
    const others = Object.keys(models).join(' or ');
    throw new ParameterError('/signal/modulation', `${modulation} is not worked out yet; take ${others}`);
  }
  const make = known[detector];
  if (make) return make(signal);
  const reason =
    detector === 'costas' ? 'costas is for BPSK only' : `${detector} is not worked out yet for ${modulation}`;
  throw new ParameterError('/carrier/detector', `${reason}; take ${Object.keys(known).join(' or ')}`);
}

/**
 * Re z · Im z on BPSK: S(φ) = ½A² sin 2φ whatever the noise, Kd = A². The rails' noises are independent, so
 * var e = (A² + σ²)·σ² at lock.
 */
function costasBpsk({ amplitude, esN0 }: CarrierSignal): DetectorModel {
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

/** sgn(Re z) · Im z on BPSK: S(φ) = A sin φ · erf(√γ cos φ), Kd = A erf √γ, var e the noise of one rail. */
function signBpsk({ amplitude, esN0 }: CarrierSignal): DetectorModel {
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
function signQpsk({ amplitude, esN0 }: CarrierSignal): DetectorModel {
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
