// Generated from schemas/words.schema.json; do not edit.

/**
 * The integers that the hardware of one loop holds; the datapath starts from them and from nothing else.
 */
export type Words = CarrierWords | ClockWords;
/**
 * An integer of up to 64 bits: a number up to 2^53 − 1, beyond that its decimal digits.
 */
export type StoredInteger = number | string;

/**
 * Words of a carrier loop.
 */
export interface CarrierWords {
  /**
   * Carrier recovery.
   */
  loop: 'carrier';
  /**
   * Phase error detector.
   */
  detector: 'costas' | 'sign' | 'decision' | 'power-law' | 'known-symbols';
  /**
   * Modulation; every detector but the power law needs it.
   */
  modulation?: 'bpsk' | 'qpsk' | 'oqpsk' | '8psk' | '16qam' | '64qam' | '16apsk' | '32apsk';
  /**
   * Amplitude A of the decided points, sample units.
   */
  amplitude?: number;
  /**
   * Ring ratios of an APSK constellation.
   *
   * @minItems 1
   * @maxItems 2
   *
   * Items: Ring radius over the inner radius.
   */
  ringRatios?: number[];
  /**
   * Power M of the power-law detector.
   */
  power?: 2 | 4 | 8;
  /**
   * Sign σ of E a^M of the power-law detector.
   */
  powerSign?: 1 | -1;
  /**
   * Rounding of every node.
   */
  rounding: 'floor' | 'nearest' | 'convergent';
  overflow: OverflowByNode;
  /**
   * Width Wz of a sample, each rail.
   */
  sampleBits: number;
  /**
   * log2 of the sample value at full scale, kz: one sample LSB is 2^(kz − (Wz − 1)).
   */
  sampleFullScaleLog2: number;
  /**
   * Width Wt of a table entry, whose unit is 2^(Wt − 2).
   */
  tableBits: number;
  /**
   * Width We of the error word.
   */
  errorBits: number;
  /**
   * log2 of the detector value at error full scale, k: one error LSB is 2^(k − (We − 1)) detector units.
   */
  errorFullScaleLog2: number;
  /**
   * Symbols whose detector values are added for one update.
   */
  symbolsPerUpdate: number;
  /**
   * Updates that one error serves; above 1 only with one symbol per update.
   */
  updatesPerSymbol: number;
  /**
   * Extra pipeline delay D, updates.
   */
  delay: number;
  /**
   * Order of the loop.
   */
  order: 1 | 2 | 3;
  /**
   * Width Wi of the integrator, guard bits included.
   */
  integratorBits: number;
  /**
   * Integrator bits G below one output LSB; less than Wi.
   */
  guardBits: number;
  /**
   * Width Wj of the second integrator (order 3), guard bits included.
   */
  integrator2Bits: number;
  /**
   * Second-integrator bits H below one LSB of the first; less than Wj.
   */
  guard2Bits: number;
  /**
   * Limit ± of the integrator in its own LSB; null: the word itself, by its overflow mode.
   */
  integratorLimit: StoredInteger | null;
  lock: LockWords;
  /**
   * Gain words in the order in which the stages run.
   *
   * @minItems 1
   * @maxItems 8
   */
  stages: StageGainWords[];
  nco: NcoWords;
}

/**
 * What each node does when its value leaves its word.
 */
export interface OverflowByNode {
  /**
   * Overflow of the sample node.
   */
  sample: 'saturate' | 'wrap';
  /**
   * Overflow of the error node.
   */
  error: 'saturate' | 'wrap';
  /**
   * Overflow of the proportional node.
   */
  proportional: 'saturate' | 'wrap';
  /**
   * Overflow of the increment node.
   */
  increment: 'saturate' | 'wrap';
  /**
   * Overflow of the integrator node.
   */
  integrator: 'saturate' | 'wrap';
  /**
   * Overflow of the increment2 node.
   */
  increment2: 'saturate' | 'wrap';
  /**
   * Overflow of the integrator2 node.
   */
  integrator2: 'saturate' | 'wrap';
}

/**
 * Lock detector.
 */
