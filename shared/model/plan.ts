// Generated from schemas/plan.schema.json; do not edit.

/**
 * A receiver on one target for one waveform.
 */
export type Plan = {
  [k: string]: unknown;
} & {
  /**
   * Name of the plan.
   */
  name: string;
  /**
   * Slug of the target.
   */
  target: string;
  /**
   * The waveform at the input of the loops.
   */
  signal: {
    /**
     * Modulation.
     */
    modulation?: 'BPSK' | 'QPSK' | 'OQPSK' | '8PSK' | '16QAM' | '64QAM' | '16APSK' | '32APSK';
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
     * Symbol rate in Bd.
     */
    symbolRateBd: number;
    /**
     * Samples per symbol at the input of the clock loop.
     */
    samplesPerSymbol?: number;
    /**
     * Roll-off of the raised-cosine pulse.
     */
    rollOff?: number;
    /**
     * Es/N0 at the operating point in dB.
     */
    esN0Db?: number;
    /**
     * Amplitude A of the symbols at the detector, in sample units where E|a|² = 1.
     */
    amplitude?: number;
    /**
     * Error of the gain control, ± dB.
     */
    amplitudeToleranceDb?: number;
    /**
     * Width of a sample word, each rail.
     */
    sampleBits?: number;
    /**
     * log2 of the sample value at full scale.
     */
    sampleFullScaleLog2?: number;
  };

  carrier?: CarrierLoop;
  clock?: ClockLoop;
  /**
   * What the receiver meets.
   */
  environment?: {
    /**
     * Carrier frequency in Hz.
     */
    carrierFrequencyHz?: number;
    /**
     * Carrier tolerance of each end, ± ppm; both ends are added.
     */
    carrierTolerancePpm?: number;
    /**
     * Largest Doppler shift, ± Hz.
     */
    dopplerHz?: number;
    /**
     * Largest Doppler rate, Hz/s.
     */
    dopplerRateHzPerS?: number;
    /**
     * Clock tolerance of each end, ± ppm; both ends are added.
     */
    clockTolerancePpm?: number;
    /**
     * Oscillator phase noise: [offset Hz, dBc/Hz], offsets rising.
     *
     * @minItems 2
     * @maxItems 64
     */
    phaseNoise?: [number, number][];
  };

  /**
   * What the plan is held to.
   */
  limits?: {
    /**
     * Phase jitter, most, degrees rms.
     */
    phaseJitterDeg?: number;
    /**
     * Timing jitter, most, symbols rms.
     */
    timingJitterSymbols?: number;
    /**
     * Phase margin, least, degrees.
     */
    phaseMarginDeg?: number;
    /**
     * Relative error of the bandwidth from the words, most.
     */
    bandwidthError?: number;
    /**
     * Relative error of the damping factor from the words, most.
     */
    dampingError?: number;
    /**
     * Acquisition time, most, symbols.
     */
    acquisitionSymbols?: number;
    /**
     * Implementation loss, most, dB.
     */
    implementationLossDb?: number;
    /**
     * Headroom at every node, least, bits.
     */
    headroomBits?: number;
  };
};
/**
 * One set of gains, and when to leave it.
 */
export type Stage = Stage1 & Stage2;
export type Stage1 = {
  [k: string]: unknown;
};

/**
 * Carrier recovery loop.
 */
export interface CarrierLoop {
  /**
   * Error detector.
   */
  detector?: 'costas' | 'sign' | 'decision' | 'power-law' | 'known-symbols';
  /**
   * Order of the loop.
   */
  order?: 1 | 2 | 3;
  /**
   * Analog form of a loop of order 3: s³ + b3·ω0·s² + a3·ω0²·s + ω0³.
   */
  thirdOrder?: {
    /**
     * Coefficient a3.
     */
    a3?: number;
    /**
     * Coefficient b3.
     */
    b3?: number;
  };

