import { sineSeries } from '../math/sine-series';

export interface SmearedCurve {
  /** Period of the S-curve, radians. */
  period: number;
  /** Es/N0 γ as a ratio. */
  esN0: number;
  /** Largest magnitude of a sample without noise where E|a|² = 1. */
  largest: number;
}

/** Harmonics beyond which a series takes longer than the curve itself, a few hundred points of which are asked for. */
const mostHarmonics = 256;

/**
 * An S-curve with noise as the sine series that it nearly is, where that is short. Noise smears the phase of a sample of
 * magnitude r by 1/(r√(2γ)) rad, so harmonic n is down by exp(−k²/(4γr²)), k = 2πn/period: to 1e-8 at k = 8.6·r√γ.
 */
export function shortened(curve: (x: number) => number, { period, esN0, largest }: SmearedCurve) {
  const count = 4 + Math.ceil((8.6 * largest * Math.sqrt(esN0) * period) / (2 * Math.PI));
  return count > mostHarmonics ? curve : sineSeries(curve, period, count + 1);
}