export interface LockWords {
  /**
   * Symbols N in a block.
   */
  averagingSymbols: number;
  /**
   * Power M of the statistic.
   */
  power: 2 | 4 | 8;
  /**
   * Sign of E a^M.
   */
  sign: 1 | -1;
}

/**
 * The words of one stage, and when it ends.
 */
export interface StageGainWords {
  proportional: SignedGainWord;
  integral: SignedGainWord;
  integral2: SignedGainWord;
  /**
   * Symbols after which the next stage is loaded; null: not by count.
   */
  untilSymbols: number | null;
  /**
   * Lock threshold T in 1/256 at which the next stage is loaded; null: not by the lock detector.
   */
  lockThreshold: number | null;
}

/**
 * A gain mantissa · 2^−shift, LSB of the node that it drives per error LSB.
 */
export interface SignedGainWord {
  /**
   * Signed mantissa M.
   */
  mantissa: number;
  /**
   * Right shift s; negative shifts left.
   */
  shift: number;
}

/**
 * Numerically controlled oscillator.
 */
export interface NcoWords {
  /**
   * Width Wn of phase and frequency word.
   */
  widthBits: number;
  /**
   * Phase bits P that address the rotator table.
   */
  phaseBits: number;
  /**
   * NCO steps c per symbol, a multiple of the updates per symbol.
   */
  stepsPerSymbol: number;
  fcw: StoredInteger;
}

/**
 * Words of a clock loop.
 */
export interface ClockWords {
  /**
   * Clock recovery.
   */
  loop: 'clock';
  /**
   * Timing detector.
   */
  detector: 'gardner' | 'zero-crossing' | 'mueller-muller';
  /**
   * Interpolator.
   */
  interpolator: 'linear' | 'parabolic' | 'cubic' | 'polyphase';
  /**
   * Table of a polyphase bank, one entry a fraction μ/2^F, rising from μ = 0; every other interpolator follows from its name.
   *
   * @minItems 2
   * @maxItems 1024
   */
  taps?: number[][];
  /**
   * The control word acts on every sample of a symbol.
   */
  hold: boolean;
  /**
   * Rounding of every node.
   */
  rounding: 'floor' | 'nearest' | 'convergent';
  overflow: OverflowByNode;
  /**
   * Width Wz of a sample, each rail.
   */
  sampleBits: number;
  /**
   * log2 of the sample value at full scale, kz: one sample LSB is 2^(kz − (Wz − 1)).
   */
  sampleFullScaleLog2: number;
  /**
   * Width Wt of a table entry, whose unit is 2^(Wt − 2).
   */
  tableBits: number;
  /**
   * Width We of the error word.
   */
  errorBits: number;
  /**
   * log2 of the detector value at error full scale, k: one error LSB is 2^(k − (We − 1)) detector units.
   */
  errorFullScaleLog2: number;
  /**
   * Symbols whose detector values are added for one update.
   */
  symbolsPerUpdate: number;
  /**
   * Updates that one error serves; above 1 only with one symbol per update.
   */
  updatesPerSymbol: number;
  /**
   * Extra pipeline delay D, updates.
   */
  delay: number;
  /**
   * Order of the loop.
   */
  order: 1 | 2 | 3;
  /**
   * Width Wi of the integrator, guard bits included.
   */
  integratorBits: number;
  /**
   * Integrator bits G below one output LSB; less than Wi.
   */
  guardBits: number;
  /**
   * Width Wj of the second integrator (order 3), guard bits included.
   */
  integrator2Bits: number;
  /**
   * Second-integrator bits H below one LSB of the first; less than Wj.
   */
  guard2Bits: number;
  /**
   * Limit ± of the integrator in its own LSB; null: the word itself, by its overflow mode.
   */
  integratorLimit: StoredInteger | null;
  lock: LockWords;
  /**
   * Gain words in the order in which the stages run.
   *
   * @minItems 1
   * @maxItems 8
   */
  stages: StageGainWords[];
  counter: CounterWords;
}

/**
 * Modulo-1 down counter.
 */
export interface CounterWords {
  /**
   * Width Wc of the counter.
   */
  widthBits: number;
  /**
   * Bits F of the fractional interval.
   */
  fractionBits: number;
  nominalStep: StoredInteger;
}
