import { workOut } from '../../shared/design';
import type { Design, Finding } from '../../shared/model/design';
import type { Plan } from '../../shared/model/plan';
import type { RegisterMap } from '../../shared/model/register-map';
import { completePlan } from '../../shared/plan/complete';
import { bindingFindings } from '../../shared/registers/binding';
import { quantitiesOf } from '../../shared/registers/quantities';
import { repositories } from '../repositories/index';
import type { Context } from './context';
import { digestOf } from './digest';

const order: Record<Finding['severity'], number> = { fail: 0, caution: 1, pass: 2 };

const bySeverity = (findings: Finding[]): Finding[] =>
  findings.toSorted((one, other) => order[one.severity] - order[other.severity]);

/** The plan with every default in place, as it is stored and hashed. */
export const completed = (plan: Plan): Plan => completePlan(plan) as unknown as Plan;

type Worked = Omit<Design, 'digest'>;

/** Identifies what the hardware gets and how it came about: engine, plan and words. */
function digestOfDesign({ engine, plan, carrier, clock }: Worked): string {
  const words = { ...(carrier && { carrier: carrier.words }), ...(clock && { clock: clock.words }) };
  return digestOf({ engine, plan, words });
}

/**
 * Works a plan out and checks its words against a register map.
 *
 * @param plan validated, schema defaults filled
 * @param map of the plan's target; absent: the words are not checked against registers
 * @throws {ParameterError} with a pointer into the plan
 */
export function designOf(plan: Plan, map: RegisterMap | undefined): Design {
  const worked = workOut(plan);
  const digest = digestOfDesign(worked);
  if (!map) return { ...worked, digest };
  const bound = bindingFindings(map, quantitiesOf({ plan: worked.plan, design: worked }));
  return { ...worked, digest, findings: bySeverity([...worked.findings, ...bound]) };
}

export function designsService({ db }: Context) {
  return {
    /** What a plan means; nothing is stored. */
    async workOut(plan: Plan): Promise<Design> {
      const target = await repositories(db).targets.find(plan.target);
      return designOf(plan, target?.registerMap);
    },
  };
}

export type DesignsService = ReturnType<typeof designsService>;
