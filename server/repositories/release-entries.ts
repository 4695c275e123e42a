import type { Knex } from 'knex';

export interface EntryRecord {
  slot: string;
  revisionId: number;
  /** Target that the revision was saved for. */
  targetId: number;
  plan: { id: number; name: string };
  /** Number of the plan's newest revision. */
  newest: number;
}

interface EntryRow {
  slot: string;
  revision_id: number;
  target_id: number;
  plan_id: number;
  plan_name: string;
  newest: number;
}

const toEntry = (row: EntryRow): EntryRecord => ({
  slot: row.slot,
  revisionId: row.revision_id,
  targetId: row.target_id,
  plan: { id: row.plan_id, name: row.plan_name },
  newest: row.newest,
});

export function releaseEntriesRepository(db: Knex) {
  const entries = () => db('release_entries');
  return {
    /** In the order of their slots, byte by byte. */
    async list(releaseId: number): Promise<EntryRecord[]> {
      const rows = await entries()
        .join('revisions', 'revisions.id', 'release_entries.revision_id')
        .join('plans', 'plans.id', 'revisions.plan_id')
        .where({ release_id: releaseId })
        .orderBy('slot')
        .select<EntryRow[]>(
          'release_entries.slot',
          'release_entries.revision_id',
          'revisions.target_id',
          'plans.id as plan_id',
          'plans.name as plan_name',
          db.raw('(SELECT MAX(number) FROM revisions AS others WHERE others.plan_id = plans.id) AS newest'),
        );
      return rows.map(toEntry);
    },
    async put(releaseId: number, slot: string, revisionId: number): Promise<void> {
      const row = { release_id: releaseId, slot, revision_id: revisionId };
      await entries().insert(row).onConflict(['release_id', 'slot']).merge(['revision_id']);
    },
    async remove(releaseId: number, slot: string): Promise<boolean> {
      return (await entries().where({ release_id: releaseId, slot }).delete()) === 1;
    },
    async removeAll(releaseId: number): Promise<void> {
      await entries().where({ release_id: releaseId }).delete();
    },
  };
}