  /**
   * Symbols between loop updates: a whole number, or 1/m for m updates per symbol.
   */
  updateInterval?: number;
  /**
   * Extra pipeline delay, updates.
   */
  delay?: number;
  /**
   * What the wanted bandwidth and damping mean: the textbook formula, or the discrete loop with its delay.
   */
  method?: 'nominal' | 'exact';
  /**
   * Pre-warp the bilinear transform at the natural frequency.
   */
  prewarp?: boolean;
  /**
   * −1 negates the gain mantissas.
   */
  polarity?: 1 | -1;
  /**
   * Stages in the order in which they run.
   *
   * @minItems 1
   * @maxItems 8
   */
  stages: Stage[];
  /**
   * Numerically controlled oscillator.
   */
  nco?: {
    /**
     * Width of the phase accumulator and of the frequency control word.
     */
    widthBits?: number;
    /**
     * Phase bits that reach the rotator.
     */
    phaseBits?: number;
    /**
     * Width of a sine or cosine table word.
     */
    tableBits?: number;
    /**
     * NCO steps per symbol.
     */
    stepsPerSymbol?: number;
    /**
     * Frequency at a zero loop word in Hz.
     */
    centreHz?: number;
  };

  /**
   * Word lengths and arithmetic of the loop.
   */
  arithmetic?: {
    /**
     * Width of the error word.
     */
    errorBits?: number;
    /**
     * log2 of the detector value at error full scale.
     */
    errorFullScaleLog2?: number;
    /**
     * How a gain is built.
     */
    gainForm?: 'multiplier' | 'shift' | 'shift-add';
    /**
     * Width of a signed gain mantissa.
     */
    mantissaBits?: number;
    /**
     * Width of the integrator.
     */
    integratorBits?: number;
    /**
     * Integrator bits below one NCO (counter) LSB.
     */
    guardBits?: number;
    /**
     * Width of the second integrator (order 3).
     */
    integrator2Bits?: number;
    /**
     * Second-integrator bits below one LSB of the first.
     */
    guard2Bits?: number;
    /**
     * Rounding of every node.
     */
    rounding?: 'floor' | 'nearest' | 'convergent';
    /**
     * What a node does when its value leaves its word: one word for all nodes, or one for each.
     */
    overflow?:
      | ('saturate' | 'wrap')
      | {
          /**
           * Overflow of the sample node.
           */
          sample?: 'saturate' | 'wrap';
          /**
           * Overflow of the error node.
           */
          error?: 'saturate' | 'wrap';
          /**
           * Overflow of the proportional node.
           */
          proportional?: 'saturate' | 'wrap';
          /**
           * Overflow of the increment node.
           */
          increment?: 'saturate' | 'wrap';
          /**
           * Overflow of the integrator node.
           */
          integrator?: 'saturate' | 'wrap';
          /**
           * Overflow of the increment2 node.
           */
          increment2?: 'saturate' | 'wrap';
          /**
           * Overflow of the integrator2 node.
           */
          integrator2?: 'saturate' | 'wrap';
        };
    /**
     * Limit of the integrator as a frequency, ± Hz; absent: the word itself.
     */
    integratorLimitHz?: number;
  };

  /**
   * Lock detector.
   */
  lockDetector?: {
    /**
     * Symbols in a block.
     */
    averagingSymbols?: number;
    /**
     * Share of the block power that the M-th power sum must reach.
     */
    threshold?: number;
  };
}

export interface Stage2 {
  /**
   * Name of the stage, a C identifier in small letters: acquire, track.
   */
  name: string;
  /**
   * Damping factor of the wanted loop (order 2 only; default 1/√2 there).
   */
  damping?: number;
  /**
   * Wanted one-sided loop noise bandwidth Bn·T, cycles per symbol.
   */
  noiseBandwidth?: number;
  /**
   * Wanted natural frequency in Hz, instead of noiseBandwidth.
   */
  naturalFrequencyHz?: number;
  /**
   * When the next stage takes over: whichever comes first.
   */
  until?: {
    /**
     * Symbols that the stage runs.
     */
    symbols?: number;
    /**
     * Lock-detector threshold at which the stage ends.
     */
    lockMetric?: number;
  };
}

