import type { CarrierWords } from '../model/words';

export type Rounding = CarrierWords['rounding'];

/**
 * Shifts an exact integer right by `shift` and rounds once; a shift of 0 or less is an exact left shift.
 *
 *     floor ⌊x/2^s⌋ · nearest ⌊(x + 2^(s−1))/2^s⌋ (a half goes up) · convergent: nearest, a half to the even neighbour
 *
 * @param value exact value, any size
 * @param shift right shift, −63 to 63
 * @param rounding mode of the whole datapath
 * @example roundShift(-5n, 1, 'nearest') // => -2n
 */
export function roundShift(value: bigint, shift: number, rounding: Rounding): bigint {
  if (shift <= 0) return value << BigInt(-shift);
  const bits = BigInt(shift);
  if (rounding === 'floor') return value >> bits;
  const raised = value + (1n << (bits - 1n));
  const rounded = raised >> bits;
  const wasHalf = raised === rounded << bits;
  return rounding === 'convergent' && wasHalf ? rounded & ~1n : rounded;
}
