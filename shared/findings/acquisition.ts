import type { Finding } from '../model/design';
import { largestOffsetHeldHz } from '../fixed-point/headroom';
import type { CarrierWords } from '../fixed-point/words';
import { finding, passed, remedyUnless, say, sayHz, twoDigitsUp } from './finding';
import type { Remedy, Severity } from './finding';
import { askedOf, bandwidthPointer, numberOf, pointerOf, stageAt, stageName } from './loop-view';
import type { LoopView, StageView } from './loop-view';
import { fieldNumber } from '../plan/fields';
import { loopAt, setBandwidth } from './narrower';
import { inOneUnit } from './prefix';
import { widerIntegrator } from './wider-integrator';

/** A pull-in estimate is good to about this factor. */
const estimateFactor = 2;
/** Time that a wider loop leaves free: its bandwidth does not grow quite as the one that is asked for. */
const spareTime = 1.1;

export const acquisitionFindings = (view: LoopView): Finding[] => [
  ...(view.key === 'carrier' ? [...ambiguity(view), ...integratorRange(view), ...pullInRange(view)] : []),
  ...pullIn(view),
];

function ambiguity(view: LoopView): Finding[] {
  const { offsetHz, unambiguousHz, falseLockSpacingHz } = view.design.acquisition;
  if (offsetHz === null || unambiguousHz === null) return [];
  const severity: Severity = offsetHz >= unambiguousHz ? 'fail' : 'pass';
  return [
    finding({
      slug: 'acquisition.ambiguity',
      severity,
      title: passed(severity, 'The carrier offset is unambiguous', 'The carrier can lock at false offsets'),
      ...inOneUnit(offsetHz, unambiguousHz),
      sense: 'max',
      reason: `The carrier can be ±${sayHz(offsetHz)} off (4.2, 4.3); ${view.plan.signal.modulation} repeats every ${sayHz(falseLockSpacingHz as number)}, so beyond ±${sayHz(unambiguousHz)} the loop settles on the wrong offset with a quiet error.`,
      ...remedyUnless(severity, () => ({
        remedy: `Search the offset in steps of at most ${sayHz(unambiguousHz)}, or lower 4.2 and 4.3.`,
        change: null,
      })),
      fields: ['/environment/carrierTolerancePpm', '/environment/dopplerHz', '/signal/symbolRateBd'],
      source: 'rotational symmetry of the modulation, exact',
    }),
  ];
}

function integratorRange(view: LoopView): Finding[] {
  const { offsetHz, largestOffsetHz } = view.design.acquisition;
  if (offsetHz === null || largestOffsetHz === null || view.loop.order < 2) return [];
  const severity: Severity = largestOffsetHz < offsetHz ? 'fail' : 'pass';
  const path = limitHz(view) === undefined ? 'arithmetic/integratorBits' : 'arithmetic/integratorLimitHz';
  return [
    finding({
      slug: 'acquisition.integrator-range',
      severity,
      title: passed(severity, 'The integrator reaches the carrier', 'The integrator stops short of the carrier'),
      ...inOneUnit(largestOffsetHz, offsetHz),
      sense: 'min',
      reason:
        severity === 'pass'
          ? `It holds ±${sayHz(largestOffsetHz)}; the carrier can be ±${sayHz(offsetHz)} off (4.2, 4.3).`
          : `${numberOf(view, path)} stops short of the carrier offset: it holds ±${sayHz(largestOffsetHz)}; the carrier can be ±${sayHz(offsetHz)} off (4.2, 4.3). Beyond that the loop never locks.`,
      ...remedyUnless(severity, () =>
        widerIntegrator(view, {
          asked: offsetHz,
          word: wordRangeHz(view),
          limit: limitHz(view),
          limitPath: 'arithmetic/integratorLimitHz',
          text: (value) => `±${sayHz(value)}`,
        }),
      ),
      fields: [pointerOf(view, path), '/environment/carrierTolerancePpm', '/environment/dopplerHz'],
      source: 'follows from the datapath, exact',
    }),
  ];
}

const limitHz = ({ loop }: LoopView): number | undefined =>
  (loop.arithmetic as { integratorLimitHz?: number }).integratorLimitHz;

/** What the integrator's word alone would hold, Hz. */
const wordRangeHz = ({ design, plan }: LoopView): number =>
  largestOffsetHeldHz({ ...(design.words as CarrierWords), integratorLimit: null }, plan.signal.symbolRateBd);

/** Share of the pull-in range above which the time goes up steeply and the estimate is not to be leant on. */
const safeShare = 0.8;

