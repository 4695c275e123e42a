// Generated from schemas/person-change.schema.json; do not edit.

/**
 * Changes what is given and leaves the rest.
 */
export interface PersonChange {
  /**
   * Name as it is shown to others.
   */
  name?: string;
  /**
   * Role.
   */
  role?: 'engineer' | 'tester' | 'release' | 'viewer' | 'admin';
  /**
   * Whether the person may sign in.
   */
  active?: boolean;
}
