// Generated from schemas/set-password.schema.json; do not edit.

/**
 * Sets a password by a one-time link.
 */
export interface SetPassword {
  /**
   * Token of the one-time link.
   */
  token: string;
  /**
   * New password, at least 12 characters.
   */
  password: string;
}
