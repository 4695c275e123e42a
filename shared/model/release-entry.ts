// Generated from schemas/release-entry.schema.json; do not edit.

/**
 * The revision that a slot holds.
 */
export interface ReleaseEntry {
  /**
   * Revision of a plan on the target of the release.
   */
  revisionId: number;
}
