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
   * rms from noise.
   */
  thermal: number | null;
  /**
   * rms from the phase-noise table; null without one.
   */
  oscillator: number | null;
  /**
   * rms of all terms.
   */
  total: number | null;
  /**
   * The larger term.
   */
  dominant: 'thermal' | 'oscillator' | null;
}

/**
 * Jitter over the bandwidth of the last stage.
 */
export interface JitterSweep {
  /**
   * One value for each point.
   */
  noiseBandwidth: number[];
  /**
   * One value for each point; null where there is none.
   */
  thermal: (number | null)[];
  /**
   * One value for each point; null where there is none.
   */
  oscillator: (number | null)[];
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
