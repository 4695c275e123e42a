import type { AmplitudeEnd, Finding, StageDesign } from '../model/design';
import { scaledLoop } from '../loop/linear-loop';
import { gainCrossings, phaseMarginDeg } from '../loop/margins';
import { finding, passed, remedyUnless, say, setTo, twoDigitsUp } from './finding';
import type { Remedy, Severity } from './finding';
import { bandwidthPointer, pointerOf, stageName, stageViews } from './loop-view';
import type { LoopView, StageView } from './loop-view';
import { narrowerLoop } from './narrower';
import { fieldNumber } from '../plan/fields';

/** Damping below which a loop rings and a narrower ωn no longer makes it quieter. */
const leastDamping = 0.5;
/** Change of the noise bandwidth that still goes by the same name, %. */
const mostBandwidthChange = 50;

/** The loop at both ends of what the gain control leaves open; nothing where the plan has no such error. */
export function amplitudeFindings(view: LoopView): Finding[] {
  if (view.plan.signal.amplitudeToleranceDb === 0 || view.design.stages.some(({ stable }) => !stable)) return [];
  return [...damping(view), ...margin(view), ...bandwidth(view)];
}

/** One stage at one end of the gain control's error. */
interface StageEnd {
  at: StageView;
  end: AmplitudeEnd;
  value: number;
}

/** The end at which a measure is largest, over every stage; ends without one are left out. */
function worstEnd(view: LoopView, measure: (end: AmplitudeEnd, result: StageDesign) => number | null): StageEnd | null {
  let worst: StageEnd | null = null;
  for (const at of stageViews(view)) {
    const { low, high } = at.result.amplitude;
    for (const end of [low, high]) {
      const value = measure(end, at.result);
      if (value !== null && (!worst || value > worst.value)) worst = { at, end, value };
    }
  }
  return worst;
}

const sayEnd = ({ amplitudeDb, gainDb }: AmplitudeEnd): string =>
  `with the amplitude ${say(amplitudeDb)} dB off (1.7), the loop gain ${say(gainDb)} dB`;

function damping(view: LoopView): Finding[] {
  if (view.loop.order !== 2) return [];
  const worst = worstEnd(view, (end) => (end.damping === null ? null : -end.damping));
  if (!worst) return [];
  const value = -worst.value;
  const severity: Severity = value < leastDamping ? 'caution' : 'pass';
  return [
    finding({
      slug: 'amplitude.damping',
      severity,
      title: passed(severity, `${view.title} keeps its damping`, `${view.title} rings at amplitude’s end`),
      value,
      limit: leastDamping,
      sense: 'min',
      reason: `${stageName(worst.at)} has ζ ${say(value)} ${sayEnd(worst.end)}. Below ${leastDamping} it rings, and its noise bandwidth rises again.`,
      ...remedyUnless(severity, () => moreDamping(worst.at, value)),
      fields: [pointerOf(view, `stages/${worst.at.index}/damping`), '/signal/amplitudeToleranceDb'],
      source: 'R. Best, Phase-Locked Loops: Bn is least at ζ = 1/2; poles with the delay, exact',
    }),
  ];
}

/** Damping at the end goes with the damping that is asked for. */
function moreDamping({ key, index, stage }: StageView, reached: number): Remedy {
  const pointer = `/${key}/stages/${index}/damping`;
  const value = twoDigitsUp(((stage.damping as number) * 1.02 * leastDamping) / reached);
  return reached > 0 && value <= 2
    ? setTo(`${fieldNumber(pointer)} of ${stage.name}`, pointer, value, say(value))
    : { remedy: 'Hold the gain control tighter (1.7), or shorten the delay.', change: null };
}

function margin(view: LoopView): Finding[] {
  const limit = view.plan.limits.phaseMarginDeg;
  const worst = worstEnd(view, ({ stable, phaseDeg }) => (stable ? phaseDeg && -phaseDeg : 0));
  if (!worst) return [];
  const value = 0 - worst.value;
  const severity: Severity = value < limit ? 'fail' : 'pass';
  return [
    finding({
      slug: 'amplitude.phase-margin',
      severity,
      title: passed(
        severity,
        `${view.title} keeps margin in amplitude`,
        `${view.title} loses margin at amplitude’s end`,
      ),
      value,
      limit,
      sense: 'min',
      unit: '°',
      reason: `${stageName(worst.at)} keeps ${say(value)}° ${sayEnd(worst.end)}; 5.3 asks for ${say(limit)}°.`,
      ...remedyUnless(severity, () => narrowerAtEnds(worst.at, limit) ?? tighterGain),
      fields: ['/signal/amplitudeToleranceDb', bandwidthPointer(worst.at), '/limits/phaseMarginDeg'],
      source: 'open loop with its delay at both ends of the gain control, exact',
    }),
  ];
}

const tighterGain: Remedy = { remedy: 'Hold the gain control tighter (1.7), or raise the damping.', change: null };

function narrowerAtEnds(at: StageView, limit: number): Remedy | null {
  const ratios = [at.result.amplitude.low, at.result.amplitude.high].map(({ gainDb }) => 10 ** (gainDb / 20));
  return narrowerLoop(at, (loop) =>
    ratios.every((ratio) => (phaseMarginDeg(gainCrossings(scaledLoop(loop, ratio)), 0) ?? 0) >= limit),
  );
}

function bandwidth(view: LoopView): Finding[] {
  const worst = worstEnd(view, ({ noiseBandwidth: end }, { noiseBandwidth: { exact } }) =>
    end === null || exact === null ? null : 100 * Math.abs(end / exact - 1),
  );
  if (!worst) return [];
  const severity: Severity = worst.value > mostBandwidthChange ? 'caution' : 'pass';
  return [
    finding({
      slug: 'amplitude.bandwidth',
      severity,
      title: passed(severity, `${view.title} keeps its bandwidth`, `${view.title}: amplitude moves the bandwidth`),
      value: worst.value,
      limit: mostBandwidthChange,
      sense: 'max',
      unit: '%',
      reason: `${stageName(worst.at)} has BnT ${say(worst.end.noiseBandwidth as number)} instead of ${say(worst.at.result.noiseBandwidth.exact as number)} ${sayEnd(worst.end)}. Jitter and acquisition time follow it.`,
      ...remedyUnless(severity, () => steadierAmplitude(view)),
      fields: ['/signal/amplitudeToleranceDb', pointerOf(view, 'detector')],
      source: 'noise bandwidth at both ends of the gain control, exact; the limit is common practice',
    }),
  ];
}

const steadierAmplitude = ({ design: { detector } }: LoopView): Remedy => ({
  remedy:
    detector.amplitudeExponent > 1
      ? `Hold the gain control tighter (1.7): ${detector.name} goes with power ${detector.amplitudeExponent} of the amplitude.`
      : 'Hold the gain control tighter (1.7).',
  change: null,
});
