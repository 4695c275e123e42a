import type { Finding } from '../model/design';
import { gainCrossings, phaseMarginDeg, stabilityLimits } from '../loop/margins';
import { finding, passed, remedyUnless, say } from './finding';
import type { Remedy, Severity } from './finding';
import { bandwidthPointer, numberOf, pointerOf, stageAt, stageName, stageViews, worstStage } from './loop-view';
import type { LoopView, StageView } from './loop-view';
import { narrowerLoop } from './narrower';
import { peakingFindings } from './peaking';
import { finerWords } from './quantisation';

/** Spare gain below which a loop is called close to its limit, dB. */
const leastGainMarginDb = 6;

export function stabilityFindings(view: LoopView): Finding[] {
  const stable = closedLoop(view);
  if (stable.severity === 'fail') return [stable];
  return [stable, ...phaseMargin(view), ...gainMargin(view), ...peakingFindings(view)];
}

function closedLoop(view: LoopView): Finding {
  const worst = worstStage(view, ({ result }) => largestModulus(result.poles));
  const at = stageViews(view).find(isUnstable) ?? worst?.at ?? stageAt(view, 0);
  const severity: Severity = isUnstable(at) ? 'fail' : 'pass';
  return finding({
    slug: 'stability.closed-loop',
    severity,
    title: passed(severity, `${view.title} is stable`, `${view.title} is unstable`),
    value: largestModulus(at.result.poles),
    limit: 1,
    sense: 'max',
    reason: isUnstable(at)
      ? unstableReason(at)
      : `Every closed-loop pole lies inside the unit circle, delay (${numberOf(view, 'delay')}) included.`,
    ...remedyUnless(severity, () =>
      narrowerLoop(at, (loop) => (phaseMarginDeg(gainCrossings(loop), 0) ?? 0) >= view.plan.limits.phaseMarginDeg),
    ),
    fields: [pointerOf(view, 'delay'), bandwidthPointer(at)],
    source: 'Jury’s test, exact',
  });
}

/** A stage whose words leave a loop without bandwidth is unstable too, unless its gains have vanished. */
const isUnstable = ({ result }: StageView): boolean =>
  !result.stable || (result.noiseBandwidth.effective === null && result.words.proportional.mantissa !== 0);

const largestModulus = (poles: number[][]): number | null =>
  poles.length ? Math.max(...poles.map((pole) => Math.hypot(...pole))) : null;

function unstableReason(at: StageView): string {
  const delay = `${numberOf(at, 'delay')}, ${at.loop.delay} updates of delay`;
  if (at.result.stable)
    return `${stageName(at)} is unstable with the gains that its words make (${delay}). It cannot lock.`;
  const most = at.result.largestDelay;
  const bound = most === null ? '' : ` These gains bear at most ${most}.`;
  return `${stageName(at)} has a pole outside the unit circle (${delay}).${bound} It cannot lock.`;
}

function phaseMargin(view: LoopView): Finding[] {
  const worst = worstStage(view, ({ result }) => negated(lesser(result.margins.phaseDeg, result.effectivePhaseDeg)));
  if (!worst) return [];
  const [value, limit] = [-worst.value, view.plan.limits.phaseMarginDeg];
  const severity: Severity = value < limit ? 'fail' : 'pass';
  return [
    finding({
      slug: 'stability.phase-margin',
      severity,
      title: passed(severity, `${view.title} has phase margin enough`, `${view.title} has too little phase margin`),
      value,
      limit,
      sense: 'min',
      unit: '°',
      reason: `${stageName(worst.at)} keeps ${say(value)}° with ${view.loop.delay} updates of delay (${numberOf(view, 'delay')}). A small margin rings and amplifies noise near the loop’s own frequency.`,
      ...remedyUnless(severity, () => widerMargin(view, worst.at, limit)),
      fields: [pointerOf(view, 'delay'), bandwidthPointer(worst.at), '/limits/phaseMarginDeg'],
      source: 'open loop with its delay, exact',
    }),
  ];
}

/** Finer words where only their rounding costs the margin; a narrower loop where the gains themselves lack it. */
function widerMargin(view: LoopView, at: StageView, limit: number): Remedy | null {
  const ofGains = at.result.margins.phaseDeg;
  if (ofGains !== null && ofGains >= limit) return finerWords(view);
  return narrowerLoop(at, (loop) => (phaseMarginDeg(gainCrossings(loop), 0) ?? 0) >= limit);
}

/** The gain rises by the error of the gain control, once more for detectors that go with the square of the amplitude. */
function gainMargin(view: LoopView): Finding[] {
  const worst = worstStage(view, ({ result }) =>
    result.margins.gainUp === null ? null : -20 * Math.log10(result.margins.gainUp),
  );
  if (!worst) return [];
  const value = -worst.value;
  const asked = view.plan.signal.amplitudeToleranceDb * (isSquareLaw(view) ? 2 : 1);
  const severity: Severity = value <= asked ? 'fail' : value < leastGainMarginDb + asked ? 'caution' : 'pass';
  const limit = leastGainMarginDb + asked;
  return [
    finding({
      slug: 'stability.gain-margin',
      severity,
      title: passed(severity, `${view.title} has gain margin enough`, `${view.title} is close to oscillation`),
      value,
      limit,
      sense: 'min',
      unit: 'dB',
      reason: `${stageName(worst.at)} turns unstable when its gain rises by ${say(value)} dB; the gain control alone may raise it by ${say(asked)} dB (1.7).`,
      ...remedyUnless(severity, () =>
        narrowerLoop(worst.at, (loop) => 20 * Math.log10(stabilityLimits(loop).margins.gainUp ?? Infinity) >= limit),
      ),
      fields: ['/signal/amplitudeToleranceDb', bandwidthPointer(worst.at)],
      source: '6 dB beside the gain control, common practice',
    }),
  ];
}

const isSquareLaw = ({ design }: LoopView): boolean =>
  design.detector.name === 'costas' || design.detector.name === 'gardner';

const negated = (value: number | null): number | null => (value === null ? null : -value);

const lesser = (a: number | null, b: number | null): number | null =>
  a === null || b === null ? (a ?? b) : Math.min(a, b);
