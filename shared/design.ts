import type { Design, LoopDesign } from './model/design';
import type { Plan } from './model/plan';
import { loopInteraction } from './budget/interaction';
import { carrierLoop } from './design/carrier-loop';
import { clockLoop } from './design/clock-loop';
import { engineVersion } from './engine';
import { findingsOf } from './findings';
import { completePlan } from './plan/complete';
import { boundedMemo } from './math/bounded-memo';
import type { CompleteCarrier, CompleteClock, CompletePlan } from './plan/complete';
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
  if (plan.carrier) loops.carrier = keptCarrier({ plan, carrier: plan.carrier });
  if (plan.clock) loops.clock = keptClock({ plan, clock: plan.clock });
  return loops;
}

/** Loops kept: while one loop is typed, the other stays as it is. Nobody may change what is kept. */
const keptLoops = 8;

const keptCarrier = boundedMemo(
  ({ plan, carrier }: { plan: CompletePlan; carrier: CompleteCarrier }) => carrierLoop(plan, carrier),
  ({ plan, carrier }) => keyOf(plan, carrier),
  keptLoops,
);

const keptClock = boundedMemo(
  ({ plan, clock }: { plan: CompletePlan; clock: CompleteClock }) => clockLoop(plan, clock),
  ({ plan, clock }) => keyOf(plan, clock),
  keptLoops,
);

/** Everything that a loop's design depends on. */
const keyOf = ({ signal, environment, limits }: CompletePlan, loop: CompleteCarrier | CompleteClock): string =>
  JSON.stringify([signal, environment, limits, loop]);
