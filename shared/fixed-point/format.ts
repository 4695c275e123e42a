import type { OverflowByNode, StoredInteger } from '../model/words';

export type { StoredInteger } from '../model/words';
export type Overflow = OverflowByNode['sample'];

/** Exact value of an integer that JSON stores as a number, or as digits where a double would lose some. */
export const toBigInt = (stored: StoredInteger): bigint => BigInt(stored);

/** Nearest double of a stored integer: for physics, never for a datapath node. */
export const toNumber = (stored: StoredInteger): number => Number(stored);

/** The form in which JSON stores an integer: a number up to 2^53 − 1 in magnitude, decimal digits beyond. */
export function toStored(value: bigint): StoredInteger {
  const number = Number(value);
  return Number.isSafeInteger(number) ? number : value.toString();
}

/**
 * Fits an exact value into a two's-complement word: saturate into [−2^(W−1), 2^(W−1) − 1], or wrap modulo 2^W.
 *
 * @param value exact value, any size
 * @param widthBits width W of the word, sign included, 1 to 64
 */
export function fit(value: bigint, widthBits: number, overflow: Overflow): bigint {
  if (overflow === 'wrap') return BigInt.asIntN(widthBits, value);
  const top = 1n << BigInt(widthBits - 1);
  if (value < -top) return -top;
  return value < top ? value : top - 1n;
}

/** A value modulo 2^W, never negative. */
export const wrapUnsigned = (value: bigint, widthBits: number): bigint => BigInt.asUintN(widthBits, value);
