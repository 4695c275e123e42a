import type { CarrierWords } from '../model/words';

type PhaseWords = Pick<CarrierWords, 'tableBits'> & { nco: Pick<CarrierWords['nco'], 'widthBits' | 'phaseBits'> };

/**
 * Variance of cutting the W bits of the phase to P, rad²: (2π/2^P)²/12, less the 4^−(W − P) of it that the finite steps
 * of the phase do not reach.
 */
export function truncationVariance({ nco: { widthBits, phaseBits } }: PhaseWords): number {
  return (((2 * Math.PI) / 2 ** phaseBits) ** 2 / 12) * (1 - 4 ** (phaseBits - widthBits));
}

/**
 * Variance of the angle of a rotator whose cosine and sine are rounded to an LSB of 2^−(Wt − 2), rad²: of two independent
 * errors of LSB²/12 the part across the phasor counts. Derived; the tables of few phase bits scatter about it.
 */
export const tableVariance = ({ tableBits }: PhaseWords): number => 4 ** -(tableBits - 2) / 12;

/**
 * Worst spur of the phase truncation, dBc, with all W − P discarded bits in use: the image that the first 2^P lines of the
 * cut phase leave,
 *
 *     20·log10( sin(π/2^W) / sin(π(2^P − 1)/2^W) )
 *
 * which is −6.02·P + 3.92 for one bit and −6.02·P from four bits on; null where no bit is discarded.
 *
 * @see H. Nicholas, H. Samueli, "An analysis of the output spectrum of direct digital frequency synthesizers in the
 *   presence of phase-accumulator truncation", 1987
 */
export function worstSpurDbc({ nco: { widthBits, phaseBits } }: PhaseWords): number | null {
  if (widthBits === phaseBits) return null;
  const step = Math.PI / 2 ** widthBits;
  return 20 * Math.log10(Math.sin(step) / Math.sin((2 ** phaseBits - 1) * step));
}
