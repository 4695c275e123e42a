import type { Budget, LoopDesign, StageDesign } from '../model/design';
import { carrierBudget } from '../budget/carrier-budget';
import { lockFigures } from '../budget/lock-figures';
import { carrierAcquisition } from '../budget/loop-acquisition';
import { carrierDetector } from '../detectors/carrier';
import { largestSample } from '../detectors/largest-sample';
import { errorStatistics, sCurve } from '../detectors/detector';
import type { DetectorModel } from '../detectors/detector';
import { carrierHeadroom, frequencyResolutionHz, largestOffsetHeldHz } from '../fixed-point/headroom';
import { carrierGains, carrierOscillatorGain } from '../fixed-point/loop-scale';
import { carrierWords } from '../fixed-point/words';
import type { CarrierWords } from '../fixed-point/words';
import type { CompleteCarrier, CompletePlan } from '../plan/complete';
import { askedOffsetHz } from '../plan/required-offset';
import { requireLimit, solveStages, stageDesigns, wordStages } from './loop-design';
import { averagedSymbols } from '../loop/stage-loop';

/** The carrier recovery loop of a plan, worked out. */
export function carrierLoop(plan: CompletePlan, carrier: CompleteCarrier): LoopDesign {
  const { signal } = plan;
  const updateRateHz = signal.symbolRateBd / carrier.updateInterval;
  const model = carrierDetector(carrier.detector, { ...signal, esN0: 10 ** (signal.esN0Db / 10) });
  const stages = solveStages('carrier', carrier, signal.symbolRateBd);
  const detectorGain = averagedSymbols(carrier.updateInterval) * model.gain;
  const words = carrierWords({ signal, carrier, detectorGain, stages: wordStages(stages) });
  requireLimit(words, '/carrier/arithmetic/integratorLimitHz');
  const oscillatorGain = carrierOscillatorGain(words);
  const designs = stageDesigns({
    stages,
    loop: carrier,
    words: words.stages,
    effective: carrierGains(words, detectorGain),
    perUnit: detectorGain * oscillatorGain,
    updateRateHz,
    amplitude: { toleranceDb: signal.amplitudeToleranceDb, exponent: model.amplitudeExponent },
  });
  const budget = carrierBudget({ plan, carrier, model, solved: stages.solved, words });
  return {
    updateRateHz,
    detector: detectorOf(carrier, model, oscillatorGain),
    stages: designs,
    headroom: headroomOf(plan, words, carrier),
    budget,
    acquisition: carrierAcquisition({
      plan,
      model,
      stages: designs,
      held: largestOffsetHeldHz(words, signal.symbolRateBd),
      lockDetector: lockOf(plan, carrier, { budget, last: designs.at(-1)! }),
    }),
    interpolator: null,
    resolutionHz: frequencyResolutionHz(words, signal.symbolRateBd),
    words,
  };
}

function detectorOf(carrier: CompleteCarrier, model: DetectorModel, oscillatorGain: number): LoopDesign['detector'] {
  const counted = averagedSymbols(carrier.updateInterval);
  return {
    name: carrier.detector,
    gain: counted * model.gain,
    gainWithoutNoise: counted * model.gainWithoutNoise,
    oscillatorGain,
    period: model.period,
    ...errorStatistics(model, counted),
    curve: sCurve(model, counted),
  };
}

function headroomOf({ signal, environment }: CompletePlan, words: CarrierWords, carrier: CompleteCarrier) {
  return carrierHeadroom({
    words,
    symbolRateBd: signal.symbolRateBd,
    amplitude: signal.amplitude,
    peak: largestSample(signal),
    esN0Db: signal.esN0Db,
    largestOffsetHz: askedOffsetHz(environment) ?? 0,
    stageNames: carrier.stages.map(({ name }) => name),
  });
}

/** Null where the jitter of the last stage is not known. */
function lockOf(plan: CompletePlan, carrier: CompleteCarrier, { budget, last }: { budget: Budget; last: StageDesign }) {
  const total = budget.stages.at(-1)?.total ?? null;
  const noiseBandwidth = last.noiseBandwidth.exact;
  if (total === null || noiseBandwidth === null) return null;
  return lockFigures({ plan, carrier, jitterVariance: (total * (Math.PI / 180)) ** 2, noiseBandwidth });
}
