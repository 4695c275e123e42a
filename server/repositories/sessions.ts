import type { Knex } from 'knex';
import type { Role } from '../roles';
import { iso } from './columns';

interface SessionRow {
  id: number;
  person_id: number;
  user_agent: string;
  created_at: Date;
  last_used_at: Date;
  expires_at: Date;
  revoked_at: Date | null;
}

interface TokenRow {
  id: number;
  session_id: number;
  token_hash: string;
  created_at: Date;
  used_at: Date | null;
}

export interface Session {
  id: number;
  createdAt: string;
  lastUsedAt: string;
  userAgent: string;
}

/** A refresh token with the person of its session. */
export interface RefreshToken {
  id: number;
  sessionId: number;
  personId: number;
  usedAt: Date | null;
}

export interface NewSession {
  personId: number;
  userAgent: string;
  at: Date;
  expiresAt: Date;
}

const toSession = (row: SessionRow): Session => ({
  id: row.id,
  createdAt: iso(row.created_at),
  lastUsedAt: iso(row.last_used_at),
  userAgent: row.user_agent,
});

export interface SessionPerson {
  id: number;
  email: string;
  name: string;
  role: Role;
}

export function sessionsRepository(db: Knex) {
  const sessions = () => db<SessionRow>('sessions');
  const tokens = () => db<TokenRow>('refresh_tokens');
  const alive = (at: Date) => sessions().whereNull('revoked_at').where('expires_at', '>', at);
  return {
    async insert({ personId, userAgent, at, expiresAt }: NewSession): Promise<number> {
      const row = {
        person_id: personId,
        user_agent: userAgent,
        created_at: at,
        last_used_at: at,
        expires_at: expiresAt,
      };
      const [id] = await sessions().insert(row);
      return id!;
    },
    async insertToken(sessionId: number, hash: string, at: Date): Promise<void> {
      await tokens().insert({ session_id: sessionId, token_hash: hash, created_at: at });
    },
    /** Locks the session: two tabs that renew at once take their turn. */
    async findToken(hash: string): Promise<RefreshToken | undefined> {
      const token = await tokens().where({ token_hash: hash }).first();
      if (!token) return undefined;
      const session = await sessions().where({ id: token.session_id }).forUpdate().first();
      // Read again under the lock: the other tab may have used it while this one waited.
      const current = await tokens().where({ id: token.id }).forUpdate().first();
      if (!session || !current) return undefined;
      return { id: current.id, sessionId: session.id, personId: session.person_id, usedAt: current.used_at };
    },
    async useToken(id: number, at: Date): Promise<void> {
      await tokens().where({ id }).whereNull('used_at').update({ used_at: at });
    },
    async extend(id: number, at: Date, expiresAt: Date): Promise<void> {
      await sessions().where({ id }).update({ last_used_at: at, expires_at: expiresAt });
    },
    /** The person of a session that lives, if they may still sign in. */
    async findPerson(id: number, personId: number, at: Date): Promise<SessionPerson | undefined> {
      return alive(at)
        .join('people', 'people.id', 'sessions.person_id')
        .where({ 'sessions.id': id, 'people.id': personId, 'people.active': 1 })
        .first<SessionPerson | undefined>('people.id', 'people.email', 'people.name', 'people.role');
    },
    async list(personId: number, at: Date): Promise<Session[]> {
      const rows = await alive(at)
        .where({ person_id: personId })
        .orderBy('last_used_at', 'desc')
        .select<SessionRow[]>();
      return rows.map(toSession);
    },
    async revoke(id: number, at: Date): Promise<boolean> {
      return (await sessions().where({ id }).whereNull('revoked_at').update({ revoked_at: at })) === 1;
    },
    async revokeOf(personId: number, id: number, at: Date): Promise<boolean> {
      const own = sessions().where({ id, person_id: personId }).whereNull('revoked_at');
      return (await own.update({ revoked_at: at })) === 1;
    },
    /** Ends every session of a person but the one named. */
    async revokeAll(personId: number, at: Date, except = 0): Promise<void> {
      const others = sessions().where({ person_id: personId }).whereNot({ id: except });
      await others.whereNull('revoked_at').update({ revoked_at: at });
    },
    async removeExpired(before: Date): Promise<void> {
      await sessions().where('expires_at', '<', before).delete();
    },
  };
}
