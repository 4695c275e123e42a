import { moveDecimals } from '../quantities/format';

/** Two frequencies in the prefix of the larger one: 70 000 and 77 500 Hz are 70 and 77.5 kHz. */
export function inOneUnit(value: number, limit: number): { value: number; limit: number; unit: string } {
  const largest = Math.max(Math.abs(value), Math.abs(limit));
  const [exponent, unit] =
    largest >= 1e9 ? [9, 'GHz'] : largest >= 1e6 ? [6, 'MHz'] : largest >= 1e3 ? [3, 'kHz'] : [0, 'Hz'];
  return { value: moveDecimals(value, -exponent), limit: moveDecimals(limit, -exponent), unit };
}
