import type { Acquisition, StageDesign } from '../model/design';
import { sCurveShape } from '../detectors/detector';
import type { DetectorModel } from '../detectors/detector';
import { rotationalSymmetry } from '../detectors/modulations';
import type { CompleteCarrier, CompleteClock, CompletePlan } from '../plan/complete';
import { askedErrorPpm, askedOffsetHz } from '../plan/required-offset';
import { falseLockSpacingHz, lockInOmega, unambiguousOffsetHz } from './acquisition';
import type { LoopDynamics } from './acquisition';
import { pullIn } from './pull-in';

export interface AcquisitionInput {
  plan: CompletePlan;
  model: DetectorModel;
  /** The stage that runs first. */
  first: StageDesign;
  /** Largest offset that the integrator holds, Hz (carrier) or ppm (clock). */
  held: number;
}

/** Range and ambiguity of a carrier loop. Lock-in and pull-in are estimates, and are there for order 2 only. */
export function carrierAcquisition({ plan, model, first, held }: AcquisitionInput): Acquisition {
  const { signal, carrier, environment } = plan;
  const symmetry = rotationalSymmetry[signal.modulation];
  const symbolRateBd = signal.symbolRateBd;
  const offsetHz = askedOffsetHz(environment);
  const averaged = carrier?.updateInterval ?? 1;
  const offsetOmega = offsetHz === null ? null : 2 * Math.PI * offsetHz;
  return {
    unambiguousHz: unambiguousOffsetHz({ symmetry, symbolRateBd, averaged }),
    falseLockSpacingHz: falseLockSpacingHz(symmetry, symbolRateBd),
    offsetHz,
    largestOffsetHz: held,
    offsetPpm: null,
    largestOffsetPpm: null,
    ...unknown,
    ...estimates({ first, model, loop: plan.carrier as CompleteCarrier }, { offsetOmega, symbolRateBd }),
  };
}

/** Range of a clock loop: a clock error slips one symbol after another, an S-curve of period 1 symbol. */
export function clockAcquisition({ plan, model, first, held }: AcquisitionInput): Acquisition {
  const symbolRateBd = plan.signal.symbolRateBd;
  const offsetPpm = askedErrorPpm(plan.environment);
  const offsetOmega = offsetPpm * 1e-6 * symbolRateBd;
  const { pullInSymbols } = estimates(
    { first, model, loop: plan.clock as CompleteClock },
    { offsetOmega, symbolRateBd },
  );
  return {
    unambiguousHz: null,
    falseLockSpacingHz: null,
    offsetHz: null,
    largestOffsetHz: null,
    offsetPpm,
    largestOffsetPpm: held,
    ...unknown,
    lockInHz: null,
    pullInSymbols,
    pullInRangeHz: null,
  };
}

const unknown = {
  pullOutHz: null,
  lockInPpm: null,
  settlingSymbols: null,
  totalSymbols: null,
  stages: [],
  lockDetector: null,
};

interface EstimateInput {
  first: StageDesign;
  model: DetectorModel;
  loop: Pick<CompleteCarrier | CompleteClock, 'updateInterval' | 'delay'>;
}

/** @param offsetOmega drift of the error that has to be pulled in, in the S-curve's own unit per second */
function estimates(
  { first, model, loop }: EstimateInput,
  { offsetOmega, symbolRateBd }: { offsetOmega: number | null; symbolRateBd: number },
) {
  const dynamics = loopDynamics(first);
  if (!dynamics) return { lockInHz: null, pullInSymbols: null, pullInRangeHz: null };
  const shape = sCurveShape(model);
  const lockIn = lockInOmega(dynamics, shape);
  const { updateInterval, delay } = loop;
  const { g1, g2 } = first.gains;
  const offset = (offsetOmega ?? 0) / symbolRateBd;
  const { symbols, reach } = pullIn({ g1, g2, updateInterval, delay }, shape.powers, model.period, offset);
  const slips = (offsetOmega ?? 0) > lockIn;
  return {
    lockInHz: lockIn / (2 * Math.PI),
    // Within the lock-in range no cycle slips.
    pullInSymbols: offsetOmega === null ? null : slips ? symbols : 0,
    pullInRangeHz: (reach * symbolRateBd) / (2 * Math.PI),
  };
}

function loopDynamics({ damping, naturalFrequencyHz, stable }: StageDesign): LoopDynamics | null {
  if (!stable || damping.exact === null || naturalFrequencyHz.exact === null) return null;
  return { damping: damping.exact, omegaN: 2 * Math.PI * naturalFrequencyHz.exact };
}
