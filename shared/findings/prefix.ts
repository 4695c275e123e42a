import { commonUnit, moveDecimals } from '../quantities/format';

/** Two frequencies in the prefix of the larger one: 70 000 and 77 500 Hz are 70 and 77.5 kHz. */
export function inOneUnit(value: number, limit: number): { value: number; limit: number; unit: string } {
  const { unit, exponent } = commonUnit([value, limit], 'Hz');
  return { value: moveDecimals(value, -exponent), limit: moveDecimals(limit, -exponent), unit };
}
