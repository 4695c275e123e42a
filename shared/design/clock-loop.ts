import type { LoopDesign } from '../model/design';
import { clockBudget } from '../budget/clock-budget';
import { clockAcquisition } from '../budget/loop-acquisition';
import { clockDetector } from '../detectors/clock';
import { interpolatorError } from '../detectors/interpolator-error';
import { polyphaseBank } from '../detectors/polyphase-bank';
import { errorStatistics, sCurve } from '../detectors/detector';
import { clockHeadroom, largestErrorHeldPpm, rateResolutionHz } from '../fixed-point/clock-headroom';
import { clockGains, clockOscillatorGain } from '../fixed-point/loop-scale';
import { clockWords } from '../fixed-point/words';
import type { CompleteClock, CompletePlan } from '../plan/complete';
import { askedErrorPpm } from '../plan/required-offset';
import { ParameterError } from '../parameter-error';
import { requireLimit, solveStages, stageDesigns, wordStages } from './loop-design';
import { averagedSymbols } from '../loop/stage-loop';

/** The clock recovery loop of a plan, worked out. */
export function clockLoop(plan: CompletePlan, clock: CompleteClock): LoopDesign {
  const { signal } = plan;
  const { symbolRateBd, samplesPerSymbol } = signal;
  const updateRateHz = symbolRateBd / clock.updateInterval;
  const model = clockDetector(clock.detector, { ...signal, esN0: 10 ** (signal.esN0Db / 10) });
  const stages = solveStages('clock', clock, symbolRateBd);
  const counted = averagedSymbols(clock.updateInterval);
  const detectorGain = counted * model.gain;
  const words = clockWords({
    signal,
    clock: realisable(clock),
    bank: bankOf(signal, clock),
    detectorGain,
    stages: wordStages(stages),
  });
  requireLimit(words, '/clock/arithmetic/integratorLimitPpm');
  const oscillatorGain = clockOscillatorGain(words, samplesPerSymbol);
  const designs = stageDesigns({
    stages,
    loop: clock,
    words: words.stages,
    effective: clockGains(words, detectorGain, samplesPerSymbol),
    perUnit: detectorGain * oscillatorGain,
    updateRateHz,
    amplitude: { toleranceDb: signal.amplitudeToleranceDb, exponent: model.amplitudeExponent },
  });
  return {
    updateRateHz,
    detector: {
      name: clock.detector,
      gain: detectorGain,
      gainWithoutNoise: counted * model.gainWithoutNoise,
      oscillatorGain,
      period: model.period,
      ...errorStatistics(model, counted),
      curve: sCurve(model, counted),
    },
    stages: designs,
    headroom: clockHeadroom({
      words,
      stageNames: clock.stages.map(({ name }) => name),
      offsetPpm: askedErrorPpm(plan.environment),
      samplesPerSymbol,
    }),
    budget: clockBudget({ plan, clock, model, solved: stages.solved, words }),
    acquisition: clockAcquisition({
      plan,
      model,
      stages: designs,
      held: largestErrorHeldPpm(words, samplesPerSymbol),
    }),
    interpolator: interpolatorError({
      interpolator: clock.interpolator,
      rollOff: signal.rollOff,
      samplesPerSymbol,
      ...clock.counter,
    }),
    resolutionHz: rateResolutionHz(words, { symbolRateBd, samplesPerSymbol }),
    words,
  };
}

/**
 * The words know only what the datapath does.
 *
 * @throws {ParameterError} for a detector that has no integer form
 */
function realisable(clock: CompleteClock) {
  const { detector } = clock;
  if (detector === 'early-late') {
    throw new ParameterError('/clock/detector', 'early-late has no integer datapath; take gardner');
  }
  return { ...clock, detector };
}

const bankOf = ({ rollOff, samplesPerSymbol }: CompletePlan['signal'], { interpolator, counter }: CompleteClock) =>
  interpolator === 'polyphase'
    ? polyphaseBank({ rollOff, samplesPerSymbol, fractions: 2 ** counter.fractionBits })
    : undefined;
