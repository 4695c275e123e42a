import { familyOf, loopOfBandwidth } from '../budget/loop-family';
import { gainCrossings, phaseMarginDeg } from '../loop/margins';
import type { LinearLoop } from '../loop/linear-loop';
import { noiseBandwidth } from '../loop/noise-bandwidth';
import { averagedSymbols } from '../loop/stage-loop';
import type { Solution } from '../model/design';
import { numberText } from '../quantities/format';
import { numberOf, pointerOf, worstStage } from '../findings/loop-view';
import type { LoopView, StageView } from '../findings/loop-view';
import { lastAtLeast } from '../math/crossing';
import { bandwidthChange, solution } from './solution';
import { nominalBandwidth } from '../findings/narrower';

/** Bandwidths that are looked at, cycles per update. */
const [least, most] = [1e-7, 0.5];
const longestDelay = 64;
const limit = '/limits/phaseMarginDeg';

/** The widest bandwidth and the largest delay that keep the phase margin, of the stage with the least. */
export function marginSolutions(view: LoopView): Solution[] {
  const worst = worstStage(view, ({ result }) => (result.margins.phaseDeg === null ? null : -result.margins.phaseDeg));
  return worst ? [widestBandwidth(worst.at), largestDelay(worst.at)] : [];
}

const limitText = ({ plan }: LoopView): string => `Phase margin, min ${numberText(plan.limits.phaseMarginDeg)}°`;

function widestBandwidth(view: StageView): Solution {
  const { stage, loop, plan } = view;
  const { updateInterval } = loop;
  const widest = widestNominal(view, nominalBandwidth(view) * updateInterval);
  const parts = {
    slug: 'margin.widest-bandwidth',
    stage: stage.name,
    title: `widest BnT of ${stage.name} with delay ${loop.delay}`,
    limit,
    limitText: limitText(view),
    sense: 'max' as const,
    present: nominalBandwidth(view),
  };
  if (widest === null)
    return solution(view, {
      ...parts,
      note: `With delay ${loop.delay} no bandwidth keeps ${plan.limits.phaseMarginDeg}°.`,
    });
  if (widest === 'every') return solution(view, { ...parts, note: 'Every bandwidth that can be asked for keeps it.' });
  const value = (loop.method === 'exact' ? widest.exact : widest.nominal) / updateInterval;
  return solution(view, { ...parts, value, change: bandwidthChange(view, value, 'max') });
}

/** Nominal and own bandwidth of the widest loop of a stage that keeps the margin, cycles per update. */
function widestNominal(view: StageView, start: number): { nominal: number; exact: number } | null | 'every' {
  const family = stageFamily(view);
  const margin = (nominal: number): number | null => {
    const loop = loopOfBandwidth(family, nominal);
    return loop && marginOf(loop);
  };
  const nominal = lastAtLeast(margin, view.plan.limits.phaseMarginDeg, { start, least, most });
  if (nominal === null) return null;
  if (nominal === Infinity) return 'every';
  const exact = noiseBandwidth(loopOfBandwidth(family, nominal) as LinearLoop);
  return exact === null ? null : { nominal, exact };
}

const marginOf = (loop: LinearLoop): number | null => phaseMarginDeg(gainCrossings(loop), 0);

/** The loops of a stage that differ in bandwidth alone. */
export function stageFamily({ loop, stage }: StageView) {
  const { order, delay, updateInterval } = loop;
  const averaged = averagedSymbols(updateInterval);
  return familyOf(loop, { loop: { order, delay, averaged }, damping: stage.damping ?? null });
}

/** The curve of the margin over the delay is that of fixed gains; gains that are solved with the delay follow it. */
function largestDelay(view: StageView): Solution {
  const { stage, loop, result, plan } = view;
  const { delay, phaseDeg } = result.marginAgainstDelay;
  const short = phaseDeg.findIndex((margin) => margin === null || margin < plan.limits.phaseMarginDeg);
  const pointer = pointerOf(view, 'delay');
  const parts = {
    slug: 'margin.largest-delay',
    stage: stage.name,
    title: `largest extra delay that ${stage.name} bears`,
    limit,
    limitText: limitText(view),
    sense: 'max' as const,
    unit: 'updates',
    present: loop.delay,
  };
  if (loop.method === 'exact')
    return solution(view, { ...parts, note: 'Gains that are solved exactly follow the delay.' });
  if (short === 0) return solution(view, { ...parts, note: 'Not even without extra delay is it kept.' });
  if (short < 0) return solution(view, { ...parts, note: `Every delay up to ${longestDelay} updates keeps it.` });
  const value = delay[short - 1] as number;
  const label = `Set ${numberOf(view, 'delay')} to ${value} updates`;
  return solution(view, { ...parts, value, change: { pointer, value, label } });
}
