import type { Knex } from 'knex';
import { paged, type Page } from '../page';
import { iso, isoOrNull } from './columns';
import type { PersonName } from './people';
import type { TargetName } from './plans';

export interface ReleaseSummary {
  id: number;
  target: TargetName;
  version: string;
  state: 'draft' | 'frozen';
  entryCount: number;
  createdAt: string;
  createdBy: PersonName;
  frozenAt: string | null;
  frozenBy: PersonName | null;
  /** SHA-256 of manifest.json, hex; null until frozen. */
  digest: string | null;
  rowVersion: number;
}

export type ReleaseRecord = ReleaseSummary & { targetId: number };

/** The newest release that holds a revision of a plan. */
export interface ReleaseOfPlan {
  version: string;
  state: string;
  revisionNumber: number;
}

interface SummaryRow {
  id: number;
  target_id: number;
  target_slug: string;
  target_name: string;
  version: string;
  state: 'draft' | 'frozen';
  row_version: number;
  entry_count: number;
  created_by: number;
  created_by_name: string;
  created_at: Date;
  frozen_by: number | null;
  frozen_by_name: string | null;
  frozen_at: Date | null;
  digest: string | null;
}

const toRecord = (row: SummaryRow): ReleaseRecord => ({
  id: row.id,
  targetId: row.target_id,
  target: { slug: row.target_slug, name: row.target_name },
  version: row.version,
  state: row.state,
  entryCount: row.entry_count,
  createdAt: iso(row.created_at),
  createdBy: { id: row.created_by, name: row.created_by_name },
  frozenAt: isoOrNull(row.frozen_at),
  frozenBy: row.frozen_by === null ? null : { id: row.frozen_by, name: row.frozen_by_name! },
  digest: row.digest,
  rowVersion: row.row_version,
});

interface OfPlanRow {
  plan_id: number;
  version: string;
  state: string;
  number: number;
}

export interface Freeze {
  digest: string;
  personId: number;
  at: Date;
}

export function releasesRepository(db: Knex) {
  const releases = () => db('releases');
  const summaries = () =>
    releases()
      .join('targets', 'targets.id', 'releases.target_id')
      .join('people as creators', 'creators.id', 'releases.created_by')
      .leftJoin('people as freezers', 'freezers.id', 'releases.frozen_by')
      .select<SummaryRow[]>(
        'releases.*',
        'targets.slug as target_slug',
        'targets.name as target_name',
        'creators.name as created_by_name',
        'freezers.name as frozen_by_name',
        db.raw('(SELECT COUNT(*) FROM release_entries WHERE release_id = releases.id) AS entry_count'),
      );
  return {
    async find(id: number): Promise<ReleaseRecord | undefined> {
      const [row] = await summaries().where('releases.id', id);
      return row && toRecord(row);
    },
    async findByVersion(slug: string, version: string): Promise<ReleaseRecord | undefined> {
      const [row] = await summaries().where({ 'targets.slug': slug, 'releases.version': version });
      return row && toRecord(row);
    },
    async list(slug: string | undefined, page: Page): Promise<ReleaseRecord[]> {
      const query = slug === undefined ? summaries() : summaries().where('targets.slug', slug);
      return (await paged(query, 'releases.id', page, 'desc')).map(toRecord);
    },
    /** The newest release of each plan that is in one, by the plan's id. */
    async newestOfPlans(planIds: readonly number[]): Promise<Map<number, ReleaseOfPlan>> {
      const rows = await db('release_entries')
        .join('releases', 'releases.id', 'release_entries.release_id')
        .join('revisions', 'revisions.id', 'release_entries.revision_id')
        .whereIn('revisions.plan_id', planIds)
        .orderBy(['releases.id', 'revisions.number'])
        .select<OfPlanRow[]>('revisions.plan_id', 'releases.version', 'releases.state', 'revisions.number');
      return new Map(rows.map(({ plan_id, number, ...row }) => [plan_id, { ...row, revisionNumber: number }]));
    },
    async insert(targetId: number, version: string, personId: number, at: Date): Promise<number> {
      const [id] = await releases().insert({ target_id: targetId, version, created_by: personId, created_at: at });
      return id!;
    },
    /** Raises the version of a draft; false means that someone else wrote first. Locks the row until the end. */
    async raiseVersion(id: number, version: number): Promise<boolean> {
      const row = releases().where({ id, row_version: version });
      return (await row.update({ row_version: version + 1 })) === 1;
    },
    /** Nobody changes the release or its entries until the transaction ends. */
    async lock(id: number): Promise<void> {
      await releases().where({ id }).forUpdate().first('id');
    },
    async freeze(id: number, version: number, { digest, personId, at }: Freeze): Promise<boolean> {
      const row = { state: 'frozen', digest, frozen_by: personId, frozen_at: at, row_version: version + 1 };
      return (await releases().where({ id, row_version: version }).update(row)) === 1;
    },
    async remove(id: number, version: number): Promise<boolean> {
      return (await releases().where({ id, row_version: version }).delete()) === 1;
    },
  };
}
