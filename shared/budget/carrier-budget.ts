import type { Budget } from '../model/design';
import type { DetectorModel } from '../detectors/detector';
import { rotationalSymmetry } from '../detectors/modulations';
import { errorRateOf } from '../detectors/symbol-error-rate';
import { carrierOscillatorGain } from '../fixed-point/loop-scale';
import { frequencyResolutionHz } from '../fixed-point/headroom';
import type { CarrierWords } from '../fixed-point/words';
import { averagedSymbols } from '../loop/stage-loop';
import type { StageLoop } from '../loop/stage-loop';
import type { CompleteCarrier, CompletePlan } from '../plan/complete';
import { phaseBound } from './bounds';
import { implementationLoss } from './implementation-loss';
import { cycleSlip } from './cycle-slip';
import { errorCovariance, randomVariance } from './jitter';
import type { Disturbances } from './jitter';
import { jitterBudget } from './jitter-budget';
import type { LastStage } from './jitter-budget';
import { narrowest } from './jitter-sweep';
import { familyOf } from './loop-family';
import { tableVariance, truncationVariance, worstSpurDbc } from './nco';
import { phaseNoiseGrid } from './phase-noise';
import { wordNoises } from './word-noise';

export interface CarrierBudgetInput {
  plan: CompletePlan;
  carrier: CompleteCarrier;
  model: DetectorModel;
  /** Unquantised loops of the stages. */
  solved: StageLoop[];
  words: CarrierWords;
}

const degrees = 180 / Math.PI;

/** Jitter budget of a carrier loop, degrees rms. */
export function carrierBudget(input: CarrierBudgetInput): Budget {
  const { plan, carrier, model, solved, words } = input;
  const noises = wordNoises({
    words,
    detectorGain: averagedSymbols(carrier.updateInterval) * model.gain,
    oscillatorGain: carrierOscillatorGain(words),
  });
  const { jitter, last } = jitterBudget({
    stages: solved.map(({ loop }, i) => ({ name: carrier.stages[i]!.name, loop, words: noises[i]! })),
    family: familyOf(carrier, solved.at(-1) as StageLoop),
    disturbances: disturbancesOf(input),
    scale: degrees,
  });
  return {
    unit: 'deg',
    limit: plan.limits.phaseJitterDeg,
    ...jitter,
    ...overBound(last, 10 ** (plan.signal.esN0Db / 10)),
    drift: driftOf(last, plan.environment.dopplerRateHzPerS),
    nco: {
      truncationDeg: degrees * Math.sqrt(truncationVariance(words)),
      worstSpurDbc: worstSpurDbc(words),
      resolutionHz: frequencyResolutionHz(words, plan.signal.symbolRateBd),
    },
    implementationLoss: lossOf(last, plan.signal),
    slip: slipOf(last, plan.signal),
  };
}

function disturbancesOf({ plan, carrier, model, solved, words }: CarrierBudgetInput): Omit<Disturbances, 'words'> {
  const { updateInterval } = carrier;
  const updateRateHz = plan.signal.symbolRateBd / updateInterval;
  const { phaseNoise, dopplerRateHzPerS } = plan.environment;
  const { loop } = solved.at(-1) as StageLoop;
  return {
    updateInterval,
    error: model.covariance && errorCovariance(model.covariance, model, updateInterval),
    self: errorCovariance(model.selfCovariance, model, updateInterval),
    phaseQuantisation: truncationVariance(words) + tableVariance(words),
    phaseNoise: phaseNoise ? phaseNoiseGrid(phaseNoise, loop, slowest(solved), updateRateHz) : null,
    drift: (2 * Math.PI * dopplerRateHzPerS) / updateRateHz ** 2,
  };
}

/** The lowest loop frequency of the stages and of the sweep, radians per update. */
const slowest = (solved: StageLoop[]): number => Math.min(2 * narrowest, ...solved.map(({ theta }) => theta));

function overBound({ terms, noiseBandwidth }: LastStage, esN0: number): Pick<Budget, 'squaringLoss' | 'boundRatio'> {
  const { thermal, selfNoise } = terms;
  if (thermal === null || selfNoise === null || noiseBandwidth === null)
    return { squaringLoss: null, boundRatio: null };
  const bound = phaseBound(noiseBandwidth, esN0);
  return { squaringLoss: thermal / bound, boundRatio: (thermal + selfNoise) / bound };
}

const driftOf = ({ terms }: LastStage, rateHzPerS: number): Budget['drift'] => ({
  rateHzPerS,
  staticError: terms.drift === null ? null : degrees * Math.sqrt(terms.drift),
});

function lossOf({ terms }: LastStage, signal: CompletePlan['signal']): Budget['implementationLoss'] {
  const variance = randomVariance(terms);
  if (variance === null || terms.drift === null) return null;
  return implementationLoss({
    errorRate: errorRateOf(signal.modulation, signal),
    esN0: 10 ** (signal.esN0Db / 10),
    variance,
    bias: Math.sqrt(terms.drift),
  });
}

/** What is random of the jitter, against a period of 2π/M. */
function slipOf({ terms, noiseBandwidth }: LastStage, { modulation, symbolRateBd }: CompletePlan['signal']) {
  const variance = randomVariance(terms);
  if (!variance || noiseBandwidth === null) return null;
  return cycleSlip({
    variance: rotationalSymmetry[modulation] ** 2 * variance,
    noiseBandwidthHz: noiseBandwidth * symbolRateBd,
    symbolRateBd,
  });
}
