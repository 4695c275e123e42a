import { inTransaction } from '../db';
import { notFound, unauthenticated } from '../errors';
import type { RefreshToken, Session, SessionPerson } from '../repositories/sessions';
import { repositories, type Repositories } from '../repositories/index';
import { accessToken, accessTokenLife, type AccessClaims } from './access-tokens';
import type { Context } from './context';
import { newToken, tokenHash } from './opaque-tokens';
import { passwordFits } from './passwords';

/** Life of a session that is not used, ms. */
export const sessionLife = 14 * 24 * 3_600_000;

/** Two tabs may send the same refresh token within this time, ms; later it was stolen from one of them. */
const grace = 10_000;

/** A person with the session they are signed in by. */
export interface SignedIn extends SessionPerson {
  sessionId: number;
}

export interface Tokens {
  accessToken: string;
  /** Life of the access token, seconds. */
  expiresIn: number;
  user: SessionPerson;
  refreshToken: string;
}

const reused = (token: RefreshToken, now: Date): boolean =>
  token.usedAt !== null && now.getTime() - token.usedAt.getTime() > grace;

const wrong = () => unauthenticated('The e-mail address or the password is wrong.');
const over = () => unauthenticated('The session has ended. Sign in again.');

const userOf = ({ id, email, name, role }: SessionPerson): SessionPerson => ({ id, email, name, role });

export function sessionsService({ db, clock, secret, logger }: Context) {
  const until = (now: Date) => new Date(now.getTime() + sessionLife);

  async function tokensFor(person: SessionPerson, sessionId: number, { sessions }: Repositories): Promise<Tokens> {
    const refreshToken = newToken();
    await sessions.insertToken(sessionId, tokenHash(refreshToken), clock());
    const access = accessToken(person.id, sessionId, secret, clock());
    return { accessToken: access, expiresIn: accessTokenLife, user: userOf(person), refreshToken };
  }

  /** Undefined ends the family: the transaction must commit that, so nothing is thrown inside it. */
  async function rotate(token: RefreshToken, all: Repositories): Promise<Tokens | undefined> {
    const now = clock();
    const person = await all.sessions.findPerson(token.sessionId, token.personId, now);
    if (!person) return undefined;
    if (reused(token, now)) {
      await all.sessions.revoke(token.sessionId, now);
      logger.warn({ session: token.sessionId }, 'a refresh token was used twice: its session was ended');
      return undefined;
    }
    await all.sessions.useToken(token.id, now);
    await all.sessions.extend(token.sessionId, now, until(now));
    await all.people.seen(person.id, now);
    return tokensFor(person, token.sessionId, all);
  }

  return {
    /** @throws {AppError} unauthenticated, the same and after the same time whatever was wrong */
    async signIn(email: string, password: string, userAgent: string): Promise<Tokens> {
      const person = await repositories(db).people.findByEmail(email.trim().toLowerCase());
      const fits = await passwordFits(person?.passwordHash ?? null, password);
      if (!person || !fits || !person.active) throw wrong();
      return inTransaction(db, async (trx) => {
        const all = repositories(trx);
        const now = clock();
        const session = { personId: person.id, userAgent: userAgent.slice(0, 255), at: now, expiresAt: until(now) };
        const sessionId = await all.sessions.insert(session);
        await all.people.seen(person.id, now);
        await all.audit.append({ at: now, personId: person.id, action: 'session.begin', subject: person.email });
        return tokensFor(person, sessionId, all);
      });
    },
    /**
     * Trades a refresh token for new tokens. Used again after the grace, it ends its session: one of the two users
     * is not the person.
     */
    async refresh(refreshToken: string | undefined): Promise<Tokens> {
      if (!refreshToken) throw over();
      const tokens = await inTransaction(db, async (trx) => {
        const all = repositories(trx);
        const token = await all.sessions.findToken(tokenHash(refreshToken));
        return token && rotate(token, all);
      });
      if (!tokens) throw over();
      return tokens;
    },
    /** Ends the session of a refresh token; nothing happens when there is none. */
    async signOut(refreshToken: string | undefined, sessionId: number | undefined): Promise<void> {
      await inTransaction(db, async (trx) => {
        const { sessions } = repositories(trx);
        const now = clock();
        const token = refreshToken ? await sessions.findToken(tokenHash(refreshToken)) : undefined;
        if (token) await sessions.revoke(token.sessionId, now);
        if (sessionId) await sessions.revoke(sessionId, now);
      });
    },
    /** The person of an access token whose session still lives; roles are those of this moment. */
    async identify({ sub, sid }: AccessClaims): Promise<SignedIn | undefined> {
      const person = await repositories(db).sessions.findPerson(sid, Number(sub), clock());
      return person && { ...person, sessionId: sid };
    },
    async list(person: SignedIn): Promise<(Session & { current: boolean })[]> {
      const sessions = await repositories(db).sessions.list(person.id, clock());
      return sessions.map((session) => ({ ...session, current: session.id === person.sessionId }));
    },
    async end(person: SignedIn, id: number): Promise<void> {
      if (!(await repositories(db).sessions.revokeOf(person.id, id, clock()))) throw notFound('session');
    },
    /** Forgets sessions that ended long ago. */
    async sweep(): Promise<void> {
      await repositories(db).sessions.removeExpired(new Date(clock().getTime() - sessionLife));
    },
  };
}

export type SessionsService = ReturnType<typeof sessionsService>;
