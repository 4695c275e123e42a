import type { Design, LoopDesign } from './model/design';
import type { Plan } from './model/plan';
import { loopInteraction } from './budget/interaction';
import { carrierLoop } from './design/carrier-loop';
import { clockLoop } from './design/clock-loop';
import { engineVersion } from './engine';
import { findingsOf } from './findings';
import { completePlan } from './plan/complete';
import type { CompletePlan } from './plan/complete';
import { solutionsOf } from './solve';
import { requireConsistent } from './plan/consistency';

/** A design without its digest, which whoever stores it makes. */
export type WorkedOut = Omit<Design, 'digest'>;

/**
 * What a plan means: gains, responses, budgets, words, headroom and findings of its loops. Pure: the same plan gives
 * the same design anywhere.
 *
 * @param plan a plan that has passed its schema, defaults filled in
 * @throws {ParameterError} with a JSON pointer into the plan at a value that no loop can be worked out for
 */
export function workOut(plan: Plan): WorkedOut {
  const complete = completePlan(plan);
  requireConsistent(complete);
  const loops = loopsOf(complete);
  const interaction = interactionOf(complete, loops);
  return {
    engine: engineVersion,
    plan: complete as unknown as Plan,
    ...loops,
    findings: findingsOf(complete, { ...loops, interaction }),
    solutions: solutionsOf(complete, loops),
    interaction,
  };
}

interface Loops {
  carrier?: LoopDesign;
  clock?: LoopDesign;
}

/** Null where there is one loop alone. */
const interactionOf = (plan: CompletePlan, { carrier, clock }: Loops) =>
  carrier && clock ? loopInteraction({ plan, carrier, clock }) : null;

function loopsOf(plan: CompletePlan): Loops {
  const loops: Loops = {};
  if (plan.carrier) loops.carrier = carrierLoop(plan, plan.carrier);
  if (plan.clock) loops.clock = clockLoop(plan, plan.clock);
  return loops;
}
