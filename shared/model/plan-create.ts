// Generated from schemas/plan-create.schema.json; do not edit.

import type { Plan } from './plan';

/**
 * A new plan.
 */
export interface PlanCreate {
  plan: Plan;
}
