import { loopOfBandwidth } from '../budget/loop-family';
import { noiseBandwidth } from '../loop/noise-bandwidth';
import type { LinearLoop } from '../loop/linear-loop';
import type { Solution } from '../model/design';
import { fieldNumber } from '../plan/fields';
import { numberText, quantityText } from '../quantities/format';
import { bisect } from '../math/root-search';
import { lastStage } from '../findings/loop-view';
import type { LoopView, StageView } from '../findings/loop-view';
import { stageFamily } from './margin';
import { bandwidthChange, safe, solution } from './solution';
import { nominalBandwidth } from '../findings/narrower';

const pointer = '/environment/dopplerRateHzPerS';
const [least, most] = [1e-7, 0.2];

/**
 * The narrowest bandwidth and the largest Doppler rate at which the standing error of an order-2 carrier loop,
 * 2πḟTu²/g2, is no more than the jitter limit.
 */
export function driftSolutions(view: LoopView): Solution[] {
  const { key, loop, plan } = view;
  if (key !== 'carrier' || loop.order !== 2 || plan.environment.dopplerRateHzPerS === 0) return [];
  const at = lastStage(view);
  return [narrowestBandwidth(at), largestRate(at)];
}

const driftLimit = ({ plan, stage }: StageView) => ({
  stage: stage.name,
  limit: '/limits/phaseJitterDeg',
  limitText: `Standing error under drift, max ${numberText(plan.limits.phaseJitterDeg)}°`,
});

/** Radians per update² of one Hz/s. */
function perRate({ plan, loop }: StageView): number {
  const updateRateHz = plan.signal.symbolRateBd / loop.updateInterval;
  return (2 * Math.PI) / updateRateHz ** 2;
}

function narrowestBandwidth(view: StageView): Solution {
  const { plan, loop, stage } = view;
  const wanted = (perRate(view) * plan.environment.dopplerRateHzPerS * 180) / Math.PI / plan.limits.phaseJitterDeg;
  const family = stageFamily(view);
  const gain = (bandwidth: number): number => loopOfBandwidth(family, bandwidth)?.gains.g2 ?? 0;
  const parts = {
    ...driftLimit(view),
    slug: 'drift.narrowest-bandwidth',
    title: `narrowest BnT of ${stage.name}`,
    sense: 'min' as const,
    present: nominalBandwidth(view),
  };
  let widest = most;
  while (widest > 1e-3 && gain(widest) === 0) widest /= 1.3;
  if (gain(widest) < wanted)
    return solution(view, { ...parts, note: 'No bandwidth follows this drift; take order 3.' });
  const high = Math.exp(bisect((x) => gain(Math.exp(x)) - wanted, Math.log(least), Math.log(widest)));
  const found = loop.method === 'exact' ? noiseBandwidth(loopOfBandwidth(family, high) as LinearLoop) : high;
  if (found === null) return solution(view, { ...parts, note: 'No stable loop follows this drift; take order 3.' });
  const value = found / loop.updateInterval;
  return solution(view, { ...parts, value, change: bandwidthChange(view, value, 'min') });
}

function largestRate(view: StageView): Solution {
  const { plan, result, stage } = view;
  const value = ((plan.limits.phaseJitterDeg * Math.PI) / 180) * (result.gains.g2 / perRate(view));
  const typed = safe(value, 'max');
  return solution(view, {
    ...driftLimit(view),
    slug: 'drift.largest-rate',
    title: `largest Doppler rate that ${stage.name} follows`,
    sense: 'max',
    unit: 'Hz/s',
    present: plan.environment.dopplerRateHzPerS,
    value,
    change: {
      pointer,
      value: typed,
      label: `Set ${fieldNumber(pointer)} to ${quantityText(typed, { unit: 'Hz/s' })}`,
    },
  });
}
