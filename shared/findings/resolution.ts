import type { Finding } from '../model/design';
import { integralDeadBands } from '../fixed-point/dead-band';
import type { DeadBand } from '../fixed-point/dead-band';
import { errorLsb } from '../fixed-point/loop-scale';
import { finding, passed, remedyUnless, say, setTo } from './finding';
import type { Remedy, Severity } from './finding';
import { lastStage, numberOf, pointerOf, stageName } from './loop-view';
import type { LoopView, StageView } from './loop-view';

/** Share of the jitter limit that a standing error may take unnoticed. */
const quietShare = 0.1;

/** Errors so small that they leave the integrator of an order-2 loop where it is. */
export function resolutionFindings(view: LoopView): Finding[] {
  if (view.loop.order < 2) return [];
  const at = lastStage(view);
  const band = integralDeadBands(view.design.words)[at.index] as DeadBand;
  const reach = Math.max(-band.least, band.most);
  const value = reach * lsbOfOffset(view);
  const limit = view.key === 'carrier' ? view.plan.limits.phaseJitterDeg : view.plan.limits.timingJitterSymbols;
  const stuck = reach >= 2 ** (view.loop.arithmetic.errorBits - 1) - 1;
  const severity: Severity =
    stuck || value > limit ? 'fail' : value > quietShare * limit && !isDithered(view, reach) ? 'caution' : 'pass';
  return [
    finding({
      slug: 'resolution.integrator-dead-band',
      severity,
      title: passed(
        severity,
        `${view.title}: the integrator sees small errors`,
        stuck ? `${view.title}: the integrator never moves` : `${view.title}: small errors never integrate`,
      ),
      value,
      limit,
      sense: 'max',
      unit: view.key === 'carrier' ? '°' : 'symbols',
      reason: reasonOf(view, { at, value, reach, stuck }),
      ...remedyUnless(severity, () => moreGuardBits(view, reach)),
      fields: [pointerOf(view, 'arithmetic/guardBits'), pointerOf(view, 'arithmetic/errorBits')],
      source: 'dead band of the rounding, exact',
    }),
  ];
}

/** One error LSB as degrees or symbols at lock. */
function lsbOfOffset({ key, loop, design }: LoopView): number {
  const perLsb = errorLsb(loop.arithmetic) / design.detector.gain;
  return key === 'carrier' ? (perLsb * 180) / Math.PI : perLsb;
}

/** Noise that is larger than the dead band carries small errors over it. */
function isDithered({ loop, design: { detector } }: LoopView, reach: number): boolean {
  return detector.variance !== null && Math.sqrt(detector.variance) > reach * errorLsb(loop.arithmetic);
}

function reasonOf(
  view: LoopView,
  { at, value, reach, stuck }: { at: StageView; value: number; reach: number; stuck: boolean },
): string {
  if (reach === 0) return `${stageName(at)} moves its integrator for every error but 0.`;
  const amount = view.key === 'carrier' ? `${say(value)}°` : `${say(value)} symbols`;
  if (stuck)
    return `${stageName(at)} rounds every increment to 0: the loop has silently lost its integrator and keeps a standing error.`;
  return `${stageName(at)} rounds increments of up to ${amount} to 0. An error that small stands for ever unless noise carries it over.`;
}

/** Each guard bit halves the dead band; the integrator must keep the range that it needs. */
function moreGuardBits(view: LoopView, reach: number): Remedy | null {
  const { guardBits, integratorBits } = view.loop.arithmetic;
  const more = Math.ceil(Math.log2(reach + 1));
  const spare = view.design.headroom.find(({ node }) => node === 'integrator')?.headroomBits ?? Infinity;
  const path = 'arithmetic/guardBits';
  if (spare >= more && guardBits + more < integratorBits) {
    return setTo(numberOf(view, path), pointerOf(view, path), guardBits + more, `${guardBits + more} bits`);
  }
  return {
    remedy: `Widen ${numberOf(view, 'arithmetic/integratorBits')} and ${numberOf(view, path)} by ${more} bits each.`,
    change: null,
  };
}
