import { boundedMemo } from '../math/bounded-memo';
import { pulseAutocorrelation } from './pulse';

/** Samples n that an interpolator adds up. */
export const tapPlaces = [-1, 0, 1, 2] as const;

export interface BankSignal {
  /** Roll-off α of the signal, 0 to 1. */
  rollOff: number;
  /** N, 1 or above. */
  samplesPerSymbol: number;
}

/**
 * Four coefficients, n = −1, 0, 1, 2, for each fraction of a polyphase bank: those with the least squared error over
 * the spectrum of random data, which is that of the pulse squared. With R the autocorrelation of such a signal, in
 * samples, they solve Σ_m R(n − m) h_m = R(n − μ).
 *
 * @see T. Laakso, V. Välimäki, M. Karjalainen, U. Laine, "Splitting the unit delay", IEEE Signal Processing Magazine
 *   13 (1996), for least squares over a band
 */
export const polyphaseBank = boundedMemo(
  ({ fractions, ...signal }: BankSignal & { /** μ = 0, 1/fractions … */ fractions: number }): number[][] => {
    const taps = polyphaseTaps(signal);
    return Array.from({ length: fractions }, (_, k) => taps(k / fractions));
  },
  ({ rollOff, samplesPerSymbol, fractions }) => JSON.stringify([rollOff, samplesPerSymbol, fractions]),
  8,
);

/** The same for any fraction from 0 to 1. */
export function polyphaseTaps({ rollOff, samplesPerSymbol }: BankSignal): (mu: number) => number[] {
  const correlation = (samples: number): number => pulseAutocorrelation(samples / samplesPerSymbol, rollOff);
  const lower = choleskyFactor(tapPlaces.map((n) => tapPlaces.map((m) => correlation(n - m))));
  return (mu) =>
    solved(
      lower,
      tapPlaces.map((n) => correlation(n - mu)),
    );
}

/** Keeps the factor real where many samples a symbol make the rows nearly equal. */
const leastPivot = 1e-15;

/** L of L·Lᵀ, for a symmetric matrix of no negative eigenvalue. */
function choleskyFactor(matrix: readonly (readonly number[])[]): number[][] {
  const lower: number[][] = [];
  matrix.forEach((values, i) => {
    const row: number[] = [];
    for (let j = 0; j <= i; j += 1) {
      const above = row.slice(0, j).reduce((sum, value, k) => sum + value * (lower[j] ?? row)[k]!, 0);
      const rest = values[j]! - above;
      row.push(i === j ? Math.sqrt(Math.max(rest, leastPivot)) : rest / lower[j]![j]!);
    }
    lower.push(row);
  });
  return lower;
}

function solved(lower: readonly (readonly number[])[], right: readonly number[]): number[] {
  const half: number[] = [];
  lower.forEach((row, i) =>
    half.push((right[i]! - half.reduce((sum, value, k) => sum + row[k]! * value, 0)) / row[i]!),
  );
  const result = [...half];
  for (let i = lower.length - 1; i >= 0; i -= 1) {
    for (let k = i + 1; k < lower.length; k += 1) result[i]! -= lower[k]![i]! * result[k]!;
    result[i]! /= lower[i]![i]!;
  }
  return result;
}
