// Generated from schemas/replay-point.schema.json; do not edit.

/**
 * What one point of a replay gave: one carrier offset at one Es/N0.
 */
export interface ReplayPoint {
  /**
   * Place of the point: Es/N0 index times the number of offsets, plus offset index.
   */
  index: number;
  /**
   * Carrier offset applied, Hz.
   */
  offsetHz: number;
  /**
   * Es/N0, dB.
   */
  esN0Db: number;
  /**
   * Trials run.
   */
  trials: number;
  /**
   * Trials that locked to the offset applied.
   */
  locks: number;
  /**
   * Trials with a quiet error at a wrong frequency, k·Rs/M away.
   */
  falseLocks: number;
  lockProbability: LockProbability;
  /**
   * Lock time; null where no trial locked.
   */
  lockTimeSymbols: LockTime | null;
  /**
   * Mean of applied minus settled frequency over the trials that locked, Hz.
   */
  residualOffsetHz: number | null;
  /**
   * Phase jitter of the NCO after lock, rms about the common mean of the trials that locked, degrees.
   */
  phaseJitterDeg: number | null;
  /**
   * Mean phase error after lock, degrees.
   */
  phaseBiasDeg: number | null;
  /**
   * Cycle slips in the last fifth of the trials.
   */
  cycleSlips: number;
  /**
   * Against the limits of the check.
   */
  verdict: 'pass' | 'fail' | 'undecided';
  /**
   * Running checksum over z, e, acc, w and phase of every symbol of every trial.
   */
  checksum: string;
}

/**
 * Share of trials that locked, with its Clopper–Pearson interval.
 */
export interface LockProbability {
  /**
   * Locks over trials.
   */
  estimate: number;
  /**
   * Lower end.
   */
  lower: number;
  /**
   * Upper end.
   */
  upper: number;
}

/**
 * Symbols until the phase error stays inside ±π/M.
 */
export interface LockTime {
  /**
   * Median over the trials that locked.
   */
  p50: number;
  /**
   * 95th percentile over the trials that locked.
   */
  p95: number;
}
