// Generated from schemas/password-change.schema.json; do not edit.

/**
 * Changes the password of the person who is signed in.
 */
export interface PasswordChange {
  /**
   * Password in use.
   */
  current: string;
  /**
   * New password, at least 12 characters.
   */
  password: string;
}
