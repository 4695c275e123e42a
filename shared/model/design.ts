// Generated from schemas/design.schema.json; do not edit.

import type { Plan } from './plan';
import type { Words } from './words';

/**
 * What the server works out from a plan.
 */
export interface Design {
  /**
   * Engine version.
   */
  engine: string;
  /**
   * SHA-256 over the canonical JSON of engine, plan and words.
   */
  digest: string;
  /**
   * The plan with its defaults filled in.
   */
  plan: Plan;
  carrier?: LoopDesign;
  clock?: LoopDesign;
  /**
   * Failing first, then caution, then pass.
   */
  findings: Finding[];
  /**
   * Values that would just meet the limits.
   */
  solutions: Solution[];
  /**
   * What the two loops do to each other.
   */
  interaction: null | LoopInteraction;
}

/**
 * One loop worked out.
 */
export interface LoopDesign {
  /**
   * Loop updates per second.
   */
  updateRateHz: number;
  detector: Detector;
  /**
   * Stages in the order in which they run.
   */
  stages: StageDesign[];
  /**
   * Nodes of the datapath.
   */
  headroom: HeadroomNode[];
  /**
   * Jitter budget; null where this engine has none for the detector.
   */
  budget: null | Budget;
  acquisition: Acquisition;
  /**
   * Frequency of one output LSB, Hz.
   */
  resolutionHz: number | null;
  words: Words;
  /**
   * What the interpolator adds; clock loop only.
   */
  interpolator: null | InterpolatorError;
}

/**
 * The detector at lock.
 */
export interface Detector {
  /**
   * Detector.
   */
  name: string;
  /**
   * Slope Kd at lock: detector units per radian (carrier) or per symbol (clock), noise at the operating point and U updates included as the datapath counts them.
   */
  gain: number;
  /**
   * The same slope without noise.
   */
  gainWithoutNoise: number;
  /**
   * K0: radians (carrier) or symbols (clock) per output LSB and update.
   */
  oscillatorGain: number;
  /**
   * Period of the S-curve: radians (carrier) or symbols (clock).
   */
  period: number;
  /**
   * Variance of the error at lock, detector units².
   */
  variance: number | null;
  curve: SCurve;
  /**
   * Errors of different evaluations are uncorrelated.
   */
  memoryless: boolean;
  /**
   * Spectral density of the error at frequency 0 over one update, detector units²; equals the variance where errors are uncorrelated.
   */
  spectrumAtZero: number | null;
  /**
   * Variance of the error at lock without noise, detector units².
   */
  selfNoise: number | null;
  /**
   * The slope goes with the amplitude to this power.
   */
  amplitudeExponent: number;
  /**
   * Zeros of the S-curve with noise over one period, rising.
   */
  nulls: DetectorNull[];
}

/**
 * S-curve over one period.
 */
export interface SCurve {
  /**
   * One value for each point.
   */
  x: number[];
  /**
   * One value for each point; null where there is none.
   */
  noiseless: (number | null)[];
  /**
   * One value for each point; null where there is none.
   */
  noisy: (number | null)[];
}

/**
 * A zero of the S-curve with noise.
 */
export interface DetectorNull {
  /**
   * Radians (carrier) or symbols (clock), within half a period of lock.
   */
  x: number;
  /**
   * The loop settles here.
   */
  stable: boolean;
  /**
   * Lock itself.
   */
  lock: boolean;
}

/**
 * One stage worked out.
 */
export interface StageDesign {
  /**
   * Name of the stage.
   */
  name: string;
  gains: Gains;
  /**
   * Every closed-loop pole lies inside the unit circle, delay included.
   */
  stable: boolean;
  noiseBandwidth: Achieved;
  noiseBandwidthHz: Achieved;
  damping: Achieved;
  naturalFrequencyHz: Achieved;
  /**
   * (effective − exact)/exact noise bandwidth.
   */
  bandwidthError: number | null;
  /**
   * (effective − exact)/exact damping factor.
   */
  dampingError: number | null;
  margins: Margins;
  /**
   * Phase margin of the loop that the integers make, degrees.
   */
  effectivePhaseDeg: number | null;
  /**
   * [re, im] pairs.
   */
  poles: number[][];
  /**
   * [re, im] pairs.
   */
  analogPoles: number[][];
  /**
   * Peak of |H| in dB.
   */
  peakingDb: number | null;
  /**
   * 3 dB bandwidth of H, cycles per update.
   */
  bandwidth3Db: number | null;
  /**
   * 3 dB bandwidth of H, Hz.
   */
  bandwidth3DbHz: number | null;
  /**
   * Updates after which a phase step stays within 2 %.
   */
  settlingUpdates: number | null;
  /**
   * Overshoot of a phase step, ratio.
   */
  overshoot: number | null;
  /**
   * Largest extra delay in updates that leaves the loop stable with these gains.
   */
  largestDelay: number | null;
  /**
   * Ratio by which the gain may grow before the loop is unstable.
   */
  largestGain: number | null;
  words: StageWords;
  phaseStep: PhaseStep;
  response: Response;
  marginAgainstDelay: MarginAgainstDelay;
  /**
   * Phase error after a frequency step of one radian (symbol) per update; null where the loop is unstable.
   */
  frequencyStep: null | Curve;
  /**
   * Phase error while the frequency rises by one radian (symbol) per update each update; null where the loop is unstable.
   */
  frequencyRamp: null | Curve;
  rootLocus: RootLocus;
  bandwidthAgainstDelay: BandwidthAgainstDelay;
  amplitude: AmplitudeEnds;
}

