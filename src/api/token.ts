import { errorFrom, noAnswer } from './errors';

/** Who signed in, as the server says it. */
export interface SessionUser {
  id: number;
  email: string;
  name: string;
  role: Role;
}

export type Role = 'engineer' | 'tester' | 'release' | 'viewer' | 'admin';

export interface SignedIn {
  accessToken: string;
  user: SessionUser;
}

// In memory only: a script that gets at storage finds no token, and the refresh cookie is out of its reach.
let token: string | undefined;
let renewal: Promise<boolean> | undefined;
let onChange: (signedIn: SignedIn | undefined) => void = () => {};

export const bearerToken = (): string | undefined => token;

/** Tells the session store when a renewal changes or ends the session. */
export function watchSession(listener: (signedIn: SignedIn | undefined) => void): void {
  onChange = listener;
}

export function keepSession(signedIn: SignedIn | undefined): void {
  token = signedIn?.accessToken;
  onChange(signedIn);
}

/**
 * Renews the access token from the refresh cookie: once for all calls that wait, and one tab after the other, because
 * the cookie rotates and a second use of the old one would end the session.
 *
 * @param stale the token that was refused; when another call has renewed it meanwhile nothing is sent
 * @returns false when the session is over
 * @throws {ApiError} status 0 when the server is silent: the session may still live
 */
export async function renewToken(stale?: string): Promise<boolean> {
  if (token !== undefined && token !== stale) return true;
  renewal ??= oneTabAtATime(refresh).finally(() => (renewal = undefined));
  return renewal;
}

async function oneTabAtATime(work: () => Promise<boolean>): Promise<boolean> {
  // Absent outside a secure context: there, tabs take their chance with the server's grace for a used cookie.
  const locks = navigator.locks as LockManager | null | undefined;
  return locks ? locks.request('keepstep-session', work) : work();
}

async function refresh(): Promise<boolean> {
  const response = await fetch('/api/v1/session/refresh', { method: 'POST', credentials: 'same-origin' }).catch(
    (error: unknown) => {
      throw noAnswer(error, 10);
    },
  );
  if (response.ok) {
    keepSession((await response.json()) as SignedIn);
    return true;
  }
  if (response.status >= 500 || response.status === 429) throw await errorFrom(response);
  keepSession(undefined);
  return false;
}
