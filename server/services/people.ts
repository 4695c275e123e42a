import type { Knex } from 'knex';
import { inTransaction } from '../db';
import { conflict, notFound, stale } from '../errors';
import { itemsOf, type Items, type Page } from '../page';
import type { AuditEntry } from '../repositories/audit';
import { repositories } from '../repositories/index';
import type { NewPerson, Person, PersonChange } from '../repositories/people';
import type { Context } from './context';
import type { PasswordsService } from './passwords';

export interface Invitation {
  person: Person;
  /** One-time link, shown once. */
  link: string;
}

const losesAdmin = (person: Person, { role, active }: PersonChange): boolean =>
  person.role === 'admin' && person.active && ((role !== undefined && role !== 'admin') || active === false);

/** There is always somebody who can invite people. */
async function keepOneAdmin(person: Person, change: PersonChange, trx: Knex): Promise<void> {
  const admins = await repositories(trx).people.lockActiveAdmins();
  if (losesAdmin(person, change) && admins.length <= 1) throw conflict('The last admin must stay one.');
}

export function peopleService({ db, clock }: Context, passwords: PasswordsService) {
  async function get(id: number): Promise<Person> {
    const person = await repositories(db).people.find(id);
    if (!person) throw notFound('person');
    return person;
  }

  /** @param by the admin; null when the first admin is made by the server itself */
  async function invite(input: NewPerson, by: number | null): Promise<Invitation> {
    const person = { ...input, email: input.email.toLowerCase() };
    return inTransaction(db, async (trx) => {
      const { audit, people } = repositories(trx);
      if (await people.findByEmail(person.email)) throw conflict('A person with this e-mail address exists already.');
      const id = await people.insert(person, clock());
      const link = await passwords.makeLink(id, trx);
      const { email, name, role } = person;
      await audit.append({
        at: clock(),
        personId: by,
        action: 'person.invite',
        subject: email,
        detail: { name, role },
      });
      return { person: (await people.find(id))!, link };
    });
  }

  return {
    get,
    invite,
    async any(): Promise<boolean> {
      return repositories(db).people.any();
    },
    /**
     * As long as nobody can sign in, the link with which the first admin sets a password; each call makes a new one.
     *
     * @returns undefined once anyone has a password
     */
    async firstAdminLink(email: string): Promise<string | undefined> {
      const { people } = repositories(db);
      if (await people.anyPassword()) return undefined;
      const known = await people.findByEmail(email);
      if (known) return passwords.makeLink(known.id);
      return (await invite({ email, name: 'First admin', role: 'admin' }, null)).link;
    },
    async list(page: Page): Promise<Items<Person>> {
      return itemsOf(await repositories(db).people.list(page), page);
    },
    /** Changes role, name or access; whoever may not sign in any more is signed out at once. */
    async change(id: number, version: number, change: PersonChange, by: number): Promise<Person> {
      return inTransaction(db, async (trx) => {
        const { audit, people, sessions } = repositories(trx);
        const person = await people.find(id);
        if (!person) throw notFound('person');
        await keepOneAdmin(person, change, trx);
        if (!(await people.update(id, version, change))) throw stale('person', await people.find(id));
        if (change.active === false) await sessions.revokeAll(id, clock());
        await audit.append({
          at: clock(),
          personId: by,
          action: 'person.change',
          subject: person.email,
          detail: change,
        });
        return (await people.find(id))!;
      });
    },
    async newLink(id: number, by: number): Promise<{ link: string }> {
      return inTransaction(db, async (trx) => {
        const { audit, people } = repositories(trx);
        const person = await people.find(id);
        if (!person) throw notFound('person');
        const link = await passwords.makeLink(id, trx);
        await audit.append({ at: clock(), personId: by, action: 'person.link', subject: person.email });
        return { link };
      });
    },
    async audit(page: Page): Promise<Items<AuditEntry>> {
      return itemsOf(await repositories(db).audit.list(page), page);
    },
  };
}

export type PeopleService = ReturnType<typeof peopleService>;
