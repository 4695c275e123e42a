import type { SignedGainWord } from '../model/words';
import { ParameterError } from '../parameter-error';

export type GainWord = SignedGainWord;
export type GainForm = 'multiplier' | 'shift' | 'shift-add';

export interface WantedGain {
  /** Real gain, LSB of the node that it drives per error LSB, finite, either sign. */
  gain: number;
  /** How the hardware makes the gain. */
  form: GainForm;
  /** Width b of the signed mantissa, 2 to 32. */
  mantissaBits: number;
}

const largestShift = 63;
/** Above every gain there is, and near enough that differences from it stay exact. */
const beyondAll = 2 ** 95;
const none: GainWord = { mantissa: 0, shift: 0 };

/** M·2^−s, exact in a double. */
export const gainOf = ({ mantissa, shift }: GainWord): number => mantissa * 2 ** -shift;

/**
 * Nearest gain M·2^−s that the hardware can hold; on a tie the smaller magnitude; a gain below half the least
 * one, or at it, is M = 0, s = 0. Beyond the largest one it is the largest.
 *
 *     multiplier 2^(b−2) ≤ |M| < 2^(b−1) · shift |M| = 1 · shift-add |M| = 2^m + {−1, 0, 1}, 0 < |M| < 2^(b−1)
 *
 * Where several words have the same value, the one with the smallest mantissa is taken.
 *
 * @throws {ParameterError} naming `gain` when it is not finite
 * @example gainWord({ gain: 0.3, form: 'shift', mantissaBits: 12 }) // => { mantissa: 1, shift: 2 }
 */
export function gainWord({ gain, form, mantissaBits }: WantedGain): GainWord {
  if (!Number.isFinite(gain)) throw new ParameterError('gain', 'gain must be a finite number');
  if (gain === 0) return { ...none };
  const wanted = Math.min(Math.abs(gain), beyondAll);
  const best = nearest(wanted, candidates(form, mantissaBits, wanted));
  if (best.mantissa === 0) return { ...none };
  return gain < 0 ? { ...best, mantissa: -best.mantissa } : best;
}

/** Words that surround the wanted gain, smallest mantissa first. */
function candidates(form: GainForm, bits: number, wanted: number): GainWord[] {
  if (form === 'shift') return surrounding(1, wanted);
  if (form === 'multiplier') return normalised(bits, wanted);
  return shiftAddMantissas(bits).flatMap((mantissa) => surrounding(mantissa, wanted));
}

/** The two shifts between which M·2^−s passes the wanted gain. */
function surrounding(mantissa: number, wanted: number): GainWord[] {
  const shift = exponentOf(mantissa) - exponentOf(wanted);
  return [shift + 1, shift, shift - 1].map((s) => ({ mantissa, shift: clampShift(s) }));
}

/** Mantissas of full length below and above the wanted gain. */
function normalised(bits: number, wanted: number): GainWord[] {
  const least = 2 ** (bits - 2);
  const shift = clampShift(bits - 2 - exponentOf(wanted));
  const below = Math.min(Math.max(Math.floor(wanted * 2 ** shift), least), 2 * least - 1);
  const above = below + 1 < 2 * least ? { mantissa: below + 1, shift } : { mantissa: least, shift: shift - 1 };
  return above.shift < -largestShift ? [{ mantissa: below, shift }] : [{ mantissa: below, shift }, above];
}

function shiftAddMantissas(bits: number): number[] {
  const values = new Set<number>();
  for (let m = 0; m < bits; m++) for (const step of [-1, 0, 1]) values.add(2 ** m + step);
  return [...values].filter((value) => value > 0 && value < 2 ** (bits - 1)).sort((a, b) => a - b);
}

function nearest(wanted: number, words: readonly GainWord[]): GainWord {
  let best = none;
  for (const word of words) {
    // Within a factor of two of each other the difference of two doubles is exact, so ties are seen as ties.
    const gap = Math.abs(gainOf(word) - wanted) - Math.abs(gainOf(best) - wanted);
    if (gap < 0 || (gap === 0 && gainOf(word) < gainOf(best))) best = word;
  }
  return best;
}

const clampShift = (shift: number): number => Math.min(Math.max(shift, -largestShift), largestShift);

/** ⌊log2 x⌋ of a double above 0, exact whatever the engine's Math.log2 rounds to. */
function exponentOf(value: number): number {
  const guess = Math.floor(Math.log2(value));
  if (2 ** guess > value) return guess - 1;
  return 2 ** (guess + 1) <= value ? guess + 1 : guess;
}
