// Generated from schemas/release-create.schema.json; do not edit.

/**
 * A new release, a draft without entries.
 */
export interface ReleaseCreate {
  /**
   * Slug of the target.
   */
  target: string;
  /**
   * Version of the release, semantic versioning without build data: 2.4.0.
   */
  version: string;
}
