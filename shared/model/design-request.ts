// Generated from schemas/design-request.schema.json; do not edit.

import type { Plan } from './plan';

/**
 * A plan to be worked out.
 */
export interface DesignRequest {
  plan: Plan;
}
