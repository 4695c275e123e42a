import type { Knex } from 'knex';
import type { RegisterMap } from '../../shared/model/register-map';
import type { TargetBody } from '../../shared/model/target';
import { paged, type Page } from '../page';
import { parsed } from './columns';

export interface Target extends TargetBody {
  id: number;
  mapNumber: number;
  version: number;
}

export interface TargetSummary extends Omit<Target, 'registerMap'> {
  planCount: number;
  newestRelease: { version: string; state: string } | null;
}

interface TargetRow {
  id: number;
  slug: string;
  name: string;
  loop_clock_hz: number;
  c_prefix: string;
  base_address: string;
  register_map: unknown;
  map_number: number;
  version: number;
  created_at: Date;
  changed_at: Date;
}

const named = (row: Omit<TargetRow, 'register_map'>): Omit<Target, 'registerMap'> => ({
  id: row.id,
  slug: row.slug,
  name: row.name,
  loopClockHz: row.loop_clock_hz,
  cPrefix: row.c_prefix,
  baseAddress: row.base_address,
  mapNumber: row.map_number,
  version: row.version,
});

const toTarget = (row: TargetRow): Target => ({ ...named(row), registerMap: parsed<RegisterMap>(row.register_map) });

const toColumns = ({ slug, name, loopClockHz, cPrefix, baseAddress, registerMap }: TargetBody) => ({
  slug,
  name,
  loop_clock_hz: loopClockHz,
  c_prefix: cPrefix,
  base_address: baseAddress,
  register_map: JSON.stringify(registerMap),
});

type SummaryRow = TargetRow & { plan_count: number; release_version: string | null; release_state: string | null };

const toSummary = ({ plan_count, release_version, release_state, ...row }: SummaryRow): TargetSummary => ({
  ...named(row),
  planCount: plan_count,
  newestRelease: release_version === null ? null : { version: release_version, state: release_state! },
});

export function targetsRepository(db: Knex) {
  const targets = () => db<TargetRow>('targets');
  const summaries = () =>
    db('targets')
      .leftJoin('releases', 'releases.id', db.raw('(SELECT MAX(id) FROM releases WHERE target_id = targets.id)'))
      .select<SummaryRow[]>(
        'targets.*',
        'releases.version as release_version',
        'releases.state as release_state',
        db.raw('(SELECT COUNT(*) FROM plans WHERE target_id = targets.id) AS plan_count'),
      );
  return {
    async find(slug: string): Promise<Target | undefined> {
      const row = await targets().where({ slug }).first();
      return row && toTarget(row);
    },
    async findById(id: number): Promise<Target | undefined> {
      const row = await targets().where({ id }).first();
      return row && toTarget(row);
    },
    async findSummary(slug: string): Promise<TargetSummary | undefined> {
      const [row] = await summaries().where('targets.slug', slug);
      return row && toSummary(row);
    },
    async list(page: Page): Promise<TargetSummary[]> {
      return (await paged(summaries(), 'targets.id', page, 'asc')).map(toSummary);
    },
    async insert(target: TargetBody, at: Date): Promise<number> {
      const [id] = await targets().insert({ ...toColumns(target), created_at: at, changed_at: at });
      return id!;
    },
    /** Writes only over the version that was read; false means that someone else wrote first. */
    async update(id: number, version: number, target: TargetBody, mapNumber: number, at: Date): Promise<boolean> {
      const row = { ...toColumns(target), map_number: mapNumber, changed_at: at, version: version + 1 };
      return (await targets().where({ id, version }).update(row)) === 1;
    },
  };
}
