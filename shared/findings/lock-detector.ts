import type { Finding, LockFigures, LockThreshold } from '../model/design';
import { fieldNumber } from '../plan/fields';
import { finding, followedBy, passed, remedyUnless, say, setTo } from './finding';
import type { Remedy, Severity } from './finding';
import { pointerOf } from './loop-view';
import type { LoopView } from './loop-view';

/** Share of the blocks that may say the wrong thing. */
const mostWrong = 1e-3;
/** Deviations of a normal statistic beyond which one value in a thousand lies, and a little more. */
const deviations = 3.2;
const longestBlock = 1024;

/** What the thresholds on the lock statistic let through: one finding a kind, of the worst threshold. */
export function lockDetectorFindings(view: LoopView): Finding[] {
  const figures = view.design.acquisition.lockDetector;
  if (!figures || figures.thresholds.length === 0) return [];
  return [reachable(view, figures), falseAlarm(view, figures), miss(view, figures)];
}

const worstBy = (figures: LockFigures, measure: (threshold: LockThreshold) => number): LockThreshold =>
  [...figures.thresholds].sort((a, b) => measure(b) - measure(a))[0] as LockThreshold;

/** Where a threshold stands in the plan. */
function thresholdPointer(view: LoopView, { stage }: LockThreshold): string {
  const index = view.loop.stages.findIndex(({ name }) => name === stage);
  return pointerOf(view, index < 0 ? 'lockDetector/threshold' : `stages/${index}/until/lockMetric`);
}

const sayShare = (share: number): string => (share < 1e-12 ? 'next to none' : `a share of ${say(share, 2)}`);

function reachable(view: LoopView, figures: LockFigures): Finding {
  const worst = worstBy(figures, ({ threshold }) => threshold);
  const severity: Severity = worst.threshold >= figures.meanLocked ? 'fail' : 'pass';
  const pointer = thresholdPointer(view, worst);
  return finding({
    slug: 'lock-detector.threshold',
    severity,
    title: passed(severity, 'Noise lets the lock threshold through', 'Noise keeps lock below its threshold'),
    value: worst.threshold,
    limit: figures.meanLocked,
    sense: 'max',
    reason: `In lock the statistic has a mean of ${say(figures.meanLocked)} at the noise and jitter of this plan; ${fieldNumber(pointer)} asks for ${say(worst.threshold)}${severity === 'pass' ? '.' : ', so most blocks in lock do not pass.'}`,
    ...remedyUnless(severity, () => betweenBoth(view, figures, worst)),
    fields: [pointer, '/signal/esN0Db'],
    source: 'mean of the statistic in lock with noise and jitter, exact',
  });
}

function falseAlarm(view: LoopView, figures: LockFigures): Finding {
  const worst = worstBy(figures, (threshold) => threshold.falseAlarm);
  const severity: Severity = worst.falseAlarm > mostWrong ? 'caution' : 'pass';
  const pointer = thresholdPointer(view, worst);
  return finding({
    slug: 'lock-detector.false-alarm',
    severity,
    title: passed(severity, 'Hardly a block feigns lock', 'Blocks out of lock pass as locked'),
    value: worst.falseAlarm,
    limit: mostWrong,
    sense: 'max',
    reason: `Out of lock the statistic of ${figures.averagingSymbols} symbols scatters by ${say(figures.deviationUnlocked)}; ${sayShare(worst.falseAlarm)} of such blocks passes ${say(worst.threshold)} (${fieldNumber(pointer)}).`,
    ...remedyUnless(severity, () => betweenBoth(view, figures, worst)),
    fields: [pointer, pointerOf(view, 'lockDetector/averagingSymbols')],
    source: 'normal tail of the block; one in a thousand is common practice',
    estimate: true,
  });
}

function miss(view: LoopView, figures: LockFigures): Finding {
  const worst = worstBy(figures, (threshold) => threshold.miss);
  const severity: Severity = worst.miss > mostWrong ? 'caution' : 'pass';
  const pointer = thresholdPointer(view, worst);
  return finding({
    slug: 'lock-detector.miss',
    severity,
    title: passed(severity, 'Hardly a block misses lock', 'Blocks in lock pass as unlocked'),
    value: worst.miss,
    limit: mostWrong,
    sense: 'max',
    reason: `In lock the statistic is ${say(figures.meanLocked)} and scatters by ${say(figures.deviationLocked)}; ${sayShare(worst.miss)} of the blocks falls below ${say(worst.threshold)} (${fieldNumber(pointer)}).`,
    ...remedyUnless(severity, () => betweenBoth(view, figures, worst)),
    fields: [pointer, pointerOf(view, 'lockDetector/averagingSymbols')],
    source: 'normal tail of the block; one in a thousand is common practice',
    estimate: true,
  });
}

/** A threshold as many deviations above noise as below lock; longer blocks before it where none serves both. */
function betweenBoth(view: LoopView, figures: LockFigures, at: LockThreshold): Remedy {
  const { meanLocked, deviationLocked, deviationUnlocked } = figures;
  const apart = meanLocked / (deviationLocked + deviationUnlocked);
  const pointer = thresholdPointer(view, at);
  const value = Math.round(256 * apart * deviationUnlocked) / 256;
  const no = `${fieldNumber(pointer)}${at.stage === null ? '' : ` of ${at.stage}`}`;
  return apart >= deviations
    ? setTo(no, pointer, value, say(value))
    : longerBlock(view, figures.averagingSymbols * (deviations / apart) ** 2, `${no} to ${say(value)}`);
}

/** Both deviations go with one over the root of the block, so the threshold between them stays. */
function longerBlock(view: LoopView, symbols: number, next: string): Remedy {
  const pointer = pointerOf(view, 'lockDetector/averagingSymbols');
  const value = Math.ceil(symbols);
  return value <= longestBlock
    ? followedBy(setTo(fieldNumber(pointer), pointer, value, `${value} symbols`), next)
    : { remedy: 'No block is long enough to tell lock from noise: raise 1.5, or narrow the loop.', change: null };
}
