import type { DetectorModel } from './detector';
import { distinctPoints, rotationalSymmetry } from './modulations';
import { noisyMoment } from './noisy-moments';
import type { CarrierSignal } from './carrier-signal';

/**
 * σ·Im(z^M), σ the sign of E a^M, as the datapath works it out: not divided by M, so Kd = M·A^M·|E a^M| and var e is M²
 * times that of Im(z^M)/M. S(φ) = A^M |E a^M| sin Mφ whatever the noise, for no power of circular noise has a mean.
 *
 *     var e = ½ (E|z|^2M − |E z^2M|) = ½ A^2M (Σ_k C(M,k)² k! γ^(−k) E|a|^2(M−k) − E a^2M)
 *
 * QAM keeps E (Im a^M)² of it without any noise: its symbols' M-th powers do not fall together.
 */
export function powerLaw({ modulation, amplitude, esN0, ringRatios }: CarrierSignal): DetectorModel {
  const power = rotationalSymmetry[modulation];
  const points = distinctPoints(modulation, ringRatios);
  const level = amplitude ** power * Math.abs(noisyMoment(points, Infinity, power, 0));
  const square = noisyMoment(points, Infinity, 2 * power, 0);
  const variance = (noise: number): number =>
    (amplitude ** (2 * power) * (noisyMoment(points, noise, power, power) - square)) / 2;
  const pattern = variance(Infinity);
  const curve = (x: number): number => level * Math.sin(power * x);
  return {
    gain: power * level,
    gainWithoutNoise: power * level,
    period: (2 * Math.PI) / power,
    covariance: [variance(esN0)],
    selfCovariance: pattern > 1e-9 * level ** 2 ? [pattern] : [],
    amplitudeExponent: power,
    noisy: curve,
    noiseless: curve,
  };
}
