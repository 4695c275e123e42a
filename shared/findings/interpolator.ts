import type { Finding } from '../model/design';
import { interpolatorError } from '../detectors/interpolator-error';
import type { InterpolatorName } from '../detectors/interpolator';
import type { CompleteClock } from '../plan/complete';
import { finding, passed, remedyUnless, say, setTo } from './finding';
import type { Remedy, Severity } from './finding';
import { numberOf, pointerOf } from './loop-view';
import type { LoopView } from './loop-view';

/** Share of the loss that a plan allows from which the interpolator's part is worth a word. */
const cautionShare = 0.5;
/** From the coarsest on. */
const finer: readonly InterpolatorName[] = ['linear', 'parabolic', 'cubic', 'polyphase'];

/** What the interpolator's error costs as if it were noise. */
export function interpolatorFindings(view: LoopView): Finding[] {
  const { interpolator } = view.design;
  if (!interpolator) return [];
  const { esN0Db } = view.plan.signal;
  const limit = view.plan.limits.implementationLossDb;
  const value = lossDb(esN0Db, interpolator.tableSignalOverErrorDb);
  const severity: Severity = value > limit ? 'fail' : value > cautionShare * limit ? 'caution' : 'pass';
  return [
    finding({
      slug: 'clock.interpolator',
      severity,
      title: passed(severity, 'The interpolator is clean enough', 'The interpolator adds too much error'),
      value,
      limit,
      sense: 'max',
      unit: 'dB',
      reason: `The ${(view.loop as CompleteClock).interpolator} interpolator leaves the signal ${say(interpolator.tableSignalOverErrorDb)} dB over its error; beside ${say(esN0Db)} dB of Es/N0 (1.5) that costs ${say(value)} dB of the ${say(limit)} dB of 5.7.`,
      ...remedyUnless(severity, () => finerInterpolator(view)),
      fields: [pointerOf(view, 'interpolator'), '/signal/samplesPerSymbol', '/limits/implementationLossDb'],
      source: 'error over the spectrum of random data, taken as noise; half of the limit is common practice',
    }),
  ];
}

/** Signal over noise and error together, below signal over noise alone, dB. */
const lossDb = (esN0Db: number, signalOverErrorDb: number): number =>
  10 * Math.log10(1 + 10 ** ((esN0Db - signalOverErrorDb) / 10));

/** The first finer interpolator that costs little, else more samples. */
function finerInterpolator(view: LoopView): Remedy {
  const { signal, limits } = view.plan;
  const { interpolator, counter } = view.loop as CompleteClock;
  const better = finer.slice(finer.indexOf(interpolator) + 1).find((name) => {
    const { rollOff, samplesPerSymbol } = signal;
    const { tableSignalOverErrorDb } = interpolatorError({ interpolator: name, rollOff, samplesPerSymbol, ...counter });
    return lossDb(signal.esN0Db, tableSignalOverErrorDb) <= cautionShare * limits.implementationLossDb;
  });
  if (better) return setTo(numberOf(view, 'interpolator'), pointerOf(view, 'interpolator'), better, better);
  return {
    remedy:
      (1 + signal.rollOff) / signal.samplesPerSymbol > 1
        ? 'Take 2 samples per symbol (1.3), and gardner or zero-crossing (3.1): fewer fold the band edge into the signal.'
        : 'Take more samples per symbol (1.3), or more bits of the fractional interval (3.9).',
    change: null,
  };
}
