import { defineStore } from 'pinia';
import { computed, shallowRef } from 'vue';
import * as sessions from '../api/session';
import type { Role, SessionUser } from '../api/session';
import { watchSession } from '../api/token';
import { remembered } from '../composables/use-remembered';

export const roleNames: Record<Role, string> = {
  engineer: 'engineer',
  tester: 'tester',
  release: 'release manager',
  viewer: 'viewer',
  admin: 'admin',
};

/** Who is signed in. A call that finds the session over clears it here, and the layout leads to the sign-in page. */
export const useSession = defineStore('session', () => {
  const user = shallowRef<SessionUser | null>(null);
  // Asking for a renewal that cannot succeed would leave a refusal in the log of every first visit.
  const before = remembered<boolean>('signed-in', false);

  watchSession((signedIn) => {
    user.value = signedIn?.user ?? null;
    before.write(signedIn !== undefined);
  });

  const signedIn = computed(() => user.value !== null);
  const role = computed(() => user.value?.role);
  const roleName = computed(() => (role.value ? roleNames[role.value] : ''));
  const hasRole = (...roles: Role[]): boolean => role.value !== undefined && roles.includes(role.value);

  /** Brings the session back after a reload; a silent server leaves the person signed out and says nothing yet. */
  async function restore(): Promise<void> {
    if (before.read()) await sessions.restoreSession().catch(() => false);
  }

  return { user, signedIn, role, roleName, hasRole, restore, signIn: sessions.signIn, signOut: sessions.signOut };
});
