import type { Knex } from 'knex';
import type { Plan } from '../../shared/model/plan';
import { paged, type Page } from '../page';
import { iso, parsed } from './columns';
import type { PersonName } from './people';
import { headColumns, toHead, type HeadRow, type RevisionHead } from './revision-rows';

export interface TargetName {
  slug: string;
  name: string;
}

/** A plan's own row; its content is that of its head revision, before the first one the initial description. */
export interface PlanRecord {
  id: number;
  name: string;
  target: TargetName;
  version: number;
  headRevisionId: number | null;
  initial: Plan;
  createdBy: PersonName;
  createdAt: string;
}

export interface PlanListing {
  id: number;
  name: string;
  target: TargetName;
  modulation: string;
  symbolRateBd: number;
  version: number;
  head: RevisionHead | null;
  hasDraft: boolean;
  changedAt: string;
}

interface PlanRow {
  id: number;
  target_id: number;
  name: string;
  modulation: string;
  symbol_rate_bd: number;
  description: unknown;
  head_revision_id: number | null;
  version: number;
  created_by: number;
  created_at: Date;
  changed_at: Date;
}

type RecordRow = PlanRow & { target_slug: string; target_name: string; creator_name: string };
type ListingRow = PlanRow & HeadRow & { target_slug: string; target_name: string; has_draft: number };

/** What of a description is kept beside it for lists. */
const listed = (plan: Plan, targetId: number, at: Date) => ({
  target_id: targetId,
  name: plan.name,
  modulation: plan.signal.modulation!,
  symbol_rate_bd: plan.signal.symbolRateBd,
  changed_at: at,
});

const toRecord = (row: RecordRow): PlanRecord => ({
  id: row.id,
  name: row.name,
  target: { slug: row.target_slug, name: row.target_name },
  version: row.version,
  headRevisionId: row.head_revision_id,
  initial: parsed<Plan>(row.description),
  createdBy: { id: row.created_by, name: row.creator_name },
  createdAt: iso(row.created_at),
});

const toListing = (row: ListingRow): PlanListing => ({
  id: row.id,
  name: row.name,
  target: { slug: row.target_slug, name: row.target_name },
  modulation: row.modulation,
  symbolRateBd: row.symbol_rate_bd,
  version: row.version,
  head: row.head_revision_id === null ? null : toHead(row),
  hasDraft: row.has_draft === 1,
  changedAt: iso(row.changed_at),
});

export function plansRepository(db: Knex) {
  const plans = () => db<PlanRow>('plans');
  const withTarget = () => db('plans').join('targets', 'targets.id', 'plans.target_id');
  const targetColumns = ['targets.slug as target_slug', 'targets.name as target_name'];
  return {
    async find(id: number): Promise<PlanRecord | undefined> {
      const query = withTarget().join('people', 'people.id', 'plans.created_by').where('plans.id', id);
      const columns = ['plans.*', ...targetColumns, 'people.name as creator_name'];
      const row = await query.first<RecordRow | undefined>(columns);
      return row && toRecord(row);
    },
    async list(personId: number, page: Page): Promise<PlanListing[]> {
      const query = withTarget()
        .leftJoin('revisions', 'revisions.id', 'plans.head_revision_id')
        .leftJoin('people', 'people.id', 'revisions.saved_by')
        .leftJoin('drafts', (on) =>
          on.on('drafts.plan_id', 'plans.id').andOn('drafts.person_id', db.raw('?', [personId])),
        );
      const own = ['id', 'name', 'modulation', 'symbol_rate_bd', 'version', 'changed_at', 'head_revision_id'];
      const columns = [...own.map((name) => `plans.${name}`), ...targetColumns, ...headColumns];
      const rows = query.select<ListingRow[]>(...columns, db.raw('drafts.plan_id IS NOT NULL AS has_draft'));
      return (await paged(rows, 'plans.id', page, 'asc')).map(toListing);
    },
    async insert(plan: Plan, targetId: number, personId: number, at: Date): Promise<number> {
      const row = {
        ...listed(plan, targetId, at),
        description: JSON.stringify(plan),
        created_by: personId,
        created_at: at,
      };
      const [id] = await plans().insert(row);
      return id!;
    },
    /** Writes only over the version that was read; false means that someone else wrote first. Locks the row until the end. */
    async update(id: number, version: number, plan: Plan, targetId: number, at: Date): Promise<boolean> {
      const row = { ...listed(plan, targetId, at), version: version + 1 };
      return (await plans().where({ id, version }).update(row)) === 1;
    },
    async setHead(id: number, revisionId: number): Promise<void> {
      await plans().where({ id }).update({ head_revision_id: revisionId });
    },
  };
}
