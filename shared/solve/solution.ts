import { bandwidthOverOmega } from '../loop/gains';
import { significantDown, significantUp } from '../math/significant';
import type { Change, Solution } from '../model/design';
import { fieldNumber } from '../plan/fields';
import { quantityText } from '../quantities/format';
import type { LoopView, StageView } from '../findings/loop-view';

/** Digits of what a button types: it keeps the limit, so it is rounded to the safe side. */
const typedDigits = 3;

export type SolutionParts = Pick<Solution, 'slug' | 'title' | 'limit' | 'limitText' | 'sense'> & Partial<Solution>;

export const solution = (view: LoopView, parts: SolutionParts): Solution => ({
  loop: view.key,
  stage: null,
  value: null,
  unit: '',
  present: null,
  note: null,
  estimate: false,
  change: null,
  ...parts,
});

/** A value on the safe side of what just meets a limit. */
export const safe = (value: number, sense: Solution['sense']): number =>
  sense === 'max' ? significantDown(value, typedDigits) : significantUp(value, typedDigits);

/** BnT of a stage now, per symbol: as asked for, or what its natural frequency comes to. */
export function presentBandwidth({ stage, loop, plan }: StageView): number {
  if (stage.noiseBandwidth !== undefined) return stage.noiseBandwidth;
  const perOmega = bandwidthOverOmega(loop.order, stage.damping ?? 1, loop.thirdOrder);
  return (2 * Math.PI * (stage.naturalFrequencyHz ?? 0) * perOmega) / plan.signal.symbolRateBd;
}

/** The edit that gives a stage a bandwidth, in BnT or in the natural frequency that it is described by. */
export function bandwidthChange(view: StageView, bandwidth: number, sense: Solution['sense']): Change {
  const { key, index, stage } = view;
  const [name, value, unit] =
    stage.noiseBandwidth !== undefined
      ? (['noiseBandwidth', bandwidth, ''] as const)
      : (['naturalFrequencyHz', (stage.naturalFrequencyHz! * bandwidth) / presentBandwidth(view), 'Hz'] as const);
  const pointer = `/${key}/stages/${index}/${name}`;
  const typed = safe(value, sense);
  return {
    pointer,
    value: typed,
    label: `Set ${fieldNumber(pointer)} of ${stage.name} to ${quantityText(typed, { unit })}`,
  };
}
