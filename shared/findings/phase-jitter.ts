import type { Finding, StageJitter } from '../model/design';
import { finding, followedBy, passed, remedyUnless, say, twoDigitsDown } from './finding';
import type { Remedy, Severity } from './finding';
import { askedOf, bandwidthPointer, lastStage, stageName } from './loop-view';
import type { LoopView, StageView } from './loop-view';
import { nominalBandwidth, setBandwidth } from './narrower';

/** Share of the limit from which an oscillator's part is worth a word. */
const cautionShare = 0.8;

/** Phase jitter of the last stage against its limit. */
export function phaseJitterFindings(view: LoopView): Finding[] {
  const { budget } = view.design;
  if (view.key !== 'carrier' || !budget) return [];
  const at = lastStage(view);
  const jitter = budget.stages[at.index] as StageJitter;
  if (jitter.total === null) return [];
  const limit = view.plan.limits.phaseJitterDeg;
  const better = betterBandwidth(at, jitter.total);
  const severity: Severity =
    jitter.total > limit ? 'fail' : jitter.total > cautionShare * limit && better !== null ? 'caution' : 'pass';
  return [
    finding({
      slug: 'noise.phase-total',
      severity,
      title: passed(
        severity,
        'Phase jitter keeps its limit',
        jitter.dominant === 'oscillator' ? 'The oscillator makes most of the jitter' : 'Noise makes most of the jitter',
      ),
      value: jitter.total,
      limit,
      sense: 'max',
      unit: '° rms',
      reason: `${stageName(at)}: ${parts(jitter)}, together ${say(jitter.total)}° of ${say(limit)}° (5.1).${better === null || severity === 'pass' ? '' : ` BnT ${say(better.noiseBandwidth)} gives ${say(better.total)}°, the least there is.`}`,
      ...remedyUnless(severity, () => quieter(at, jitter, limit)),
      fields: [bandwidthPointer(at), '/limits/phaseJitterDeg', '/environment/phaseNoise', '/signal/esN0Db'],
      source:
        jitter.oscillator === null
          ? 'thermal noise through the loop'
          : 'thermal noise and the mask of 4.6 through the loop',
    }),
  ];
}

const parts = ({ thermal, oscillator }: StageJitter): string =>
  oscillator === null
    ? `thermal ${say(thermal as number)}°`
    : `oscillator ${say(oscillator)}°, thermal ${say(thermal as number)}°`;

interface BetterBandwidth {
  noiseBandwidth: number;
  total: number;
}

/** The bandwidth with the least jitter, where it is worth a change. */
function betterBandwidth({ design: { budget } }: StageView, total: number): BetterBandwidth | null {
  const best = budget?.best;
  return best && best.total < 0.98 * total ? { ...best, noiseBandwidth: twoDigitsDown(best.noiseBandwidth) } : null;
}

/** The bandwidth with the least jitter; where noise alone counts, the one that keeps the limit: jitter goes with √BnT. */
function quieter(at: StageView, jitter: StageJitter, limit: number): Remedy {
  const total = jitter.total as number;
  const better = betterBandwidth(at, total);
  if (better) {
    const set = setBandwidth(at, twoDigitsDown((askedOf(at) * better.noiseBandwidth) / nominalBandwidth(at)));
    return better.total > limit ? followedBy(set, otherMeans) : set;
  }
  if (jitter.oscillator === null) return setBandwidth(at, twoDigitsDown(askedOf(at) * (limit / total) ** 2));
  return { remedy: `No bandwidth keeps the limit: ${otherMeans}.`, change: null };
}

const otherMeans = 'raise 1.5, take a quieter oscillator (4.6), or allow more (5.1)';