/**
 * Gains of the unquantised loop.
 */
export interface Gains {
  /**
   * Kd·K0·Kp.
   */
  g1: number;
  /**
   * Kd·K0·Ki.
   */
  g2: number;
  /**
   * Kd·K0·Kii.
   */
  g3?: number;
  /**
   * Kp, output LSB per detector unit.
   */
  proportional: number;
  /**
   * Ki, output LSB per detector unit.
   */
  integral: number;
  /**
   * Kii, output LSB per detector unit.
   */
  integral2?: number;
}

/**
 * Wanted, exact and effective value.
 */
export interface Achieved {
  /**
   * As typed; null where the plan does not ask for it.
   */
  wanted: number | null;
  /**
   * Unquantised loop with its delay; null when it is unstable or has none.
   */
  exact: number | null;
  /**
   * From the integers; null when it is unstable or has none.
   */
  effective: number | null;
}

/**
 * Stability margins with the delay.
 */
export interface Margins {
  /**
   * Least phase margin over the crossings, degrees.
   */
  phaseDeg: number | null;
  /**
   * Ratio by which the gain may grow.
   */
  gainUp: number | null;
  /**
   * Ratio to which the gain may fall.
   */
  gainDown: number | null;
}

/**
 * Gain words.
 */
export interface StageWords {
  proportional: GainWord;
  integral?: GainWord;
  integral2?: GainWord;
}

/**
 * One gain word: mantissa · 2^−shift LSB of the node that it drives per error LSB.
 */
export interface GainWord {
  /**
   * Signed mantissa.
   */
  mantissa: number;
  /**
   * Right shift, −63 to 63.
   */
  shift: number;
}

/**
 * Response of the NCO phase to a unit phase step.
 */
export interface PhaseStep {
  /**
   * One value for each point.
   */
  updates: number[];
  /**
   * One value for each point.
   */
  phase: number[];
}

/**
 * Closed loop over frequency.
 */
export interface Response {
  /**
   * One value for each point.
   */
  frequency: number[];
  /**
   * One value for each point.
   */
  frequencyHz: number[];
  /**
   * One value for each point; null where there is none.
   */
  hDb: (number | null)[];
  /**
   * One value for each point; null where there is none.
   */
  eDb: (number | null)[];
}

/**
 * Phase margin of these gains over the extra delay.
 */
export interface MarginAgainstDelay {
  /**
   * One value for each point.
   */
  delay: number[];
  /**
   * One value for each point; null where there is none.
   */
  phaseDeg: (number | null)[];
}

/**
 * A response over updates.
 */
export interface Curve {
  /**
   * One value for each point.
   */
  updates: number[];
  /**
   * One value for each point.
   */
  value: number[];
  /**
   * Largest magnitude.
   */
  peak: number;
  /**
   * Update at which it is reached.
   */
  peakUpdates: number;
  /**
   * Where it ends; null where it grows without bound.
   */
  settled: number | null;
}

/**
 * Closed-loop poles over the gain.
 */
export interface RootLocus {
  /**
   * Gain over this stage's own, rising, 1 among them.
   */
  ratio: number[];
  /**
   * One list for each ratio.
   */
  poles: number[][][];
  /**
   * Ratios at which a pole lies on the unit circle.
   */
  critical: number[];
}

/**
 * Noise bandwidth of these gains over the extra delay.
 */
export interface BandwidthAgainstDelay {
  /**
   * One value for each point.
   */
  delay: number[];
  /**
   * BnT, cycles per symbol; null where the loop is unstable.
   */
  noiseBandwidth: (number | null)[];
}

/**
 * The loop at both ends of the gain control's error.
 */
