import type { Words } from '../model/words';

/** Error words, inclusive, that leave the integrator where it is. */
export interface DeadBand {
  least: number;
  most: number;
  /** Mean pull of the rounding, integrator LSB per update: −½ for floor, else 0. */
  pull: number;
}

/**
 * The integral path's dead band, one entry a stage: with nearest and convergent rounding −2^(s−1) ≤ d·M < 2^(s−1)
 * (convergent: the upper half too), with floor 0 ≤ d·M < 2^s.
 *
 * @example 'nearest', M = 1, s = 3 // => { least: -4, most: 3, pull: 0 }
 */
export function integralDeadBands({ stages, rounding, errorBits }: Words): DeadBand[] {
  const largest = 2 ** (errorBits - 1);
  return stages.map(({ integral: { mantissa, shift } }) => {
    const pull = rounding === 'floor' && shift > 0 ? -0.5 : 0;
    if (mantissa === 0) return { least: -largest, most: largest - 1, pull: 0 };
    if (shift <= 0) return { least: 0, most: 0, pull };
    const half = 2 ** (shift - 1);
    const [low, high] = rounding === 'floor' ? [0, 2 * half - 1] : [-half, rounding === 'nearest' ? half - 1 : half];
    const ends = [low / mantissa, high / mantissa].sort((a, b) => a - b);
    return {
      least: Math.max(-largest, Math.ceil(ends[0]!) + 0),
      most: Math.min(largest - 1, Math.floor(ends[1]!) + 0),
      pull,
    };
  });
}
