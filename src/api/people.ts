import { api } from './client';
import { everyPage, page, type Page } from './pages';
import type { PersonName } from './plans';
import type { Role } from './token';

export type { Role } from './token';

export interface Person {
  id: number;
  email: string;
  name: string;
  role: Role;
  active: boolean;
  hasPassword: boolean;
  lastSeenAt: string | null;
  version: number;
}

export interface AuditEntry {
  id: number;
  at: string;
  person: PersonName | null;
  action: string;
  subject: string;
  detail: Readonly<Record<string, unknown>> | null;
}

export type PersonChange = Partial<Pick<Person, 'role' | 'active' | 'name'>>;

export const listPeople = (): Promise<Person[]> => everyPage<Person>('/people');

/** @returns the person and the one-time link with which they set a password: the server does not show it again */
export const invitePerson = (
  invite: Pick<Person, 'email' | 'name' | 'role'>,
): Promise<{ person: Person; link: string }> => api.post('/people', invite);

export const changePerson = (person: Person, change: PersonChange): Promise<Person> =>
  api.patch<Person>(`/people/${person.id}`, change, { ifMatch: `"${person.version}"` });

/** Makes a new one-time link; older ones of this person stop working. */
export const newLink = (person: Person): Promise<{ link: string }> => api.post(`/people/${person.id}/links`);

export const listAudit = (cursor: string | null = null): Promise<Page<AuditEntry>> =>
  page<AuditEntry>('/audit', cursor, 50);
