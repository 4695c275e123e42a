import type { Knex } from 'knex';
import { paged, type Page } from '../page';
import type { Role } from '../roles';
import { isoOrNull } from './columns';

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

/** A person as other things name them. */
export interface PersonName {
  id: number;
  name: string;
}

interface PersonRow {
  id: number;
  email: string;
  name: string;
  role: Role;
  active: 0 | 1;
  password_hash: string | null;
  created_at: Date;
  last_seen_at: Date | null;
  version: number;
}

export interface NewPerson {
  email: string;
  name: string;
  role: Role;
}

export type PersonChange = Partial<Pick<Person, 'name' | 'role' | 'active'>>;

const toPerson = ({ active, password_hash, last_seen_at, ...row }: PersonRow): Person => ({
  id: row.id,
  email: row.email,
  name: row.name,
  role: row.role,
  active: active === 1,
  hasPassword: password_hash !== null,
  lastSeenAt: isoOrNull(last_seen_at),
  version: row.version,
});

export function peopleRepository(db: Knex) {
  const people = () => db<PersonRow>('people');
  return {
    async find(id: number): Promise<Person | undefined> {
      const row = await people().where({ id }).first();
      return row && toPerson(row);
    },
    async findByEmail(email: string): Promise<(Person & { passwordHash: string | null }) | undefined> {
      const row = await people().where({ email }).first();
      return row && { ...toPerson(row), passwordHash: row.password_hash };
    },
    async passwordHash(id: number): Promise<string | null> {
      return (await people().where({ id }).first('password_hash'))?.password_hash ?? null;
    },
    async list(page: Page): Promise<Person[]> {
      return (await paged(people(), 'id', page, 'asc')).map(toPerson);
    },
    async any(): Promise<boolean> {
      return (await people().first('id')) !== undefined;
    },
    async anyPassword(): Promise<boolean> {
      return (await people().whereNotNull('password_hash').first('id')) !== undefined;
    },
    /** Locks the rows of the admins who may sign in, so that two of them cannot remove each other at once. */
    async lockActiveAdmins(): Promise<number[]> {
      const rows = await people().where({ role: 'admin', active: 1 }).select('id').forUpdate();
      return rows.map(({ id }) => id);
    },
    async insert(person: NewPerson, at: Date): Promise<number> {
      const [id] = await people().insert({ ...person, created_at: at });
      return id!;
    },
    /** Writes only over the version that was read; false means that someone else wrote first. */
    async update(id: number, version: number, { active, ...change }: PersonChange): Promise<boolean> {
      const flag = active === undefined ? {} : { active: active ? (1 as const) : (0 as const) };
      return (
        (await people()
          .where({ id, version })
          .update({ ...change, ...flag, version: version + 1 })) === 1
      );
    },
    async setPasswordHash(id: number, hash: string): Promise<void> {
      await people().where({ id }).update({ password_hash: hash });
    },
    async seen(id: number, at: Date): Promise<void> {
      await people().where({ id }).update({ last_seen_at: at });
    },
  };
}
