import type { Overflow } from '../format';
import type { Rounding } from '../rounding';

/** A right shift with rounding, prepared for doubles that hold the exact value. */
export interface DoubleShift {
  /** 2^−s. */
  scale: number;
  /** 2^s where a half can occur, else 0. */
  unit: number;
  /** 2^(s−1), else 0. */
  half: number;
  /** An exact half goes to the even neighbour. */
  even: boolean;
}

export function doubleShift(shift: number, rounding: Rounding): DoubleShift {
  const rounds = shift > 0 && rounding !== 'floor';
  return {
    scale: 2 ** -shift,
    unit: 2 ** shift,
    half: rounds ? 2 ** (shift - 1) : 0,
    even: rounds && rounding === 'convergent',
  };
}

/** The rounded shift of an integer held exactly in a double. */
export function shiftDouble(value: number, { scale, unit, half, even }: DoubleShift): number {
  const raised = value + half;
  const rounded = Math.floor(raised * scale);
  return even && rounded * unit === raised && rounded % 2 !== 0 ? rounded - 1 : rounded;
}

/** A word of W ≤ 53 bits and what happens beyond it. */
export interface DoubleWord {
  /** 2^(W−1). */
  top: number;
  wraps: boolean;
}

export const doubleWord = (widthBits: number, overflow: Overflow): DoubleWord => ({
  top: 2 ** (widthBits - 1),
  wraps: overflow === 'wrap',
});

/** Fits an integer held exactly in a double. */
export function fitDouble(value: number, { top, wraps }: DoubleWord): number {
  if (value < top && value >= -top) return value;
  if (!wraps) return value < 0 ? -top : top - 1;
  // The remainder of two doubles is exact, however large the dividend.
  const rest = value % (2 * top);
  if (rest >= top) return rest - 2 * top;
  return rest < -top ? rest + 2 * top : rest;
}
