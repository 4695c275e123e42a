import { toNumber } from '../fixed-point/format';
import { gainOf } from '../fixed-point/gain-words';
import { errorLsb } from '../fixed-point/loop-scale';
import type { CarrierWords, ClockWords, SignedGainWord } from '../model/words';
import type { LoopSource } from './quantity';

const minus = (text: string): string => text.replace(/-/g, '−');

/** At most six significant digits, in the shortest form. */
export const shortNumber = (value: number): string => minus(String(Number(value.toPrecision(6))));

/** A relative error in per cent with its sign and three significant digits. */
export function percent(ratio: number): string {
  const text = minus(String(Number((100 * ratio).toPrecision(3))));
  return `${ratio > 0 ? '+' : ''}${text} %`;
}

/** The gains of a stage, and by how many guard bits the LSB of each lies below one output LSB. */
export type Gain = 'proportional' | 'integral' | 'integral2';

function guardOf(gain: Gain, { guardBits, guard2Bits }: LoopSource['words']): number {
  if (gain === 'proportional') return 0;
  return gain === 'integral' ? guardBits : guardBits + guard2Bits;
}

/** Gain that a word makes in output LSB per error LSB: M·2^−s, below it the guard bits of its integrator. */
export const gainOfWord = (word: SignedGainWord, gain: Gain, words: LoopSource['words']): number =>
  gainOf(word) * 2 ** -guardOf(gain, words);

/**
 * Relative error of the magnitude of a gain word.
 *
 * @param wanted gain in output LSB per detector unit
 * @returns null where the plan wants no such gain
 */
export function gainError(
  word: SignedGainWord,
  gain: Gain,
  wanted: number | undefined,
  words: LoopSource['words'],
): number | null {
  if (!wanted) return null;
  return Math.abs(gainOfWord(word, gain, words)) / Math.abs(wanted * errorLsb(words)) - 1;
}

/** Clock of the NCO in Hz: steps per symbol times the symbol rate. */
export const ncoClockHz = ({ plan, words }: LoopSource<CarrierWords>): number =>
  words.nco.stepsPerSymbol * plan.signal.symbolRateBd;

export function frequencyWordText(source: LoopSource<CarrierWords>): string {
  const { fcw, widthBits } = source.words.nco;
  // A word in the upper half stands for a negative frequency.
  const signed = BigInt.asIntN(widthBits, BigInt(fcw));
  return `${shortNumber((Number(signed) * ncoClockHz(source)) / 2 ** widthBits)} Hz`;
}

export function carrierLimitText(source: LoopSource<CarrierWords>): string {
  const { integratorLimit, guardBits, nco } = source.words;
  if (integratorLimit === null) return 'no limit: full scale of the integrator';
  const hertz = (toNumber(integratorLimit) * ncoClockHz(source)) / 2 ** (nco.widthBits + guardBits);
  return `±${shortNumber(hertz)} Hz`;
}

export const nominalStepText = ({ words }: LoopSource<ClockWords>): string =>
  `${shortNumber(2 ** words.counter.widthBits / toNumber(words.counter.nominalStep))} samples per symbol`;

export function clockLimitText({ words, plan }: LoopSource<ClockWords>): string {
  if (words.integratorLimit === null) return 'no limit: full scale of the integrator';
  const samples = words.hold ? 1 : (plan.signal.samplesPerSymbol ?? 1);
  const steps = toNumber(words.counter.nominalStep) * 2 ** words.guardBits * samples;
  return `±${shortNumber((1e6 * toNumber(words.integratorLimit)) / steps)} ppm`;
}
