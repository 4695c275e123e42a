import type { Rounding } from '../rounding';

/*
 * Arithmetic on integers that doubles hold exactly. The usual case of each node, a floor and two comparisons, stands
 * in the loop itself: a call that the engine does not inline costs more than the node. What is rarer is here.
 */

/** What rounding adds before a right shift by s: 2^(s−1), or 0 where nothing is added. */
export const roundingHalf = (shift: number, rounding: Rounding): number =>
  shift > 0 && rounding !== 'floor' ? 2 ** (shift - 1) : 0;

/** 2^s where an exact half has to go to the even neighbour, else 0. */
export const evenUnit = (shift: number, rounding: Rounding): number =>
  shift > 0 && rounding === 'convergent' ? 2 ** shift : 0;

/**
 * A rounded right shift is ⌊(x + half)·2^−s⌋; where it was an exact half and `even` is set, the result becomes even.
 *
 * @param raised x + half · @param rounded the floor · @param even from `evenUnit`, above 0
 */
export const toEven = (rounded: number, raised: number, even: number): number =>
  rounded * even === raised && rounded % 2 !== 0 ? rounded - 1 : rounded;

/** Fits a value that lies outside a word of 2·top values around 0. */
export function beyond(value: number, top: number, wraps: boolean): number {
  if (!wraps) return value < 0 ? -top : top - 1;
  // The remainder of two doubles is exact, however large the dividend.
  const rest = value % (2 * top);
  if (rest >= top) return rest - 2 * top;
  return rest < -top ? rest + 2 * top : rest;
}
