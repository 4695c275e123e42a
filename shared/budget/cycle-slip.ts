import type { CycleSlip } from '../model/design';
import { logBesselI0 } from '../math/log-bessel';

export interface SlipInput {
  /** Variance of the phase over the square of the S-curve's period in 2π: 1/ρ. */
  variance: number;
  /** Noise bandwidth BL of the loop, Hz. */
  noiseBandwidthHz: number;
  symbolRateBd: number;
}

const mostDecades = 300;

/**
 * Mean time to a cycle slip of a loop of order 1 on a sinusoid, ρ its signal-to-noise ratio:
 *
 *     T = π²ρ·I0²(ρ) / (2·BL)
 *
 * worked out in logarithms, so that no ρ overflows.
 *
 * @returns seconds and symbols, null beyond 1e300 seconds or symbols
 * @see A. Viterbi, "Principles of Coherent Communication", 1966
 */
export function cycleSlip({ variance, noiseBandwidthHz, symbolRateBd }: SlipInput): CycleSlip {
  const rho = 1 / variance;
  const decades = (Math.log((Math.PI ** 2 * rho) / (2 * noiseBandwidthHz)) + 2 * logBesselI0(rho)) / Math.LN10;
  const time = (shift: number): number | null => (decades + shift > mostDecades ? null : 10 ** (decades + shift));
  return {
    rho,
    seconds: time(0),
    symbols: time(Math.log10(symbolRateBd)),
    method: 'A. Viterbi 1966, order 1 on a sinusoid: an estimate; order 2 slips up to four times sooner',
  };
}
