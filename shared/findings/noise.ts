import type { Finding, StageJitter } from '../model/design';
import { finding, passed, remedyUnless, say, twoDigitsDown } from './finding';
import type { Severity } from './finding';
import { bandwidthPointer, lastStage, stageName } from './loop-view';
import type { LoopView, StageView } from './loop-view';
import { setBandwidth } from './narrower';

/** Share of the limit from which an oscillator's part is worth a word. */
const cautionShare = 0.8;

/** Phase jitter of the last stage against its limit. */
export function noiseFindings(view: LoopView): Finding[] {
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
      ...remedyUnless(severity, () => (better === null ? null : setBandwidth(at, better.noiseBandwidth))),
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

/** The bandwidth with the least jitter, where it is worth a change; without a mask, narrowing always helps. */
function betterBandwidth(at: StageView, total: number): { noiseBandwidth: number; total: number } | null {
  const { budget } = at.design;
  if (at.stage.noiseBandwidth === undefined || !budget) return null;
  if (budget.best)
    return budget.best.total < 0.98 * total
      ? { ...budget.best, noiseBandwidth: twoDigitsDown(budget.best.noiseBandwidth) }
      : null;
  return null;
}
