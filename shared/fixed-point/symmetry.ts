import type { CarrierWords, LockWords } from '../model/words';

export type Modulation = NonNullable<CarrierWords['modulation']>;

/** Rotational symmetry M of a modulation and the sign of E a^M (OQPSK: of the in-phase strobe's square). */
export function symmetry(modulation: Modulation): Pick<LockWords, 'power' | 'sign'> {
  if (modulation === 'bpsk' || modulation === 'oqpsk') return { power: 2, sign: 1 };
  if (modulation === '8psk') return { power: 8, sign: 1 };
  return { power: 4, sign: -1 };
}
