// Generated from schemas/replay-create.schema.json; do not edit.

import type { ToleranceCheck } from './tolerance-check';

/**
 * A tolerance check to be replayed on a revision.
 */
export interface ReplayCreate {
  /**
   * Revision whose words are replayed.
   */
  revisionId: number;
  check: ToleranceCheck;
}
