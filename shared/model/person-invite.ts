// Generated from schemas/person-invite.schema.json; do not edit.

/**
 * Invites a person.
 */
export interface PersonInvite {
  /**
   * E-mail address, in any case.
   */
  email: string;
  /**
   * Name as it is shown to others.
   */
  name: string;
  /**
   * Role.
   */
  role: 'engineer' | 'tester' | 'release' | 'viewer' | 'admin';
}
