// Generated from schemas/draft.schema.json; do not edit.

/**
 * What a person has typed into a plan and not saved.
 */
export interface DraftBody {
  /**
   * Number of the revision that the edits start from, 0: none.
   */
  basedOn: number;
  /**
   * The last valid values; need not be a whole plan.
   */
  plan: {
    [k: string]: unknown;
  };

  /**
   * Text of the fields that cannot be read yet, by JSON pointer into the plan.
   */
  typed: {
    [k: string]: string;
  };
}
