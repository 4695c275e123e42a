import type { Knex } from 'knex';
import type { Design } from '../../shared/model/design';
import type { Plan } from '../../shared/model/plan';
import type { TargetSnapshot } from '../../shared/files/file-input';
import { paged, type Page } from '../page';
import { parsed } from './columns';
import type { TargetName } from './plans';
import { headColumns, toHead, type HeadRow, type LoopSummary, type RevisionHead } from './revision-rows';

export interface RevisionRecord extends RevisionHead {
  note: string;
}

/** A revision whole, as it was saved. */
export interface StoredRevision extends RevisionRecord {
  plan: { id: number; name: string; target: TargetName };
  targetId: number;
  description: Plan;
  design: Design;
  tables: Tables;
  target: TargetSnapshot;
}

/** Integer tables of each loop, from which a replay starts. */
export type Tables = Partial<Record<'carrier' | 'clock', object>>;

export interface NewRevision {
  planId: number;
  number: number;
  targetId: number;
  note: string;
  description: Plan;
  design: Design;
  tables: Tables;
  target: TargetSnapshot;
  summary: LoopSummary | null;
  savedBy: number;
  at: Date;
}

type RecordRow = HeadRow & { note: string };

type WholeRow = RecordRow & {
  plan_id: number;
  plan_name: string;
  plan_target_slug: string;
  plan_target_name: string;
  target_id: number;
  description: unknown;
  design: unknown;
  tables: unknown;
  target: unknown;
};

const recordColumns = [...headColumns, 'revisions.note'];

const wholeColumns = [
  ...recordColumns,
  ...['plan_id', 'target_id', 'description', 'design', 'tables', 'target'].map((name) => `revisions.${name}`),
  'plans.name as plan_name',
  'targets.slug as plan_target_slug',
  'targets.name as plan_target_name',
];

const toRecord = (row: RecordRow): RevisionRecord => ({ ...toHead(row), note: row.note });

const toWhole = (row: WholeRow): StoredRevision => ({
  ...toRecord(row),
  plan: {
    id: row.plan_id,
    name: row.plan_name,
    target: { slug: row.plan_target_slug, name: row.plan_target_name },
  },
  targetId: row.target_id,
  description: parsed<Plan>(row.description),
  design: parsed<Design>(row.design),
  tables: parsed<Tables>(row.tables),
  target: parsed<TargetSnapshot>(row.target),
});

const count = (design: Design, severity: string) => design.findings.filter((f) => f.severity === severity).length;

const toRow = (revision: NewRevision) => ({
  plan_id: revision.planId,
  number: revision.number,
  target_id: revision.targetId,
  note: revision.note,
  engine: revision.design.engine,
  digest: revision.design.digest,
  description: JSON.stringify(revision.description),
  design: JSON.stringify(revision.design),
  tables: JSON.stringify(revision.tables),
  target: JSON.stringify(revision.target),
  summary: JSON.stringify(revision.summary),
  pass_count: count(revision.design, 'pass'),
  caution_count: count(revision.design, 'caution'),
  fail_count: count(revision.design, 'fail'),
  saved_by: revision.savedBy,
  saved_at: revision.at,
});

export function revisionsRepository(db: Knex) {
  const records = () =>
    db('revisions').join('people', 'people.id', 'revisions.saved_by').select<RecordRow[]>(recordColumns);
  return {
    async find(id: number): Promise<StoredRevision | undefined> {
      const query = db('revisions')
        .join('people', 'people.id', 'revisions.saved_by')
        .join('plans', 'plans.id', 'revisions.plan_id')
        .join('targets', 'targets.id', 'plans.target_id')
        .where('revisions.id', id);
      const row = await query.first<WholeRow | undefined>(wholeColumns);
      return row && toWhole(row);
    },
    async list(planId: number, page: Page): Promise<RevisionRecord[]> {
      return (await paged(records().where({ plan_id: planId }), 'revisions.id', page, 'desc')).map(toRecord);
    },
    async listByIds(ids: readonly number[]): Promise<RevisionRecord[]> {
      return (await records().whereIn('revisions.id', ids)).map(toRecord);
    },
    /** Number of the newest revision of a plan, 0 before the first one. */
    async newestNumber(planId: number): Promise<number> {
      const row = await db('revisions')
        .where({ plan_id: planId })
        .max<{ newest: number | null }>('number as newest')
        .first();
      return row?.newest ?? 0;
    },
    async insert(revision: NewRevision): Promise<number> {
      const [id] = await db('revisions').insert(toRow(revision));
      return id!;
    },
  };
}
