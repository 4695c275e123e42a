import { hash, verify, type Algorithm } from '@node-rs/argon2';
import { conflict, invalidAt, notFound } from '../errors';
import { inTransaction } from '../db';
import { repositories } from '../repositories/index';
import type { Context } from './context';
import { newToken, tokenHash } from './opaque-tokens';

// Argon2id with 19 MiB, two passes, one lane: the second of OWASP's equivalent choices.
const argon2id: Algorithm.Argon2id = 2;
const cost = { algorithm: argon2id, memoryCost: 19_456, timeCost: 2, parallelism: 1 };

/** Life of a one-time link, ms. */
const linkLife = 72 * 3_600_000;

// For people who do not exist or have no password: checking against it takes as long as checking against theirs.
const nobody = hash(newToken(), cost);

const hashed = (password: string): Promise<string> => hash(password, cost);

/** Whether a password fits a stored hash; takes the same time when there is none, and then never fits. */
export async function passwordFits(stored: string | null, password: string): Promise<boolean> {
  const fits = await verify(stored ?? (await nobody), password);
  return fits && stored !== null;
}

const linkGone = () => notFound('link any more: it was used or has expired. Ask for a new one');

export function passwordsService({ db, clock, publicUrl }: Context) {
  return {
    /**
     * Makes a one-time link with which a person sets a password; older ones of this person stop working.
     *
     * @param trx the caller's transaction or pool
     */
    async makeLink(personId: number, trx = db): Promise<string> {
      const token = newToken();
      const { passwordLinks } = repositories(trx);
      const now = clock();
      await passwordLinks.removeOf(personId);
      await passwordLinks.insert(personId, tokenHash(token), now, new Date(now.getTime() + linkLife));
      return `${publicUrl}/password/${token}`;
    },
    /** Whose a link is. */
    async checkLink(token: string): Promise<{ email: string; name: string }> {
      const { passwordLinks, people } = repositories(db);
      const personId = await passwordLinks.findPersonId(tokenHash(token), clock());
      const person = personId && (await people.find(personId));
      if (!person || !person.active) throw linkGone();
      return { email: person.email, name: person.name };
    },
    /** Sets a password by a link, which is used up, and ends the person's sessions. */
    async setByLink(token: string, password: string): Promise<void> {
      const link = tokenHash(token);
      const passwordHash = await hashed(password);
      await inTransaction(db, async (trx) => {
        const { audit, passwordLinks, people, sessions } = repositories(trx);
        const now = clock();
        const personId = await passwordLinks.findPersonId(link, now);
        const person = personId && (await people.find(personId));
        if (!person || !person.active || !(await passwordLinks.use(link, now))) throw linkGone();
        await people.setPasswordHash(person.id, passwordHash);
        await sessions.revokeAll(person.id, now);
        await audit.append({ at: now, personId: person.id, action: 'password.set', subject: person.email });
      });
    },
    /** Changes a password and ends the person's other sessions. */
    async change(personId: number, sessionId: number, current: string, password: string): Promise<void> {
      const stored = await repositories(db).people.passwordHash(personId);
      if (!(await passwordFits(stored, current))) throw invalidAt('/current', 'is not your password');
      const passwordHash = await hashed(password);
      await inTransaction(db, async (trx) => {
        const { audit, people, sessions } = repositories(trx);
        const now = clock();
        const person = await people.find(personId);
        if (!person) throw conflict('This person does not exist any more.');
        await people.setPasswordHash(personId, passwordHash);
        await sessions.revokeAll(personId, now, sessionId);
        await audit.append({ at: now, personId, action: 'password.change', subject: person.email });
      });
    },
  };
}

export type PasswordsService = ReturnType<typeof passwordsService>;
