import type { CarrierWords, ClockWords, OverflowByNode } from '../model/words';
import type { GainForm } from './gain-words';
import type { Rounding } from './rounding';
import type { Modulation } from './symmetry';

/** One stage as the loop engine gives it. */
export interface WantedStage {
  /** Loop-normalised gains Kd·K0·Kp, Kd·K0·Ki, Kd·K0·Kii per update, 0 where the order has none. */
  g1: number;
  g2?: number;
  g3?: number;
  /** Symbols after which the next stage is loaded; null: not by count. */
  untilSymbols: number | null;
  /** Lock metric 0 … 1 at which the next stage is loaded; null: not by the lock detector. */
  lockThreshold: number | null;
}

export interface WordSignal {
  modulation: Modulation | Uppercase<Modulation>;
  ringRatios?: number[];
  symbolRateBd: number;
  samplesPerSymbol: number;
  amplitude: number;
  sampleBits: number;
  sampleFullScaleLog2: number;
}

export interface WordArithmetic {
  errorBits: number;
  errorFullScaleLog2: number;
  gainForm: GainForm;
  mantissaBits: number;
  integratorBits: number;
  guardBits: number;
  integrator2Bits: number;
  guard2Bits: number;
  rounding: Rounding;
  overflow: OverflowByNode['sample'] | Partial<OverflowByNode>;
}

/** What both loops have in common, all of it filled in. */
export interface WordLoop {
  order: 1 | 2 | 3;
  /** Symbols between updates: a whole number, or 1/m. */
  updateInterval: number;
  /** Extra pipeline delay, updates. */
  delay: number;
  polarity: 1 | -1;
  arithmetic: WordArithmetic;
  lockDetector: { averagingSymbols: number };
}

export interface CarrierWordsInput {
  signal: WordSignal;
  carrier: WordLoop & {
    detector: CarrierWords['detector'];
    nco: { widthBits: number; phaseBits: number; tableBits: number; stepsPerSymbol: number; centreHz: number };
    arithmetic: { integratorLimitHz?: number };
  };
  /** Slope Kd at lock, detector units per radian, U symbols counted together when U > 1. */
  detectorGain: number;
  stages: readonly WantedStage[];
}

export interface ClockWordsInput {
  signal: WordSignal;
  clock: WordLoop & {
    detector: ClockWords['detector'];
    interpolator: ClockWords['interpolator'];
    hold: boolean;
    counter: { widthBits: number; fractionBits: number; tableBits: number };
    arithmetic: { integratorLimitPpm?: number };
  };
  /** Coefficients of a polyphase bank for each fraction, in ones; no other interpolator has one. */
  bank?: readonly (readonly number[])[] | undefined;
  /** Slope Kd at lock, detector units per symbol period, U symbols counted together when U > 1. */
  detectorGain: number;
  stages: readonly WantedStage[];
}
