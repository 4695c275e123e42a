import { settled } from '../../shared/plan/changes';
import type {
  Acquisition,
  Budget,
  Design,
  Detector,
  LoopDesign,
  StageDesign,
  StageJitter,
} from '../../shared/model/design';

/**
 * A design as the sheet reads it, from one that an older engine saved: what that engine did not work out is null or
 * empty, never a number. What it did work out stays as it was saved.
 */
export function completeDesign(saved: Design): Design {
  const { carrier, clock } = saved;
  return {
    ...{ solutions: [], interaction: null },
    ...saved,
    ...(carrier && { carrier: completeLoop(carrier, saved) }),
    ...(clock && { clock: completeLoop(clock, saved) }),
  };
}

const completeLoop = (loop: LoopDesign, design: Design): LoopDesign => ({
  ...{ interpolator: null },
  ...loop,
  detector: { ...unsaidOfDetector, ...loop.detector },
  stages: loop.stages.map((stage) => ({ ...unsaidOfStage(stage), ...stage })),
  acquisition: { ...unsaidOfAcquisition, ...loop.acquisition },
  budget: loop.budget && completeBudget(loop.budget, design),
});

// No screen shows the exponent itself; the ends of the amplitude below stand for no error.
const unsaidOfDetector: Partial<Detector> = {
  memoryless: false,
  spectrumAtZero: null,
  selfNoise: null,
  amplitudeExponent: 0,
  nulls: [],
};

/** Without an error of the amplitude the loop at either end is the loop itself. */
function unsaidOfStage({ stable, noiseBandwidth, damping, naturalFrequencyHz, margins }: StageDesign) {
  const end = {
    ...{ amplitudeDb: 0, gainDb: 0, stable, noiseBandwidth: noiseBandwidth.exact, damping: damping.exact },
    ...{ naturalFrequencyHz: naturalFrequencyHz.exact, phaseDeg: margins.phaseDeg },
  };
  return {
    ...{ frequencyStep: null, frequencyRamp: null, rootLocus: { ratio: [], poles: [], critical: [] } },
    ...{ bandwidthAgainstDelay: { delay: [], noiseBandwidth: [] }, amplitude: { low: end, high: end } },
  };
}

const unsaidOfAcquisition: Partial<Acquisition> = {
  pullInRangeHz: null,
  pullOutHz: null,
  lockInPpm: null,
  settlingSymbols: null,
  totalSymbols: null,
  stages: [],
  lockDetector: null,
};

const unsaidOfJitter: Partial<StageJitter> = {
  selfNoise: null,
  phaseQuantisation: null,
  wordQuantisation: null,
  drift: null,
};

function completeBudget(budget: Budget, { plan }: Design): Budget {
  const limit = budget.unit === 'deg' ? '/limits/phaseJitterDeg' : '/limits/timingJitterSymbols';
  return {
    ...{ limit: settled(plan, limit) as number, squaringLoss: null, boundRatio: null },
    ...{ drift: null, nco: null, implementationLoss: null, slip: null },
    ...budget,
    stages: budget.stages.map((stage) => ({ ...unsaidOfJitter, ...stage })),
    sweep: { ...{ selfNoise: [], phaseQuantisation: [], wordQuantisation: [], drift: [] }, ...budget.sweep },
  };
}
