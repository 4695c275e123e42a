import type { Finding } from '../model/design';
import type { LinearLoop } from '../loop/linear-loop';
import { gainCrossings, phaseMarginDeg } from '../loop/margins';
import { finding, passed, remedyUnless, say, sayHz, setTo, twoDigitsUp } from './finding';
import type { Remedy, Severity } from './finding';
import { askedOf, bandwidthPointer, lastStage, numberOf, pointerOf, stageName } from './loop-view';
import type { LoopView, StageView } from './loop-view';
import { loopAt, setBandwidth } from './narrower';

/** Share of the jitter limit that may stand without a word. */
const quietShare = 0.3;

/** Errors that stand while the frequency is off or drifts. */
export const dynamicsFindings = (view: LoopView): Finding[] => [...offsetError(view), ...drift(view)];

/** A loop of order 1 has no integrator: an offset leaves a standing error. */
function offsetError(view: LoopView): Finding[] {
  if (view.loop.order !== 1) return [];
  const at = lastStage(view);
  const value = standingAtOffset(view, at.result.gains.g1);
  if (value === null) return [];
  const { limit, unit, field } = jitterLimit(view);
  const severity: Severity = value > limit ? 'fail' : 'pass';
  return [
    finding({
      slug: 'dynamics.offset-error',
      severity,
      title: passed(severity, `${view.title} stands close under its offset`, `${view.title} needs an integrator`),
      value,
      limit,
      sense: 'max',
      unit,
      reason: `Order 1 (${numberOf(view, 'order')}) has no integrator: the largest offset leaves ${sayError(view, value)} for ever.`,
      ...remedyUnless(severity, () => ofOrder(view, 2)),
      fields: [pointerOf(view, 'order'), bandwidthPointer(at), field],
      source: 'offset per update over g1, exact in the linear range',
    }),
  ];
}

/** Degrees (carrier) or symbols (clock); null where the offset is not known. */
function standingAtOffset({ key, plan, design }: LoopView, g1: number): number | null {
  const { offsetHz, offsetPpm } = design.acquisition;
  if (key === 'carrier') return offsetHz === null ? null : (360 * offsetHz) / design.updateRateHz / g1;
  return offsetPpm === null ? null : (offsetPpm * 1e-6 * plan.signal.symbolRateBd) / design.updateRateHz / g1;
}

function jitterLimit({ key, plan: { limits } }: LoopView) {
  return key === 'carrier'
    ? { limit: limits.phaseJitterDeg, unit: '°', field: '/limits/phaseJitterDeg' }
    : { limit: limits.timingJitterSymbols, unit: 'symbols', field: '/limits/timingJitterSymbols' };
}

const sayError = ({ key }: LoopView, value: number): string =>
  key === 'carrier' ? `${say(value)}°` : `${say(value)} symbols`;

const ofOrder = (view: LoopView, order: number): Remedy =>
  setTo(numberOf(view, 'order'), pointerOf(view, 'order'), order, `order ${order}`);

function drift(view: LoopView): Finding[] {
  const standing = view.design.budget?.drift;
  if (!standing || standing.rateHzPerS === 0) return [];
  const at = lastStage(view);
  return standing.staticError === null ? orderForDrift(at, standing.rateHzPerS) : driftError(at, standing.staticError);
}

function orderForDrift(at: StageView, rateHzPerS: number): Finding[] {
  if (at.loop.order !== 1) return [];
  return [
    finding({
      slug: 'dynamics.order-for-drift',
      severity: 'fail',
      title: `${at.title} cannot follow the drift`,
      value: 1,
      limit: 2,
      sense: 'min',
      unit: 'order',
      reason: `The carrier drifts by ${sayHz(rateHzPerS)} each second (4.4); under a drift the error of order 1 (${numberOf(at, 'order')}) grows without end.`,
      ...ofOrder(at, 2),
      fields: [pointerOf(at, 'order'), '/environment/dopplerRateHzPerS'],
      source: 'final value of the error under a frequency ramp, exact',
    }),
  ];
}

function driftError(at: StageView, value: number): Finding[] {
  const limit = at.plan.limits.phaseJitterDeg;
  const severity: Severity = value > limit ? 'fail' : value > quietShare * limit ? 'caution' : 'pass';
  return [
    finding({
      slug: 'dynamics.drift-error',
      severity,
      title: passed(severity, 'The carrier loop follows the drift', 'The drift leaves a standing error'),
      value,
      limit: severity === 'fail' ? limit : quietShare * limit,
      sense: 'max',
      unit: '°',
      reason: `${stageName(at)} trails a drift of ${sayHz(at.plan.environment.dopplerRateHzPerS)} each second (4.4) by ${say(value)}°; 5.1 allows ${say(limit)}° for everything.`,
      ...remedyUnless(severity, () => closerLoop(at, value / (quietShare * limit))),
      fields: [
        bandwidthPointer(at),
        pointerOf(at, 'order'),
        '/environment/dopplerRateHzPerS',
        '/limits/phaseJitterDeg',
      ],
      source: 'drift per update² over g2, exact; a third of the limit is common practice',
    }),
  ];
}

/** The error goes with g2 upside down, and g2 nearly with the square of the bandwidth. */
function closerLoop(at: StageView, over: number): Remedy {
  const asked = askedOf(at);
  const enough = (loop: LinearLoop): boolean => loop.gains.g2 >= at.result.gains.g2 * over;
  for (let factor = Math.sqrt(over); factor < 30; factor *= 1.05) {
    const value = twoDigitsUp(factor * asked);
    const loop = loopAt(at, value);
    if (loop === null || (phaseMarginDeg(gainCrossings(loop), 0) ?? 0) < at.plan.limits.phaseMarginDeg) break;
    if (enough(loop)) return setBandwidth(at, value);
  }
  return {
    remedy: `No bandwidth with margin enough follows it: take order 3 (${numberOf(at, 'order')}).`,
    change: null,
  };
}
