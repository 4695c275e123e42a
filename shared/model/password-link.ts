// Generated from schemas/password-link.schema.json; do not edit.

/**
 * Asks whose a one-time link is.
 */
export interface PasswordLink {
  /**
   * Token of the one-time link.
   */
  token: string;
}
