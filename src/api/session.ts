import { api } from './client';
import { keepSession, renewToken, type SignedIn } from './token';

export type { Role, SessionUser } from './token';

export interface Health {
  status: string;
  version: string;
  engine: string;
  /** True while the demo people can sign in. */
  demo: boolean;
}

export const getHealth = (): Promise<Health> => api.get<Health>('/health');

export async function signIn(email: string, password: string): Promise<void> {
  keepSession(await api.post<SignedIn>('/session', { email, password }));
}

/** Ends the session here and on the server; here even when the server is silent. */
export async function signOut(): Promise<void> {
  await api.delete('/session').finally(() => keepSession(undefined));
}

export const restoreSession = (): Promise<boolean> => renewToken();

export interface LinkOwner {
  email: string;
  name: string;
}

export const checkPasswordLink = (token: string): Promise<LinkOwner> =>
  api.post<LinkOwner>('/password-links/check', { token });

export const setPassword = (token: string, password: string): Promise<void> =>
  api.post('/password', { token, password });
