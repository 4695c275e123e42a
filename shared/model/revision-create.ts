// Generated from schemas/revision-create.schema.json; do not edit.

import type { Plan } from './plan';

/**
 * A plan to be saved as its next revision.
 */
export interface RevisionCreate {
  plan: Plan;
  /**
   * What changed and why.
   */
  note?: string;
}
