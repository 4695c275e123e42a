import type { LoopDesign, StageDesign } from '../model/design';
import type { CompleteCarrier, CompleteClock, CompletePlan, CompleteStage } from '../plan/complete';
import { fieldNumber } from '../plan/fields';

/** One loop as a check sees it: what was asked, and what came out. */
export interface LoopView {
  key: 'carrier' | 'clock';
  /** At the head of a title. */
  title: 'Carrier loop' | 'Clock recovery';
  /** In a sentence. */
  name: 'the carrier loop' | 'clock recovery';
  plan: CompletePlan;
  loop: CompleteCarrier | CompleteClock;
  design: LoopDesign;
}

/** One stage of a loop as a check sees it. */
export interface StageView extends LoopView {
  index: number;
  stage: CompleteStage;
  result: StageDesign;
}

/** The loops that a plan has. */
export function loopViews(plan: CompletePlan, loops: { carrier?: LoopDesign; clock?: LoopDesign }): LoopView[] {
  const views: LoopView[] = [];
  if (plan.carrier && loops.carrier) {
    const names = { key: 'carrier', title: 'Carrier loop', name: 'the carrier loop' } as const;
    views.push({ ...names, plan, loop: plan.carrier, design: loops.carrier });
  }
  if (plan.clock && loops.clock) {
    const names = { key: 'clock', title: 'Clock recovery', name: 'clock recovery' } as const;
    views.push({ ...names, plan, loop: plan.clock, design: loops.clock });
  }
  return views;
}

/** One stage of a loop, by its place. */
export const stageAt = (view: LoopView, index: number): StageView => ({
  ...view,
  index,
  stage: view.loop.stages[index] as CompleteStage,
  result: view.design.stages[index] as StageDesign,
});

export const stageViews = (view: LoopView): StageView[] => view.loop.stages.map((_, index) => stageAt(view, index));

export const lastStage = (view: LoopView): StageView => stageAt(view, view.loop.stages.length - 1);

/** What a stage asks for: BnT, or its natural frequency in Hz. */
export const askedOf = ({ stage }: StageView): number => stage.noiseBandwidth ?? stage.naturalFrequencyHz ?? 0;

/** The stage with the largest measure; stages without one are left out. */
export function worstStage(
  view: LoopView,
  measure: (stage: StageView) => number | null,
): { at: StageView; value: number } | null {
  let worst: { at: StageView; value: number } | null = null;
  for (const at of stageViews(view)) {
    const value = measure(at);
    if (value !== null && (!worst || value > worst.value)) worst = { at, value };
  }
  return worst;
}

/** JSON pointer of a value of the loop. */
export const pointerOf = ({ key }: LoopView, path: string): string => `/${key}/${path}`;

/** JSON pointer of what sets the bandwidth of a stage. */
export const bandwidthPointer = ({ key, index, stage }: StageView): string =>
  `/${key}/stages/${index}/${stage.noiseBandwidth === undefined ? 'naturalFrequencyHz' : 'noiseBandwidth'}`;

/** Number of a value of the loop on the sheet. */
export const numberOf = (view: LoopView, path: string): string => fieldNumber(pointerOf(view, path));

/** “Stage track”, or “The loop” where there is only one stage. */
export const stageName = ({ loop, stage }: StageView): string =>
  loop.stages.length > 1 ? `Stage ${stage.name}` : 'The loop';
