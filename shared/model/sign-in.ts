// Generated from schemas/sign-in.schema.json; do not edit.

/**
 * Body of a sign-in.
 */
export interface SignIn {
  /**
   * E-mail address, in any case.
   */
  email: string;
  /**
   * Password in use.
   */
  password: string;
}