export interface AmplitudeEnds {
  low: AmplitudeEnd;
  high: AmplitudeEnd;
}

/**
 * The loop with the gain control at one end of its error.
 */
export interface AmplitudeEnd {
  /**
   * Error of the amplitude, dB.
   */
  amplitudeDb: number;
  /**
   * Change of the loop gain, dB.
   */
  gainDb: number;
  /**
   * Every closed-loop pole lies inside the unit circle.
   */
  stable: boolean;
  /**
   * BnT, cycles per symbol.
   */
  noiseBandwidth: number | null;
  /**
   * Damping factor.
   */
  damping: number | null;
  /**
   * Natural frequency, Hz.
   */
  naturalFrequencyHz: number | null;
  /**
   * Phase margin, degrees.
   */
  phaseDeg: number | null;
}

/**
 * One node of the datapath.
 */
export interface HeadroomNode {
  /**
   * Node.
   */
  node: 'sample' | 'error' | 'proportional' | 'increment' | 'integrator' | 'frequency-word';
  /**
   * Stage, where the node depends on it.
   */
  stage: string | null;
  /**
   * Width of the word.
   */
  widthBits: number;
  /**
   * Bits below one output LSB.
   */
  guardBits: number;
  /**
   * log2 of the largest magnitude reached, in LSB of the node.
   */
  reachedBits: number;
  /**
   * Bits left above the largest signal; negative: it overflows.
   */
  headroomBits: number;
  /**
   * The same in dB.
   */
  headroomDb: number;
  /**
   * log2 of the largest magnitude that can ever arrive, in LSB.
   */
  worstBits: number;
  /**
   * The signal that reaches it.
   */
  signal: string;
  /**
   * Frequency at full scale of the node, Hz, where its LSB is a frequency.
   */
  fullScaleHz?: number | null;
}

/**
 * Jitter budget: degrees rms for a carrier loop, symbols rms for a clock loop.
 */
export interface Budget {
  /**
   * Unit of every number here.
   */
  unit: 'deg' | 'symbols';
  /**
   * One entry a stage.
   */
  stages: StageJitter[];
  sweep: JitterSweep;
  /**
   * Least total jitter; null where nothing rises with bandwidth.
   */
  best: null | BestBandwidth;
  /**
   * Most that the plan allows, same unit.
   */
  limit: number;
  /**
   * Thermal variance over that of a detector that knows the symbols, ratio; null for a clock loop.
   */
  squaringLoss: number | null;
  /**
   * Thermal and self-noise variance over the modified Cramér–Rao bound at the same noise bandwidth, last stage.
   */
  boundRatio: number | null;
  /**
   * Static error under drift, last stage.
   */
  drift: null | Drift;
  /**
   * What the phase bits of the NCO leave.
   */
  nco: null | NcoSpurs;
  /**
   * What the jitter of the last stage costs.
   */
  implementationLoss: null | ImplementationLoss;
  /**
   * Mean time to a cycle slip, last stage: an estimate.
   */
  slip: null | CycleSlip;
}

/**
 * Jitter of one stage.
 */
export interface StageJitter {
  /**
   * Stage.
   */
  stage: string;
  /**
   * rms from channel noise.
   */
  thermal: number | null;
  /**
   * rms from the pattern of the data alone; 0 where there is none.
   */
  selfNoise: number | null;
  /**
   * rms from the phase-noise table; null without one.
   */
  oscillator: number | null;
  /**
   * rms from the phase bits and tables of the NCO (the fraction bits of the counter).
   */
  phaseQuantisation: number | null;
  /**
   * rms from the rounding of the error and loop words.
   */
  wordQuantisation: number | null;
  /**
   * Static error under the frequency drift asked for; not random.
   */
  drift: number | null;
  /**
   * Root of the sum of squares of all terms.
   */
  total: number | null;
  /**
   * The largest term.
   */
  dominant: 'thermal' | 'selfNoise' | 'oscillator' | 'phaseQuantisation' | 'wordQuantisation' | 'drift' | null;
}

/**
 * Jitter over the bandwidth of the last stage.
 */
export interface JitterSweep {
  /**
   * Asked BnT; one value for each point.
   */
  noiseBandwidth: number[];
  /**
   * One value for each point; null where there is none.
   */
  thermal: (number | null)[];
  /**
   * One value for each point; null where there is none.
   */
  selfNoise: (number | null)[];
  /**
   * One value for each point; null where there is none.
   */
  oscillator: (number | null)[];
  /**
   * One value for each point; null where there is none.
   */
  phaseQuantisation: (number | null)[];
  /**
   * One value for each point; null where there is none.
   */
  wordQuantisation: (number | null)[];
  /**
   * One value for each point; null where there is none.
   */
  drift: (number | null)[];
  /**
   * One value for each point; null where there is none.
   */
  total: (number | null)[];
}