function pullInRange(view: LoopView): Finding[] {
  const { offsetHz, lockInHz, pullInRangeHz } = view.design.acquisition;
  if (offsetHz === null || lockInHz === null || pullInRangeHz === null || offsetHz <= lockInHz) return [];
  const severity: Severity =
    offsetHz >= pullInRangeHz ? 'fail' : offsetHz > safeShare * pullInRangeHz ? 'caution' : 'pass';
  const first = stageAt(view, 0);
  return [
    finding({
      slug: 'acquisition.pull-in-range',
      severity,
      title: passed(severity, 'The loop is pulled towards lock', 'The delay turns the pull-in round'),
      ...inOneUnit(offsetHz, pullInRangeHz),
      sense: 'max',
      reason: `While the loop slips, the lag of its updates turns the beat; beyond about ±${sayHz(pullInRangeHz)} the integrator is driven away from lock. The carrier can be ±${sayHz(offsetHz)} off (4.2, 4.3).`,
      ...remedyUnless(severity, () => ({
        remedy: `Search the offset in steps of ±${sayHz(Math.max(lockInHz, safeShare * pullInRangeHz))}, or shorten ${numberOf(view, 'delay')} or ${numberOf(view, 'updateInterval')}.`,
        change: null,
      })),
      fields: [pointerOf(view, 'delay'), bandwidthPointer(first), '/environment/carrierTolerancePpm'],
      source: 'describing function of the slipping loop, derived',
      estimate: true,
    }),
  ];
}

function pullIn(view: LoopView): Finding[] {
  const estimate = view.design.acquisition.pullInSymbols;
  const first = stageAt(view, 0);
  if (estimate === null || first.result.settlingUpdates === null) return [];
  const value = Math.round(estimate + first.result.settlingUpdates * view.loop.updateInterval);
  const { limit, pointer } = timeAllowed(view, first);
  const severity: Severity = estimateFactor * value > limit ? 'caution' : 'pass';
  return [
    finding({
      slug: 'acquisition.pull-in',
      severity,
      title: passed(
        severity,
        `${view.title} pulls in in time`,
        value > limit ? `${view.title} pulls in too slowly` : `${view.title}: pull-in leans on an estimate`,
      ),
      value,
      limit,
      sense: 'max',
      unit: 'symbols',
      reason: `${stageName(first)} takes about ${say(value)} symbols from the largest offset, settling included; ${fieldNumber(pointer)} allows ${say(limit, 6)}. Noise makes it longer, and the estimate is good to about a factor of two.`,
      ...remedyUnless(severity, () => faster(view, first, limit)),
      fields: [bandwidthPointer(first), pointer],
      source: 'F. Gardner, Phaselock Techniques, 2005',
      estimate: true,
    }),
  ];
}

/** The acquisition limit, or the end of the first stage where that comes before. */
function timeAllowed(view: LoopView, first: StageView): { limit: number; pointer: string } {
  const most = view.plan.limits.acquisitionSymbols;
  const symbols = view.loop.stages.length > 1 ? first.stage.until?.symbols : undefined;
  return symbols !== undefined && symbols < most
    ? { limit: symbols, pointer: pointerOf(view, 'stages/0/until/symbols') }
    : { limit: most, pointer: '/limits/acquisitionSymbols' };
}

function faster(view: LoopView, first: StageView, limit: number): Remedy | null {
  const pull = view.design.acquisition.pullInSymbols as number;
  const settling = (first.result.settlingUpdates as number) * view.loop.updateInterval;
  const time = (factor: number): number => scaledTime({ pull, settling }, factor);
  let factor = 1;
  while (spareTime * estimateFactor * time(factor) > limit && factor < 100) factor *= 1.05;
  const value = twoDigitsUp(factor * askedOf(first));
  return isBearable(first, factor) && loopAt(first, value) !== null ? setBandwidth(first, value) : moreTime(view);
}

/** Pull-in time falls with the third power of the bandwidth, settling with the first. */
export const scaledTime = ({ pull, settling }: AcquisitionTime, factor: number): number =>
  pull / factor ** 3 + settling / factor;

export interface AcquisitionTime {
  /** Pull-in from the largest offset of the plan, symbols. */
  pull: number;
  settling: number;
}

/** Whether a stage that is wider by a factor still bears its delay. */
function isBearable({ loop, result, stage }: StageView, factor: number): boolean {
  const product = loop.delay * (result.noiseBandwidth.exact ?? 0) * loop.updateInterval * factor;
  return factor < 100 && product <= 0.1 && (stage.noiseBandwidth ?? 0) * factor * loop.updateInterval <= 0.1;
}

/** A replay covers the carrier loop alone. */
const moreTime = ({ key }: LoopView): Remedy => ({
  remedy:
    key === 'carrier'
      ? 'Replay the range of offsets, or allow more symbols.'
      : 'Allow more symbols, or shorten the delay.',
  change: null,
});
