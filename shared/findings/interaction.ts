import type { Finding, LoopDesign, LoopInteraction } from '../model/design';
import type { CompletePlan } from '../plan/complete';
import { fieldNumber } from '../plan/fields';
import { finding, passed, remedyUnless, say, setTo, twoDigitsDown } from './finding';
import type { Remedy, Severity } from './finding';
import { askedOf, bandwidthPointer, lastStage, loopViews } from './loop-view';
import type { StageView } from './loop-view';
import { setBandwidth } from './narrower';
import { narrowerWithin } from './swept';

/** Factor between two bandwidths below which each loop follows what the other does. */
const leastApart = 3;
/** Timing slope that the jitter of the phase must leave. */
const leastSlopeLeft = 0.9;

interface BothLoops {
  plan: CompletePlan;
  carrier: StageView;
  clock: StageView;
  interaction: LoopInteraction;
}

/** What the two loops do to each other; nothing where a plan has one. */
export function interactionFindings(
  plan: CompletePlan,
  loops: { carrier?: LoopDesign; clock?: LoopDesign },
  interaction: LoopInteraction | null,
): Finding[] {
  const [carrier, clock] = loopViews(plan, loops).map(lastStage);
  if (!interaction || !carrier || !clock) return [];
  const both = { plan, carrier, clock, interaction };
  return [...bandwidthRatio(both), ...startOrder(both), ...timingLoss(both), ...slopeLeft(both)];
}

function bandwidthRatio({ carrier, clock, interaction }: BothLoops): Finding[] {
  const ratio = interaction.bandwidthRatio;
  if (ratio === null || !(ratio > 0)) return [];
  const value = Math.max(ratio, 1 / ratio);
  const severity: Severity = value < leastApart ? 'caution' : 'pass';
  return [
    finding({
      slug: 'interaction.bandwidth-ratio',
      severity,
      title: passed(severity, 'The loops leave each other alone', 'The two loops are about equally wide'),
      value,
      limit: leastApart,
      sense: 'min',
      reason: `In the last stages one loop is ${say(value)} times as wide as the other; loops less than ${leastApart} times apart answer each other’s transients.`,
      ...remedyUnless(severity, () =>
        setBandwidth(clock, twoDigitsDown((askedOf(clock) * ratio) / (1.1 * leastApart))),
      ),
      fields: [bandwidthPointer(carrier), bandwidthPointer(clock)],
      source: 'exact noise bandwidths; a factor of 3 is common practice',
    }),
  ];
}

function startOrder({ plan, interaction: { startFirst } }: BothLoops): Finding[] {
  const severity: Severity = startFirst === 'neither' ? 'caution' : 'pass';
  return [
    finding({
      slug: 'interaction.start-order',
      severity,
      title: passed(severity, 'One loop can start alone', 'Each loop waits for the other'),
      reason:
        startFirst === 'neither'
          ? `${plan.clock?.detector} (3.1) decides each rail and needs the phase; ${plan.carrier?.detector} (2.1) needs the strobe. From a cold start neither has what it needs.`
          : `The ${startFirst === 'either' ? 'loops need' : `${startFirst} loop needs`} nothing of the other to lock.`,
      ...remedyUnless(severity, () => startsAlone(plan)),
      fields: ['/clock/detector', '/carrier/detector'],
      source: 'what each detector takes as known',
    }),
  ];
}

/** Gardner’s detector needs no phase, and two samples per symbol. */
const startsAlone = ({ signal }: CompletePlan): Remedy =>
  signal.samplesPerSymbol >= 2
    ? setTo(fieldNumber('/clock/detector'), '/clock/detector', 'gardner', 'gardner')
    : { remedy: 'Take 2 samples per symbol (1.3) and gardner (3.1), or start on known symbols.', change: null };

function timingLoss({ plan, clock, interaction }: BothLoops): Finding[] {
  const value = interaction.lossFromTimingDb;
  if (value === null) return [];
  const limit = plan.limits.implementationLossDb;
  const severity: Severity = value > limit ? 'fail' : 'pass';
  return [
    finding({
      slug: 'interaction.timing-loss',
      severity,
      title: passed(severity, 'Timing jitter costs little signal', 'Timing jitter costs too much signal'),
      value,
      limit,
      sense: 'max',
      unit: 'dB',
      reason: `A strobe that jitters lets neighbouring symbols in: ${say(value)} dB of signal over noise, of ${say(limit)} dB (5.7), and every decision of the carrier loop works with that.`,
      ...remedyUnless(severity, () => quieterClock(clock, value / limit)),
      fields: [bandwidthPointer(clock), '/limits/implementationLossDb', '/signal/rollOff'],
      source: 'slope of the pulse at its zeros under normal timing jitter, derived',
    }),
  ];
}

/** The loss goes with the variance, or less. */
function quieterClock(clock: StageView, over: number): Remedy {
  const total = clock.design.budget?.stages[clock.index]?.total ?? null;
  const within = total === null ? null : narrowerWithin(clock, 'total', total / Math.sqrt(1.2 * over));
  return within ?? { remedy: 'Raise 1.5, or take a timing detector with less pattern noise (3.1).', change: null };
}

function slopeLeft({ carrier, interaction }: BothLoops): Finding[] {
  const value = interaction.clockGainFromPhase;
  if (value === null) return [];
  const severity: Severity = value < leastSlopeLeft ? 'caution' : 'pass';
  return [
    finding({
      slug: 'interaction.timing-slope',
      severity,
      title: passed(severity, 'Phase jitter leaves the timing slope', 'Phase jitter flattens the timing slope'),
      value,
      limit: leastSlopeLeft,
      sense: 'min',
      reason: `The jitter of the carrier leaves ${say(100 * value)} % of the timing detector’s slope; ζ and BnT of clock recovery fall with it.`,
      ...remedyUnless(severity, () => steadierPhase(carrier)),
      fields: ['/clock/detector', bandwidthPointer(carrier)],
      source: 'mean cosine of the phase error; a tenth is common practice',
    }),
  ];
}

/** cos of a normal error: e^(−σ²/2), so σ may be √(−2 ln 0.9) = 26.3°. */
function steadierPhase(carrier: StageView): Remedy {
  const most = (Math.sqrt(-2 * Math.log(leastSlopeLeft)) * 180) / Math.PI;
  return (
    narrowerWithin(carrier, 'total', most) ?? {
      remedy: 'Take gardner (3.1), which needs no phase, or a quieter carrier loop.',
      change: null,
    }
  );
}
