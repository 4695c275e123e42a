import type { Finding } from '../model/design';
import { carrierDetector, carrierDetectorsFor } from '../detectors/carrier';
import { ParameterError } from '../parameter-error';
import { finding, passed, remedyUnless, say, setTo } from './finding';
import type { Remedy, Severity } from './finding';
import { bandwidthPointer, lastStage, numberOf, pointerOf } from './loop-view';
import type { LoopView } from './loop-view';
import { narrowerWithin } from './swept';

/** Twice the variance of a detector that knows the symbols, dB. */
const mostSquaringLossDb = 3;

/** What a detector loses against known symbols, and what the jitter costs the decisions. */
export const lossFindings = (view: LoopView): Finding[] => [...squaringLoss(view), ...implementationLoss(view)];

function squaringLoss(view: LoopView): Finding[] {
  const loss = view.design.budget?.squaringLoss ?? null;
  if (loss === null) return [];
  const value = 10 * Math.log10(loss);
  const severity: Severity = value > mostSquaringLossDb ? 'caution' : 'pass';
  return [
    finding({
      slug: 'noise.squaring-loss',
      severity,
      title: passed(severity, 'The phase detector loses little', 'The phase detector squares its noise'),
      value,
      limit: mostSquaringLossDb,
      sense: 'max',
      unit: 'dB',
      reason: `At ${say(view.plan.signal.esN0Db)} dB (1.5) ${view.design.detector.name} on ${view.plan.signal.modulation} makes ${say(value)} dB more phase jitter than known symbols would, and more with every dB less.`,
      ...remedyUnless(severity, () => quieterDetector(view, loss)),
      fields: [pointerOf(view, 'detector'), '/signal/esN0Db'],
      source: 'variance over slope against the modified Cramér–Rao bound; 3 dB is common practice',
    }),
  ];
}

/** Another detector that needs no known symbols, where one stays within the limit. */
function quieterDetector(view: LoopView, present: number): Remedy {
  const name = view.design.detector.name;
  const others = carrierDetectorsFor(view.plan.signal.modulation).filter(
    (other) => other !== name && other !== 'known-symbols',
  );
  const least = others.map((other) => ({ other, loss: lossOf(view, other) })).sort((a, b) => a.loss - b.loss)[0];
  if (least && least.loss < present && 10 * Math.log10(least.loss) <= mostSquaringLossDb)
    return setTo(numberOf(view, 'detector'), pointerOf(view, 'detector'), least.other, least.other);
  return { remedy: 'Raise 1.5, or work on known symbols where the waveform has them.', change: null };
}

/** Variance over slope of uncorrelated errors, against A²/(2γ) of known symbols; none that noise leaves no slope. */
function lossOf({ plan: { signal } }: LoopView, name: Parameters<typeof carrierDetector>[0]): number {
  const esN0 = 10 ** (signal.esN0Db / 10);
  try {
    const { covariance, gain } = carrierDetector(name, { ...signal, esN0 });
    return covariance ? (2 * esN0 * (covariance[0] as number)) / gain ** 2 : Infinity;
  } catch (error) {
    if (error instanceof ParameterError) return Infinity;
    throw error;
  }
}

function implementationLoss(view: LoopView): Finding[] {
  const lossDb = view.design.budget?.implementationLoss?.lossDb ?? null;
  if (lossDb === null) return [];
  const at = lastStage(view);
  const limit = view.plan.limits.implementationLossDb;
  const severity: Severity = lossDb > limit ? 'fail' : 'pass';
  return [
    finding({
      slug: 'noise.implementation-loss',
      severity,
      title: passed(severity, 'Jitter costs the decisions little', 'Jitter costs the decisions too much'),
      value: lossDb,
      limit,
      sense: 'max',
      unit: 'dB',
      reason: `The jitter of the last stage makes as many wrong symbols as ${say(lossDb)} dB less signal would; 5.7 allows ${say(limit)} dB.`,
      ...remedyUnless(severity, () => lessLoss(view, lossDb / limit)),
      fields: [bandwidthPointer(at), '/limits/implementationLossDb', '/signal/esN0Db'],
      source: 'exact symbol error rate averaged over a normal phase error',
    }),
  ];
}

/** A small loss goes with the variance; a little more is taken off because a large one goes faster. */
function lessLoss(view: LoopView, over: number): Remedy {
  const at = lastStage(view);
  const total = view.design.budget?.stages[at.index]?.total ?? null;
  const within = total === null ? null : narrowerWithin(at, 'total', total / Math.sqrt(1.2 * over));
  return (
    within ?? {
      remedy: 'No bandwidth keeps the limit: take a quieter oscillator (4.6), raise 1.5, or allow more (5.7).',
      change: null,
    }
  );
}
