// Generated from schemas/tolerance-check.schema.json; do not edit.

/**
 * A stored requirement: where the carrier loop must lock, and how surely.
 */
export interface ToleranceCheck {
  /**
   * Name of the check.
   */
  name: string;
  carrierOffsetHz: OffsetRange;
  /**
   * Es/N0 in dB, one run of all offsets for each.
   *
   * @minItems 1
   * @maxItems 8
   *
   * Items: Es/N0 in dB.
   */
  esN0Db?: number[];
  /**
   * Symbols in a trial.
   */
  symbols?: number;
  /**
   * Trials of a point; with the other defaults 368 are the fewest that can pass.
   */
  trials?: number;
  /**
   * Seed of every trial.
   */
  seed?: number;
  limits?: ToleranceLimits;
}

/**
 * Carrier offsets, evenly spaced.
 */
export interface OffsetRange {
  /**
   * First offset in Hz.
   */
  start: number;
  /**
   * Last offset in Hz.
   */
  stop: number;
  /**
   * Number of offsets; 1: start alone.
   */
  points?: number;
}

/**
 * What each point must prove.
 */
export interface ToleranceLimits {
  /**
   * Probability of lock, least.
   */
  lockProbability?: number;
  /**
   * Confidence of the two-sided interval.
   */
  confidence?: number;
}
