import type { Budget, Solution } from '../model/design';
import { numberText } from '../quantities/format';
import { lastStage } from '../findings/loop-view';
import type { LoopView, StageView } from '../findings/loop-view';
import { logarithmicCrossings } from '../math/crossing';
import { bandwidthChange, solution } from './solution';
import { nominalBandwidth } from '../findings/narrower';

/** The widest and the narrowest bandwidth of the last stage whose jitter stays within its limit. */
export function jitterSolutions(view: LoopView): Solution[] {
  const { budget } = view.design;
  if (!budget || budget.sweep.total.every((value) => value === null)) return [];
  const at = lastStage(view);
  const crossings = logarithmicCrossings(budget.sweep.noiseBandwidth, budget.sweep.total, budget.limit);
  const widest = crossings.filter(({ rising }) => rising).at(-1)?.x;
  const narrowest = crossings.find(({ rising }) => !rising)?.x;
  const none = crossings.length === 0 && isAbove(budget);
  return [
    bound(at, budget, {
      sense: 'max',
      value: widest ?? null,
      note: none ? noneText(budget) : sweptText(budget, 'up to'),
    }),
    ...(narrowest === undefined && !none
      ? []
      : [bound(at, budget, { sense: 'min', value: narrowest ?? null, note: noneText(budget) })]),
  ];
}

const isAbove = ({ sweep, limit }: Budget): boolean => sweep.total.every((value) => value === null || value > limit);

const amount = (value: number, { unit }: Budget): string =>
  unit === 'deg' ? `${numberText(value, { significant: 3 })}°` : `${numberText(value, { significant: 3 })} symbols`;

function noneText(budget: Budget): string {
  const least = Math.min(...budget.sweep.total.filter((value) => value !== null));
  return `No bandwidth meets it; the least total is ${amount(budget.best?.total ?? least, budget)}.`;
}

const sweptText = ({ sweep }: Budget, word: string): string =>
  `Every BnT ${word} ${numberText(sweep.noiseBandwidth.at(-1) ?? 0, { significant: 2 })} meets it.`;

function bound(
  view: StageView,
  budget: Budget,
  { sense, value, note }: { sense: 'max' | 'min'; value: number | null; note: string },
): Solution {
  const { stage } = view;
  return solution(view, {
    slug: sense === 'max' ? 'jitter.widest-bandwidth' : 'jitter.narrowest-bandwidth',
    stage: stage.name,
    title: `${sense === 'max' ? 'widest' : 'narrowest'} BnT of ${stage.name}`,
    limit: budget.unit === 'deg' ? '/limits/phaseJitterDeg' : '/limits/timingJitterSymbols',
    limitText: `${budget.unit === 'deg' ? 'Phase' : 'Timing'} jitter, max ${amount(budget.limit, budget)} rms`,
    sense,
    present: nominalBandwidth(view),
    value,
    note: value === null ? note : null,
    change: value === null ? null : bandwidthChange(view, value, sense),
  });
}
