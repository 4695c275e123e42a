import type { Acquisition, LockFigures, StageDesign } from '../model/design';
import { sCurve, sCurveShape } from '../detectors/detector';
import type { DetectorModel } from '../detectors/detector';
import { rotationalSymmetry } from '../detectors/modulations';
import type { CompleteCarrier, CompleteClock, CompletePlan } from '../plan/complete';
import { askedErrorPpm, askedOffsetHz } from '../plan/required-offset';
import { falseLockSpacingHz, lockInOmega, unambiguousOffsetHz } from './acquisition';
import type { LoopDynamics } from './acquisition';
import { pullIn } from './pull-in';
import { pullOutOverOmega } from './pull-out';
import { acquisitionTime } from './stage-times';

export interface AcquisitionInput {
  plan: CompletePlan;
  model: DetectorModel;
  /** Every stage, the one that runs first before the others. */
  stages: StageDesign[];
  /** Largest offset that the integrator holds, Hz (carrier) or ppm (clock). */
  held: number;
}

/** Range, ambiguity and time of a carrier loop; what is an estimate says so in its field. */
export function carrierAcquisition(input: AcquisitionInput & { lockDetector: LockFigures | null }): Acquisition {
  const { plan, stages, held, lockDetector } = input;
  const { signal, environment } = plan;
  const carrier = plan.carrier as CompleteCarrier;
  const symmetry = rotationalSymmetry[signal.modulation];
  const symbolRateBd = signal.symbolRateBd;
  const offsetHz = askedOffsetHz(environment);
  const found = estimates(input, carrier, offsetHz === null ? null : 2 * Math.PI * offsetHz);
  return {
    unambiguousHz: unambiguousOffsetHz({ symmetry, symbolRateBd, averaged: carrier.updateInterval }),
    falseLockSpacingHz: falseLockSpacingHz(symmetry, symbolRateBd),
    offsetHz,
    largestOffsetHz: held,
    offsetPpm: null,
    largestOffsetPpm: null,
    lockInHz: inHz(found.lockIn),
    pullInSymbols: found.pullInSymbols,
    pullInRangeHz: inHz(found.reach),
    pullOutHz: inHz(found.pullOut),
    lockInPpm: null,
    ...acquisitionTime({ loop: carrier, stages, pullInSymbols: found.pullInSymbols }),
    lockDetector,
  };
}

/** Range and time of a clock loop: a clock error slips one symbol after another, an S-curve of period 1 symbol. */
export function clockAcquisition(input: AcquisitionInput): Acquisition {
  const { plan, stages, held } = input;
  const clock = plan.clock as CompleteClock;
  const offsetPpm = askedErrorPpm(plan.environment);
  const found = estimates(input, clock, offsetPpm * 1e-6 * plan.signal.symbolRateBd);
  return {
    unambiguousHz: null,
    falseLockSpacingHz: null,
    offsetHz: null,
    largestOffsetHz: null,
    offsetPpm,
    largestOffsetPpm: held,
    lockInHz: null,
    pullInSymbols: found.pullInSymbols,
    pullInRangeHz: null,
    pullOutHz: null,
    lockInPpm: found.lockIn === null ? null : (1e6 * found.lockIn) / plan.signal.symbolRateBd,
    ...acquisitionTime({ loop: clock, stages, pullInSymbols: found.pullInSymbols }),
    lockDetector: null,
  };
}

const inHz = (omega: number | null): number | null => (omega === null ? null : omega / (2 * Math.PI));

/** In the S-curve's own unit per second, radians or symbols. */
interface Estimates {
  lockIn: number | null;
  pullOut: number | null;
  /** Largest offset from which a slipping loop is driven towards lock. */
  reach: number | null;
  pullInSymbols: number | null;
}

const noEstimates: Estimates = { lockIn: null, pullOut: null, reach: null, pullInSymbols: null };

/** @param offset drift of the error that has to be pulled in, the S-curve's unit per second; null where it is not known */
function estimates({ plan, model, stages }: AcquisitionInput, loop: LoopTiming, offset: number | null): Estimates {
  const first = stages[0] as StageDesign;
  if (!first.stable) return noEstimates;
  if (loop.order === 1) return proportional(plan, model, first, loop, offset);
  const dynamics = loopDynamics(first);
  if (loop.order !== 2 || !dynamics) return noEstimates;
  return integrating(plan, model, first, { loop, dynamics, offset });
}

type LoopTiming = Pick<CompleteCarrier | CompleteClock, 'order' | 'updateInterval' | 'delay'>;

/** A loop of order 1 has the same range for lock-in, pull-out and pull-in: g1·max s per update, and locks or never does. */
function proportional(
  { signal }: CompletePlan,
  model: DetectorModel,
  { gains }: StageDesign,
  { updateInterval }: LoopTiming,
  offset: number | null,
): Estimates {
  const range = (gains.g1 * sCurveShape(model).largest * signal.symbolRateBd) / updateInterval;
  return {
    lockIn: range,
    pullOut: range,
    reach: range,
    pullInSymbols: offset !== null && offset <= range ? 0 : null,
  };
}

interface Integrating {
  loop: LoopTiming;
  dynamics: LoopDynamics;
  offset: number | null;
}

function integrating(
  { signal }: CompletePlan,
  model: DetectorModel,
  { gains: { g1, g2 } }: StageDesign,
  { loop: { updateInterval, delay }, dynamics, offset }: Integrating,
): Estimates {
  const shape = sCurveShape(model);
  const lockIn = lockInOmega(dynamics, shape);
  const perSymbol = (offset ?? 0) / signal.symbolRateBd;
  const { symbols, reach } = pullIn({ g1, g2, updateInterval, delay }, shape.powers, model.period, perSymbol);
  const slips = (offset ?? 0) > lockIn;
  return {
    lockIn,
    pullOut: dynamics.omegaN * pullOutOf(model, dynamics),
    reach: reach * signal.symbolRateBd,
    // Within the lock-in range no cycle slips.
    pullInSymbols: offset === null ? null : slips ? symbols : 0,
  };
}

/** Pull-out range over ωn, from the right half of the S-curve. */
function pullOutOf(model: DetectorModel, { damping }: LoopDynamics): number {
  const { x, noisy } = sCurve(model, 1 / model.gain);
  const middle = (x.length - 1) / 2;
  return pullOutOverOmega(noisy.slice(middle), (x[middle + 1] as number) - (x[middle] as number), damping);
}

function loopDynamics({ damping, naturalFrequencyHz }: StageDesign): LoopDynamics | null {
  if (damping.exact === null || naturalFrequencyHz.exact === null) return null;
  return { damping: damping.exact, omegaN: 2 * Math.PI * naturalFrequencyHz.exact };
}