/**
 * The bandwidth with the least total.
 */
export interface BestBandwidth {
  /**
   * BnT asked.
   */
  noiseBandwidth: number;
  /**
   * rms.
   */
  total: number;
}

/**
 * Static error under drift, last stage.
 */
export interface Drift {
  /**
   * Doppler rate asked for, Hz/s.
   */
  rateHzPerS: number;
  /**
   * Error that stands, degrees; null where it grows without bound.
   */
  staticError: number | null;
}

/**
 * What the phase bits of the NCO leave.
 */
export interface NcoSpurs {
  /**
   * rms of the phase truncation, degrees.
   */
  truncationDeg: number;
  /**
   * Worst spur of the phase truncation, dBc; null where no bit is discarded.
   */
  worstSpurDbc: number | null;
  /**
   * Frequency resolution, Hz.
   */
  resolutionHz: number;
}

/**
 * What the jitter of the last stage costs.
 */
export interface ImplementationLoss {
  /**
   * Loss at the operating point, dB; null where no Es/N0 without jitter has this error rate.
   */
  lossDb: number | null;
  /**
   * Mean symbol error rate with the jitter.
   */
  symbolErrorRate: number;
  /**
   * Symbol error rate without jitter.
   */
  idealSymbolErrorRate: number;
}

/**
 * Mean time to a cycle slip, last stage: an estimate.
 */
export interface CycleSlip {
  /**
   * Loop signal-to-noise ratio ρ = 1/(M²σ²).
   */
  rho: number;
  /**
   * First-order formula, seconds; null where it is beyond 1e300.
   */
  seconds: number | null;
  /**
   * The same in symbols.
   */
  symbols: number | null;
  /**
   * Named method.
   */
  method: string;
}

/**
 * Range and ambiguity.
 */
export interface Acquisition {
  /**
   * Largest carrier offset without ambiguity, Hz.
   */
  unambiguousHz: number | null;
  /**
   * Spacing of the false-lock offsets, Hz.
   */
  falseLockSpacingHz: number | null;
  /**
   * Largest carrier offset that the environment asks for, Hz.
   */
  offsetHz: number | null;
  /**
   * Largest offset that the integrator holds, Hz.
   */
  largestOffsetHz: number | null;
  /**
   * Clock error that the environment asks for, ppm.
   */
  offsetPpm: number | null;
  /**
   * Largest clock error that the integrator holds, ppm.
   */
  largestOffsetPpm: number | null;
  /**
   * Estimate of the lock-in range, Hz.
   */
  lockInHz: number | null;
  /**
   * Estimate of the pull-in time from the largest offset, symbols.
   */
  pullInSymbols: number | null;
  /**
   * Estimate of the largest offset from which a slipping loop is driven towards lock, Hz.
   */
  pullInRangeHz: number | null;
  /**
   * Estimate of the frequency step that does not slip a cycle, Hz.
   */
  pullOutHz: number | null;
  /**
   * Clock: estimate of the rate error that locks without a slip, ppm.
   */
  lockInPpm: number | null;
  /**
   * Symbols in which the first stage settles.
   */
  settlingSymbols: number | null;
  /**
   * Pull-in, settling and stage switches together, symbols.
   */
  totalSymbols: number | null;
  /**
   * One entry a stage.
   */
  stages: StageTime[];
  /**
   * The lock detector's statistic over one block.
   */
  lockDetector: null | LockFigures;
}

/**
 * When a stage is left.
 */
export interface StageTime {
  /**
   * Stage.
   */
  stage: string;
  /**
   * Symbols after which it is left; null: not by count.
   */
  untilSymbols: number | null;
  /**
   * Estimate of what it needs to settle, symbols.
   */
  neededSymbols: number | null;
}

/**
 * The lock detector's statistic over one block.
 */
export interface LockFigures {
  /**
   * Symbols in a block.
   */
  averagingSymbols: number;
  /**
   * Mean of the statistic in lock with the last stage's jitter.
   */
  meanLocked: number;
  /**
   * Standard deviation of the statistic in lock.
   */
  deviationLocked: number;
  /**
   * Standard deviation of the statistic out of lock, mean 0.
   */
  deviationUnlocked: number;
  /**
   * Thresholds of the plan.
   */
  thresholds: LockThreshold[];
}

/**
 * One threshold.
 */
