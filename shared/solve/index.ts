import type { LoopDesign, Solution } from '../model/design';
import type { CompletePlan } from '../plan/complete';
import { loopViews } from '../findings/loop-view';
import type { LoopView } from '../findings/loop-view';
import { acquisitionSolutions } from './acquisition';
import { driftSolutions } from './drift';
import { jitterSolutions } from './jitter';
import { marginSolutions } from './margin';

/** In the order in which the limits stand on the sheet. */
const limits: readonly ((view: LoopView) => Solution[])[] = [
  jitterSolutions,
  marginSolutions,
  acquisitionSolutions,
  driftSolutions,
];

/** Beside each limit, the bandwidth, delay or offset that would just meet it. */
export const solutionsOf = (plan: CompletePlan, loops: { carrier?: LoopDesign; clock?: LoopDesign }): Solution[] =>
  loopViews(plan, loops).flatMap((view) => limits.flatMap((solve) => solve(view)));
