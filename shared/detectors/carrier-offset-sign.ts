import erf from '@stdlib/math-base-special-erf';
import { normalDensity } from '../math/gaussian-tail';
import type { DetectorModel } from './detector';
import { shortened } from './short-curve';
import { interference, tapAt, tapPower } from './offset-interference';
import type { Interference } from './offset-interference';
import type { CarrierSignal } from './carrier-signal';

/** Lags over which the error is correlated, at most; what a slow pulse leaves beyond is put into the last. */
const mostLags = 64;

/**
 * sgn(Re z) Im z − sgn(Im z″) Re z″ on OQPSK, z″ half a symbol later: each rail is sliced at its own strobe and turned
 * by the other rail half-way between that one's symbols, a sum q of ±g(k + ½)/√2 of all of them. With s = 1/√2
 *
 *     S(φ) = 2A · E_q[(s sin φ + q cos φ) · erf(√γ (s cos φ − q sin φ))]
 *     Kd   = 2A · [s erf √(γ/2) − 2 √(γ/π) e^(−γ/2) E q²],   E q² = ½(1 − α/2)
 *
 * The rails' errors are correlated through the pulse: with μ the mean magnitude of a rail at its strobe,
 * c[l] = A² ([1 − α/2 + 1/γ]·δ_l − μ²[g²(l + ½) + g²(l − ½)]). Without noise they sum to nought: the pattern's error has
 * no power at frequency 0.
 */
export function signOqpsk({ amplitude, esN0, rollOff }: CarrierSignal): DetectorModel {
  const between = interference(rollOff);
  const largest = Math.hypot(Math.SQRT1_2, between.values.at(-1)! + 3 * Math.sqrt(between.rest));
  const deviation = Math.sqrt(1 / (2 * esN0));
  const density = normalDensity(Math.SQRT1_2 / deviation) / deviation;
  const power = tapPower(rollOff) / 2;
  const magnitude = Math.SQRT1_2 * erf(Math.sqrt(esN0 / 2)) + 2 * deviation ** 2 * density;
  return {
    gain: 2 * amplitude * (Math.SQRT1_2 * erf(Math.sqrt(esN0 / 2)) - 2 * density * power),
    gainWithoutNoise: Math.SQRT2 * amplitude,
    period: Math.PI,
    covariance: covarianceOf(amplitude ** 2, rollOff, magnitude ** 2, 1 / esN0),
    selfCovariance: covarianceOf(amplitude ** 2, rollOff, 0.5, 0),
    amplitudeExponent: 1,
    noisy: shortened((x) => amplitude * meanError(between, deviation, x), { period: Math.PI, esN0, largest }),
    noiseless: (x) => amplitude * meanError(between, 0, x),
  };
}

/**
 * S(x) at unit amplitude. Where q is an atom and a normal variable of variance ρ², that variable is one more noise of
 * ρ² sin² x on the sliced rail, and correlated with it.
 */
function meanError({ values, weights, rest }: Interference, deviation: number, x: number): number {
  const [cos, sin] = [Math.cos(x), Math.sin(x)];
  const spread = Math.sqrt(deviation ** 2 + rest * sin ** 2);
  let sum = 0;
  for (let k = 0; k < values.length; k += 1) {
    const sliced = Math.SQRT1_2 * cos - values[k]! * sin;
    const turned = Math.SQRT1_2 * sin + values[k]! * cos;
    const t = sliced / spread;
    sum += weights[k]! * turned * (spread > 0 ? erf(t * Math.SQRT1_2) : Math.sign(sliced));
    if (spread > 0) sum -= (weights[k]! * 2 * rest * sin * cos * normalDensity(t)) / spread;
  }
  return 2 * sum;
}

function covarianceOf(scale: number, rollOff: number, magnitude: number, noise: number): number[] {
  const shared = (lag: number): number => scale * magnitude * (tapAt(lag, rollOff) ** 2 + tapAt(lag - 1, rollOff) ** 2);
  const lags = Array.from({ length: mostLags }, (_, lag) => -shared(lag));
  const beyond =
    -2 * scale * magnitude * tapPower(rollOff) - lags.reduce((sum, value, lag) => sum + (lag ? 2 : 1) * value, 0);
  lags[0]! += scale * (tapPower(rollOff) + noise);
  lags[mostLags - 1]! += beyond / 2;
  return lags;
}
