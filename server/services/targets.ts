import { mapFindings } from '../../shared/registers/map';
import type { TargetBody } from '../../shared/model/target';
import { inTransaction } from '../db';
import { invalid, notFound, stale } from '../errors';
import { itemsOf, type Items, type Page } from '../page';
import { repositories } from '../repositories/index';
import type { Target, TargetSummary } from '../repositories/targets';
import type { Context } from './context';
import { canonicalJson } from './digest';
import type { SignedIn } from './sessions';

export type TargetAnswer = Omit<TargetSummary, 'id'> & Pick<Target, 'registerMap'>;

const withoutId = ({ id: _id, ...rest }: TargetSummary): Omit<TargetSummary, 'id'> => rest;

/** A map that contradicts itself would give a header that does; what is only doubtful passes. */
function requireSoundMap({ registerMap, baseAddress }: TargetBody): void {
  const failing = mapFindings(registerMap, baseAddress).filter(({ severity }) => severity === 'fail');
  if (failing.length === 0) return;
  throw invalid(
    failing.map(({ slug, fields, reason }) => ({
      pointer: slug === 'map.address' ? '/baseAddress' : `/registerMap${fields[0] ?? ''}`,
      detail: reason,
    })),
  );
}

/** The registers and where they lie: what a header's map number stands for. */
const mapOf = ({ registerMap, baseAddress }: Pick<TargetBody, 'registerMap' | 'baseAddress'>): string =>
  canonicalJson({ registerMap, baseAddress });

export function targetsService({ db, clock }: Context) {
  async function get(slug: string): Promise<TargetAnswer> {
    const { targets } = repositories(db);
    const [summary, target] = await Promise.all([targets.findSummary(slug), targets.find(slug)]);
    if (!summary || !target) throw notFound('target');
    return { ...withoutId(summary), registerMap: target.registerMap };
  }

  return {
    get,
    async list(page: Page): Promise<Items<Omit<TargetSummary, 'id'>>> {
      const { items, next } = itemsOf(await repositories(db).targets.list(page), page);
      return { items: items.map(withoutId), next };
    },
    async create(target: TargetBody, by: SignedIn): Promise<TargetAnswer> {
      requireSoundMap(target);
      await inTransaction(db, async (trx) => {
        const { audit, targets } = repositories(trx);
        await targets.insert(target, clock());
        await audit.append({ at: clock(), personId: by.id, action: 'target.create', subject: target.slug });
      });
      return get(target.slug);
    },
    /** A changed register map or base address gets the next map number; saved revisions keep the map that they were saved with. */
    async update(slug: string, version: number, target: TargetBody, by: SignedIn): Promise<TargetAnswer> {
      requireSoundMap(target);
      await inTransaction(db, async (trx) => {
        const { audit, targets } = repositories(trx);
        const stored = await targets.find(slug);
        if (!stored) throw notFound('target');
        const mapNumber = stored.mapNumber + (mapOf(stored) === mapOf(target) ? 0 : 1);
        if (!(await targets.update(stored.id, version, target, mapNumber, clock()))) throw stale('target');
        const detail = { mapNumber };
        await audit.append({ at: clock(), personId: by.id, action: 'target.change', subject: target.slug, detail });
      });
      return get(target.slug);
    },
  };
}

export type TargetsService = ReturnType<typeof targetsService>;