export interface LockThreshold {
  /**
   * Stage that is left at it; null: the plan's own lock detector.
   */
  stage: string | null;
  /**
   * Share of the block power.
   */
  threshold: number;
  /**
   * Probability that a block out of lock passes.
   */
  falseAlarm: number;
  /**
   * Probability that a block in lock fails.
   */
  miss: number;
}

/**
 * What the interpolator adds; clock loop only.
 */
export interface InterpolatorError {
  /**
   * Signal over error for random data, dB.
   */
  signalOverErrorDb: number;
  /**
   * The same with the coefficients of the table and the bits of the fractional interval, dB.
   */
  tableSignalOverErrorDb: number;
  /**
   * Worst error over the signal band and all fractions, over the signal of that frequency, dB; −10 is a third of its amplitude.
   */
  worstErrorDb: number;
  /**
   * Cycles per sample; one value for each point.
   */
  frequency: number[];
  /**
   * Error over the signal of that frequency, rms over the fractions, dB; one value for each point, null where there is none.
   */
  errorDb: (number | null)[];
  /**
   * Edge of the signal band, cycles per sample.
   */
  bandEdge: number;
}

/**
 * One check and its result.
 */
export interface Finding {
  /**
   * Stable name.
   */
  slug: string;
  /**
   * Result.
   */
  severity: 'pass' | 'caution' | 'fail';
  /**
   * At most seven words, the fault and not the check.
   */
  title: string;
  /**
   * What was found.
   */
  value: number | null;
  /**
   * What it is held to.
   */
  limit: number | null;
  /**
   * Whether the limit is the most or the least allowed.
   */
  sense: 'max' | 'min' | null;
  /**
   * Unit of value and limit, empty where dimensionless.
   */
  unit: string;
  /**
   * Why it matters, one sentence or two.
   */
  reason: string;
  /**
   * What to change.
   */
  remedy: string | null;
  /**
   * The edit that the remedy would type.
   */
  change: null | Change;
  /**
   * JSON pointers of the fields concerned.
   */
  fields: string[];
  /**
   * Source of the rule.
   */
  source: string;
  /**
   * The value is an estimate.
   */
  estimate: boolean;
}

/**
 * The edit that the remedy would type.
 */
export interface Change {
  /**
   * JSON pointer into the plan.
   */
  pointer: string;
  /**
   * New value.
   */
  value: number | string | boolean;
  /**
   * What the button says.
   */
  label: string;
}

/**
 * The value of one field that would just meet one limit.
 */
export interface Solution {
  /**
   * Stable name.
   */
  slug: string;
  /**
   * Loop.
   */
  loop: 'carrier' | 'clock';
  /**
   * Stage, where it belongs to one.
   */
  stage: string | null;
  /**
   * What is solved for.
   */
  title: string;
  /**
   * JSON pointer of the limit that it meets.
   */
  limit: string;
  /**
   * The limit in words, with its unit.
   */
  limitText: string;
  /**
   * The value; null where none meets the limit.
   */
  value: number | null;
  /**
   * Unit of the value, empty where dimensionless.
   */
  unit: string;
  /**
   * Whether the value is the most or the least allowed.
   */
  sense: 'max' | 'min';
  /**
   * The plan's present value, same unit.
   */
  present: number | null;
  /**
   * Why there is no value, or what else bounds it.
   */
  note: string | null;
  /**
   * The value is an estimate.
   */
  estimate: boolean;
  /**
   * The edit that the remedy would type.
   */
  change: null | Change1;
}

/**
 * The edit that the remedy would type.
 */
export interface Change1 {
  /**
   * JSON pointer into the plan.
   */
  pointer: string;
  /**
   * New value.
   */
  value: number | string | boolean;
  /**
   * What the button says.
   */
  label: string;
}

/**
 * What the two loops do to each other.
 */
export interface LoopInteraction {
  /**
   * Noise bandwidth of the carrier loop over that of the clock loop, last stages, Hz over Hz.
   */
  bandwidthRatio: number | null;
  /**
   * The timing detector needs a locked carrier.
   */
  clockNeedsCarrier: boolean;
  /**
   * The phase detector needs a locked clock.
   */
  carrierNeedsClock: boolean;
  /**
   * Which loop can start before the other has locked.
   */
  startFirst: 'carrier' | 'clock' | 'either' | 'neither';
  /**
   * Phase jitter that the timing jitter adds, degrees rms.
   */
  carrierFromTimingDeg: number | null;
  /**
   * Signal that the timing jitter costs, dB.
   */
  lossFromTimingDb: number | null;
  /**
   * Timing slope left by the phase jitter, ratio.
   */
  clockGainFromPhase: number | null;
}
