import type { Knex } from 'knex';

interface LinkRow {
  id: number;
  person_id: number;
  token_hash: string;
  created_at: Date;
  expires_at: Date;
  used_at: Date | null;
}

export function passwordLinksRepository(db: Knex) {
  const links = () => db<LinkRow>('password_links');
  const open = (hash: string, at: Date) =>
    links().where({ token_hash: hash }).whereNull('used_at').where('expires_at', '>', at);
  return {
    async insert(personId: number, hash: string, at: Date, expiresAt: Date): Promise<void> {
      await links().insert({ person_id: personId, token_hash: hash, created_at: at, expires_at: expiresAt });
    },
    /** The person of a link that was not used and has not expired. */
    async findPersonId(hash: string, at: Date): Promise<number | undefined> {
      return (await open(hash, at).first('person_id'))?.person_id;
    },
    /** False when somebody used it first. */
    async use(hash: string, at: Date): Promise<boolean> {
      return (await open(hash, at).update({ used_at: at })) === 1;
    },
    async removeOf(personId: number): Promise<void> {
      await links().where({ person_id: personId }).whereNull('used_at').delete();
    },
  };
}
