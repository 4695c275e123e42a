import { bandwidthOverOmega } from '../../../shared/loop/gains';
import { valueAt, withValue } from '../../../shared/plan/pointer';
import type { DraftPlan } from '../../api/plans';

export type LoopName = 'carrier' | 'clock';

/** A stage of a draft as the form reads it. */
export interface DraftStage {
  name: string;
  damping?: number;
  noiseBandwidth?: number;
  naturalFrequencyHz?: number;
  until?: { symbols?: number; lockMetric?: number };
}

export const stagesOf = (plan: DraftPlan, loop: LoopName): DraftStage[] =>
  (valueAt(plan, `/${loop}/stages`) ?? []) as DraftStage[];

const defaultSymbols = 8000;

/** Puts a stage before the last one: the last stage stays the one that a receiver ends in. */
export function withStageAdded(plan: DraftPlan, loop: LoopName): DraftPlan {
  const stages = stagesOf(plan, loop);
  const last = stages.at(-1);
  const added = { ...wider(last), name: freeName(stages), until: { symbols: defaultSymbols } };
  return withValue(plan, `/${loop}/stages`, last ? [...stages.slice(0, -1), added, last] : [added]);
}

/** Takes a stage out; the one that becomes the last loses what would have ended it. */
export function withStageRemoved(plan: DraftPlan, loop: LoopName, index: number): DraftPlan {
  const left = stagesOf(plan, loop).toSpliced(index, 1);
  const last = left.length - 1;
  return withValue(
    plan,
    `/${loop}/stages`,
    left.map((stage, at) => (at === last ? withoutEnd(stage) : stage)),
  );
}

/** A stage ahead of another pulls in with two and a half times its bandwidth, as 0.01 before 0.004. */
function wider(stage: DraftStage | undefined): Omit<DraftStage, 'name' | 'until'> {
  const { damping = Math.SQRT1_2, noiseBandwidth = 0.004 } = stage ?? {};
  return { damping, noiseBandwidth: Math.min(0.05, Number((2.5 * noiseBandwidth).toPrecision(2))) };
}

function withoutEnd({ until: _until, ...stage }: DraftStage): DraftStage {
  return stage;
}

const names = ['acquire', 'narrow', 'settle', 'hold', 'stage_5', 'stage_6', 'stage_7', 'stage_8'];

const freeName = (stages: readonly DraftStage[]): string =>
  names.find((name) => !stages.some((stage) => stage.name === name)) ?? 'stage';

/** Another order for a loop: only the second takes a damping factor. */
export function withOrder(plan: DraftPlan, loop: LoopName, order: number): DraftPlan {
  const stages = stagesOf(plan, loop).map(({ damping, ...stage }) =>
    order === 2 ? { ...stage, damping: damping ?? Math.SQRT1_2 } : stage,
  );
  return withValue(withValue(plan, `/${loop}/order`, order), `/${loop}/stages`, stages);
}

/**
 * The same stage told by its natural frequency instead of its bandwidth, or the other way round (order 2).
 *
 * @param symbolRateBd turns Bn·T into Hz
 */
export function toldOtherwise(stage: DraftStage, symbolRateBd: number): DraftStage {
  const { damping: zeta = Math.SQRT1_2, noiseBandwidth, naturalFrequencyHz, ...rest } = stage;
  const perBandwidth = symbolRateBd / (2 * Math.PI * bandwidthOverOmega(2, zeta));
  return noiseBandwidth === undefined
    ? { ...rest, damping: zeta, noiseBandwidth: rounded((naturalFrequencyHz ?? 0) / perBandwidth) }
    : { ...rest, damping: zeta, naturalFrequencyHz: rounded(noiseBandwidth * perBandwidth) };
}

const rounded = (value: number): number => Number(value.toPrecision(6));
