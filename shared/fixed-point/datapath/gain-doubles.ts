import type { SignedGainWord, StageGainWords } from '../../model/words';
import type { Rounding } from '../rounding';
import { evenUnit, roundingHalf } from './double-arithmetic';

/** A gain word as doubles use it: mantissa, 2^−s, the half that rounding adds, 2^s where halves go to even. */
export type GainDoubles = [mantissa: number, scale: number, half: number, even: number];

export function gainInDoubles({ proportional, integral, integral2 }: StageGainWords, rounding: Rounding) {
  const prepared = ({ mantissa, shift }: SignedGainWord): GainDoubles => [
    mantissa,
    2 ** -shift,
    roundingHalf(shift, rounding),
    evenUnit(shift, rounding),
  ];
  return { proportional: prepared(proportional), integral: prepared(integral), integral2: prepared(integral2) };
}
