import type { Budget } from '../model/design';
import type { DetectorModel } from '../detectors/detector';
import { clockOscillatorGain } from '../fixed-point/loop-scale';
import type { ClockWords } from '../fixed-point/words';
import { averagedSymbols } from '../loop/stage-loop';
import type { StageLoop } from '../loop/stage-loop';
import type { CompleteClock, CompletePlan } from '../plan/complete';
import { timingBound } from './bounds';
import { cycleSlip } from './cycle-slip';
import { errorCovariance, randomVariance } from './jitter';
import { jitterBudget } from './jitter-budget';
import type { LastStage } from './jitter-budget';
import { familyOf } from './loop-family';
import { wordNoises } from './word-noise';

export interface ClockBudgetInput {
  plan: CompletePlan;
  clock: CompleteClock;
  model: DetectorModel;
  /** Unquantised loops of the stages. */
  solved: StageLoop[];
  words: ClockWords;
}

/** Jitter budget of a clock loop, symbols rms. Phase noise and drift of the carrier do not enter it. */
export function clockBudget({ plan, clock, model, solved, words }: ClockBudgetInput): Budget {
  const { signal } = plan;
  const { updateInterval } = clock;
  const noises = wordNoises({
    words,
    detectorGain: averagedSymbols(updateInterval) * model.gain,
    oscillatorGain: clockOscillatorGain(words, signal.samplesPerSymbol),
  });
  const { jitter, last } = jitterBudget({
    stages: solved.map(({ loop }, i) => ({ name: clock.stages[i]!.name, loop, words: noises[i]! })),
    family: familyOf(clock, solved.at(-1) as StageLoop),
    disturbances: {
      updateInterval,
      error: model.covariance && errorCovariance(model.covariance, model, updateInterval),
      self: errorCovariance(model.selfCovariance, model, updateInterval),
      phaseQuantisation: fractionVariance(words, signal.samplesPerSymbol),
      phaseNoise: null,
      drift: null,
    },
    scale: 1,
  });
  return {
    unit: 'symbols',
    limit: plan.limits.timingJitterSymbols,
    ...jitter,
    squaringLoss: null,
    boundRatio: boundRatio(last, signal),
    drift: null,
    nco: null,
    implementationLoss: null,
    slip: slipOf(last, signal.symbolRateBd),
  };
}

/**
 * Variance of the fractional interval of F bits, symbols²: the interval is one of N samples a symbol, and cutting it to
 * F bits leaves an even error of 2^−F of it, (2^−F/N)²/12.
 */
export const fractionVariance = ({ counter: { fractionBits } }: ClockWords, samplesPerSymbol: number): number =>
  (2 ** -fractionBits / samplesPerSymbol) ** 2 / 12;

function boundRatio({ terms, noiseBandwidth }: LastStage, { esN0Db, rollOff }: CompletePlan['signal']): number | null {
  const { thermal, selfNoise } = terms;
  if (thermal === null || selfNoise === null || noiseBandwidth === null) return null;
  return (thermal + selfNoise) / timingBound(noiseBandwidth, 10 ** (esN0Db / 10), rollOff);
}

/** A clock slips a symbol, a period of one. */
function slipOf({ terms, noiseBandwidth }: LastStage, symbolRateBd: number) {
  const variance = randomVariance(terms);
  if (!variance || noiseBandwidth === null) return null;
  return cycleSlip({
    variance: (2 * Math.PI) ** 2 * variance,
    noiseBandwidthHz: noiseBandwidth * symbolRateBd,
    symbolRateBd,
  });
}