/**
 * Clock recovery loop.
 */
export interface ClockLoop {
  /**
   * Error detector.
   */
  detector?: 'gardner' | 'zero-crossing' | 'mueller-muller' | 'early-late';
  /**
   * Order of the loop.
   */
  order?: 1 | 2 | 3;
  /**
   * Analog form of a loop of order 3: s³ + b3·ω0·s² + a3·ω0²·s + ω0³.
   */
  thirdOrder?: {
    /**
     * Coefficient a3.
     */
    a3?: number;
    /**
     * Coefficient b3.
     */
    b3?: number;
  };

  /**
   * Symbols between loop updates: a whole number, or 1/m for m updates per symbol.
   */
  updateInterval?: number;
  /**
   * Extra pipeline delay, updates.
   */
  delay?: number;
  /**
   * What the wanted bandwidth and damping mean: the textbook formula, or the discrete loop with its delay.
   */
  method?: 'nominal' | 'exact';
  /**
   * Pre-warp the bilinear transform at the natural frequency.
   */
  prewarp?: boolean;
  /**
   * −1 negates the gain mantissas.
   */
  polarity?: 1 | -1;
  /**
   * Stages in the order in which they run.
   *
   * @minItems 1
   * @maxItems 8
   */
  stages: Stage[];
  /**
   * Interpolator.
   */
  interpolator?: 'linear' | 'parabolic' | 'cubic' | 'polyphase';
  /**
   * The control word acts on every sample of a symbol.
   */
  hold?: boolean;
  /**
   * Modulo-1 down counter.
   */
  counter?: {
    /**
     * Width of the counter.
     */
    widthBits?: number;
    /**
     * Bits of the fractional interval.
     */
    fractionBits?: number;
    /**
     * Width of an interpolator coefficient.
     */
    tableBits?: number;
  };

  /**
   * Word lengths and arithmetic of the loop.
   */
  arithmetic?: {
    /**
     * Width of the error word.
     */
    errorBits?: number;
    /**
     * log2 of the detector value at error full scale.
     */
    errorFullScaleLog2?: number;
    /**
     * How a gain is built.
     */
    gainForm?: 'multiplier' | 'shift' | 'shift-add';
    /**
     * Width of a signed gain mantissa.
     */
    mantissaBits?: number;
    /**
     * Width of the integrator.
     */
    integratorBits?: number;
    /**
     * Integrator bits below one NCO (counter) LSB.
     */
    guardBits?: number;
    /**
     * Width of the second integrator (order 3).
     */
    integrator2Bits?: number;
    /**
     * Second-integrator bits below one LSB of the first.
     */
    guard2Bits?: number;
    /**
     * Rounding of every node.
     */
    rounding?: 'floor' | 'nearest' | 'convergent';
    /**
     * What a node does when its value leaves its word: one word for all nodes, or one for each.
     */
    overflow?:
      | ('saturate' | 'wrap')
      | {
          /**
           * Overflow of the sample node.
           */
          sample?: 'saturate' | 'wrap';
          /**
           * Overflow of the error node.
           */
          error?: 'saturate' | 'wrap';
          /**
           * Overflow of the proportional node.
           */
          proportional?: 'saturate' | 'wrap';
          /**
           * Overflow of the increment node.
           */
          increment?: 'saturate' | 'wrap';
          /**
           * Overflow of the integrator node.
           */
          integrator?: 'saturate' | 'wrap';
          /**
           * Overflow of the increment2 node.
           */
          increment2?: 'saturate' | 'wrap';
          /**
           * Overflow of the integrator2 node.
           */
          integrator2?: 'saturate' | 'wrap';
        };
    /**
     * Limit of the integrator as a rate error, ± ppm; absent: the word itself.
     */
    integratorLimitPpm?: number;
  };

  /**
   * Lock detector.
   */
  lockDetector?: {
    /**
     * Symbols in a block.
     */
    averagingSymbols?: number;
    /**
     * Share of the block power that the M-th power sum must reach.
     */
    threshold?: number;
  };
}
