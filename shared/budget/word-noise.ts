import type { CarrierWords, ClockWords, SignedGainWord } from '../model/words';
import { detectorLsbLog2 } from '../fixed-point/datapath/phase-detector';
import { timingLsbLog2 } from '../fixed-point/datapath/timing-detector';
import { errorLsb } from '../fixed-point/loop-scale';
import type { LinearLoop } from '../loop/linear-loop';
import type { LoopNoise } from './loop-energies';

/** What the rounding of one stage's words adds, in the unit of the phase: radians or symbols. */
export interface WordNoise {
  /** Variance on the error, over Kd. */
  error: number;
  /** Variance per update on the oscillator's word, and into each integrator. */
  word: number;
  integrator: number;
  integrator2: number;
  /** Mean of the rounding on the error, and per update into the last integrator (without one: on the word). */
  errorMean: number;
  lastMean: number;
}

export interface WordScale {
  words: CarrierWords | ClockWords;
  /** Kd of the integer detector, detector units per unit of the phase, symbols counted together included. */
  detectorGain: number;
  /** K0, phase per output LSB and update. */
  oscillatorGain: number;
}

type Rounding = CarrierWords['rounding'];

/**
 * Variance of rounding s bits away in LSB² of what is left, every value of the bits equally likely: (1 − 4^−s)/12;
 * convergent rounding sends an exact half to either side, (1 + 2·4^−s)/12.
 */
export function roundingVariance(rounding: Rounding, shift: number): number {
  if (shift <= 0) return 0;
  return rounding === 'convergent' ? (1 + 2 * 4 ** -shift) / 12 : (1 - 4 ** -shift) / 12;
}

/** Its mean in LSB: floor −(1 − 2^−s)/2, nearest (an exact half goes up) 2^−s/2, convergent 0. */
export function roundingMean(rounding: Rounding, shift: number): number {
  if (shift <= 0 || rounding === 'convergent') return 0;
  return rounding === 'floor' ? -(1 - 2 ** -shift) / 2 : 2 ** -shift / 2;
}

/** The roundings of every stage, taken as white: so they are where the error moves by an LSB or more. */
export function wordNoises({ words, detectorGain, oscillatorGain }: WordScale): WordNoise[] {
  const { rounding, guardBits, guard2Bits, order } = words;
  const lsbLog2 = words.loop === 'carrier' ? detectorLsbLog2(words) : timingLsbLog2(words);
  const errorShift = words.errorFullScaleLog2 - (words.errorBits - 1) - lsbLog2;
  const error = errorLsb(words) / detectorGain;
  const [first, second] = [oscillatorGain * 2 ** -guardBits, oscillatorGain * 2 ** -(guardBits + guard2Bits)];
  const variance = ({ mantissa, shift }: SignedGainWord): number =>
    mantissa === 0 ? 0 : roundingVariance(rounding, shift);
  // A shift of an integrator to the word below it is a floor in every mode; the integrators make up for its mean.
  const below = (bits: number): number => roundingVariance('floor', bits);
  return words.stages.map(({ proportional, integral, integral2 }) => ({
    error: error ** 2 * roundingVariance(rounding, errorShift),
    word: oscillatorGain ** 2 * (variance(proportional) + (order > 1 ? below(guardBits) : 0)),
    integrator: order > 1 ? first ** 2 * (variance(integral) + (order > 2 ? below(guard2Bits) : 0)) : 0,
    integrator2: order > 2 ? second ** 2 * variance(integral2) : 0,
    errorMean: error * roundingMean(rounding, errorShift),
    lastMean: lastMean({ rounding, order }, [proportional, integral, integral2], [oscillatorGain, first, second]),
  }));
}

function lastMean(
  { rounding, order }: Pick<CarrierWords, 'rounding' | 'order'>,
  gains: [SignedGainWord, SignedGainWord, SignedGainWord],
  lsb: [number, number, number],
): number {
  const { mantissa, shift } = gains[order - 1] as SignedGainWord;
  // With negated mantissas the hardware turns the word round again, and its mean with it.
  return mantissa === 0 ? 0 : (lsb[order - 1] as number) * Math.sign(mantissa) * roundingMean(rounding, shift);
}

/** The noises of a loop of some order; what a higher order alone has is left out. */
export function wordEntries(noise: WordNoise, order: number): LoopNoise[] {
  const entries = (['error', 'word', 'integrator', 'integrator2'] as const).slice(0, order + 1);
  return entries.map((entry) => ({ entry, covariance: [noise[entry]] }));
}

/** Static error that the means of the roundings leave: the loop settles where error and integrator pull no more. */
export function roundingOffset({ errorMean, lastMean: mean }: WordNoise, { gains, order }: LinearLoop): number {
  const last = [gains.g1, gains.g2, gains.g3][order - 1];
  return last ? Math.abs(errorMean + mean / last) : 0;
}
