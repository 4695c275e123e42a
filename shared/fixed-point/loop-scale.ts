import type { CarrierWords, ClockWords } from '../model/words';
import { gainOf } from './gain-words';

type Interval = Pick<CarrierWords, 'symbolsPerUpdate' | 'updatesPerSymbol'>;

/** Loop-normalised gains of one stage: Kd·K0·Kp, Kd·K0·Ki, Kd·K0·Kii per update. */
export interface NormalisedGains {
  g1: number;
  g2: number;
  g3: number;
}

/** One error LSB in detector units, 2^(k − (We − 1)). */
export const errorLsb = (words: Pick<CarrierWords, 'errorBits' | 'errorFullScaleLog2'>): number =>
  2 ** (words.errorFullScaleLog2 - (words.errorBits - 1));

/** K0 = 2πcU/2^Wn, radians per NCO LSB and update. */
export function carrierOscillatorGain({
  nco,
  symbolsPerUpdate,
  updatesPerSymbol,
}: Interval & { nco: Pick<CarrierWords['nco'], 'widthBits' | 'stepsPerSymbol'> }): number {
  return (2 * Math.PI * nco.stepsPerSymbol * symbolsPerUpdate) / updatesPerSymbol / 2 ** nco.widthBits;
}

/**
 * K0 of a clock loop, symbols per counter LSB and update: the control word acts on every sample until the next
 * update (`hold`) or on one sample.
 *
 * @param samplesPerSymbol N of the waveform
 */
export function clockOscillatorGain(
  { counter, hold, symbolsPerUpdate }: Interval & { hold: boolean; counter: Pick<ClockWords['counter'], 'widthBits'> },
  samplesPerSymbol: number,
): number {
  return (hold ? samplesPerSymbol * symbolsPerUpdate : 1) / 2 ** counter.widthBits;
}

/** Gains that the words of a carrier loop really make, one entry a stage; a negative polarity shows as negative gains. */
export const carrierGains = (words: CarrierWords, detectorGain: number): NormalisedGains[] =>
  normalised(words, detectorGain * carrierOscillatorGain(words));

/** The same of a clock loop. */
export const clockGains = (words: ClockWords, detectorGain: number, samplesPerSymbol: number): NormalisedGains[] =>
  normalised(words, detectorGain * clockOscillatorGain(words, samplesPerSymbol));

function normalised(words: CarrierWords | ClockWords, perUnit: number): NormalisedGains[] {
  const scale = perUnit / errorLsb(words);
  return words.stages.map(({ proportional, integral, integral2 }) => ({
    g1: gainOf(proportional) * scale,
    g2: words.order > 1 ? gainOf(integral) * scale * 2 ** -words.guardBits : 0,
    g3: words.order > 2 ? gainOf(integral2) * scale * 2 ** -(words.guardBits + words.guard2Bits) : 0,
  }));
}
