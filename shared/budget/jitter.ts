import type { DetectorModel } from '../detectors/detector';
import type { LinearLoop } from '../loop/linear-loop';
import { loopVariances } from './loop-energies';
import type { LoopNoise } from './loop-energies';
import { oscillatorVariance } from './phase-noise';
import type { PhaseNoiseGrid } from './phase-noise';
import { seenBySymbols, updateCovariance } from './update-covariance';
import { roundingOffset, wordEntries } from './word-noise';
import type { WordNoise } from './word-noise';

/** What disturbs a loop, in the unit of its phase: radians or symbols. */
export interface Disturbances {
  /** Symbols per update. */
  updateInterval: number;
  /** Autocovariance of the error over Kd, per update as the symbols see it; null where it is not worked out. */
  error: readonly number[] | null;
  /** The part of it that the pattern of the data makes alone; empty where there is none. */
  self: readonly number[];
  /** Variance of the phase bits behind the loop. */
  phaseQuantisation: number;
  words: WordNoise;
  /** Null where there is no table. */
  phaseNoise: PhaseNoiseGrid | null;
  /** Rise of the frequency, radians per update each update; null where nothing drifts. */
  drift: number | null;
}

/** Variances in the unit of the phase, squared; the drift's is the square of its static error. */
export interface JitterTerms {
  thermal: number | null;
  selfNoise: number | null;
  oscillator: number | null;
  phaseQuantisation: number | null;
  wordQuantisation: number | null;
  drift: number | null;
  /** Their sum; null when a term that is there has no finite value, or is not worked out. */
  total: number | null;
}

const unknownTerms: JitterTerms = {
  thermal: null,
  selfNoise: null,
  oscillator: null,
  phaseQuantisation: null,
  wordQuantisation: null,
  drift: null,
  total: null,
};

/** Autocovariance of a detector's errors over Kd as one loop is disturbed by it. */
export function errorCovariance(
  covariance: readonly number[],
  { gain }: Pick<DetectorModel, 'gain'>,
  updateInterval: number,
): number[] {
  const perUpdate = updateCovariance(covariance, updateInterval);
  return seenBySymbols(perUpdate, updateInterval).map((value) => value / gain ** 2);
}

/**
 * Every term of the jitter of one loop: σ² = Σ_l c[l]·r[l] for what comes in on the error or a word.
 *
 * @param variancesOf how the variances are worked out: exact, or swift for a curve
 * @returns nothing but null for an unstable loop
 */
export function jitterTerms(loop: LinearLoop, disturbances: Disturbances, variancesOf = loopVariances): JitterTerms {
  const { words, updateInterval, phaseNoise } = disturbances;
  const noises = wordEntries(words, loop.order).map((noise) => ({
    ...noise,
    covariance: seenBySymbols(noise.covariance, updateInterval),
  }));
  const variances = variancesOf(loop, [...errorNoises(disturbances), ...noises]);
  if (!variances) return unknownTerms;
  const [all, selfNoise] = variances as [number, number];
  const rounding = variances.slice(2).reduce((sum, value) => sum + value, 0);
  const known = disturbances.error !== null;
  const terms = {
    thermal: known ? Math.max(0, all - selfNoise) : null,
    selfNoise: known ? Math.max(0, selfNoise) : null,
    oscillator: phaseNoise && oscillatorVariance(loop, phaseNoise),
    phaseQuantisation: disturbances.phaseQuantisation,
    wordQuantisation: rounding + roundingOffset(words, loop) ** 2,
    drift: driftOf(loop, disturbances.drift),
  };
  return { ...terms, total: totalOf(terms, disturbances) };
}

const errorNoises = ({ error, self }: Disturbances): LoopNoise[] =>
  [error ?? [0], self.length ? self : [0]].map((covariance) => ({ entry: 'error', covariance }));

/** Square of the static error under a drift: R/g2 of order 2 (exact), 0 of order 3, without bound of order 1. */
function driftOf({ order, gains }: LinearLoop, drift: number | null): number | null {
  if (drift === null) return null;
  if (drift === 0 || order === 3) return 0;
  return order === 2 ? (drift / gains.g2) ** 2 : null;
}

function totalOf(terms: Omit<JitterTerms, 'total'>, { phaseNoise, drift }: Disturbances): number | null {
  const there = [
    terms.thermal,
    terms.selfNoise,
    terms.phaseQuantisation,
    terms.wordQuantisation,
    phaseNoise ? terms.oscillator : 0,
    drift === null ? 0 : terms.drift,
  ];
  return there.reduce<number | null>((sum, term) => (sum === null || term === null ? null : sum + term), 0);
}

/** Variance of what is random of the jitter: all but the standing error of a drift; null when it is not all known. */
export function randomVariance(terms: JitterTerms): number | null {
  const { thermal, selfNoise, oscillator, phaseQuantisation, wordQuantisation, total } = terms;
  if (total === null) return null;
  return [thermal, selfNoise, oscillator, phaseQuantisation, wordQuantisation].reduce<number>(
    (sum, term) => sum + (term ?? 0),
    0,
  );
}
