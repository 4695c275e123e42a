import type { CompletePlan } from '../plan/complete';

export type Modulation = CompletePlan['signal']['modulation'];

/** Rotational symmetry M: the constellation looks the same after 1/M of a turn. */
export const rotationalSymmetry: Record<Modulation, number> = {
  BPSK: 2,
  OQPSK: 2,
  QPSK: 4,
  '16QAM': 4,
  '64QAM': 4,
  '16APSK': 4,
  '32APSK': 4,
  '8PSK': 8,
};
