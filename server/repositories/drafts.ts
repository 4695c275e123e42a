import type { Knex } from 'knex';
import { iso, parsed } from './columns';

/** What one person has typed into a plan and not saved. */
export interface Draft {
  /** Number of the revision that the edits start from; 0 before the first one. */
  basedOn: number;
  /** The last values that could be read; need not be a whole plan. */
  plan: object;
  /** Text of the fields that cannot be read, by JSON pointer. */
  typed: Record<string, string>;
}

export type StoredDraft = Draft & { updatedAt: string };

interface DraftRow {
  plan_id: number;
  person_id: number;
  based_on: number;
  plan: unknown;
  typed: unknown;
  updated_at: Date;
}

const toDraft = (row: DraftRow): StoredDraft => ({
  basedOn: row.based_on,
  plan: parsed<object>(row.plan),
  typed: parsed<Record<string, string>>(row.typed),
  updatedAt: iso(row.updated_at),
});

export function draftsRepository(db: Knex) {
  const drafts = () => db<DraftRow>('drafts');
  return {
    async find(planId: number, personId: number): Promise<StoredDraft | undefined> {
      const row = await drafts().where({ plan_id: planId, person_id: personId }).first();
      return row && toDraft(row);
    },
    async put(planId: number, personId: number, draft: Draft, at: Date): Promise<void> {
      const content = { plan: JSON.stringify(draft.plan), typed: JSON.stringify(draft.typed) };
      const row = { plan_id: planId, person_id: personId, based_on: draft.basedOn, ...content, updated_at: at };
      await drafts().insert(row).onConflict(['plan_id', 'person_id']).merge();
    },
    async remove(planId: number, personId: number): Promise<void> {
      await drafts().where({ plan_id: planId, person_id: personId }).delete();
    },
  };
}
