import { api } from './client';
import { everyPage } from './pages';

export interface SessionEntry {
  id: number | string;
  createdAt: string;
  lastUsedAt: string;
  userAgent: string;
  current: boolean;
}

export const listSessions = (): Promise<SessionEntry[]> => everyPage<SessionEntry>('/sessions');

export const endSession = (id: SessionEntry['id']): Promise<unknown> => api.delete(`/sessions/${id}`);

/** @throws {ApiError} with a fault at `/current` when the password in use was mistyped */
export const changePassword = (current: string, password: string): Promise<unknown> =>
  api.put('/session/password', { current, password });
