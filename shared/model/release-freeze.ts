// Generated from schemas/release-freeze.schema.json; do not edit.

/**
 * Confirms a freeze.
 */
export interface ReleaseFreeze {
  /**
   * Version of the release, typed again.
   */
  version: string;
}
