import { carrierTables } from '../../shared/fixed-point/tables';
import type { Design } from '../../shared/model/design';
import type { Plan } from '../../shared/model/plan';
import type { CarrierWords } from '../../shared/model/words';
import type { TargetSnapshot } from '../../shared/files/file-input';
import { inTransaction } from '../db';
import { notFound, stale } from '../errors';
import { itemsOf, type Items, type Page } from '../page';
import type { FileEntry, StoredFile } from '../repositories/release-files';
import type { StoredRevision, Tables } from '../repositories/revisions';
import { repositories } from '../repositories/index';
import type { Target } from '../repositories/targets';
import type { Context } from './context';
import { designOf } from './designs';
import { entryOf, revisionFile, revisionFiles } from './files';
import { loopSummary } from './loop-summary';
import { stateOf, targetOf } from './plans';
import { summariesOf, summaryOf, type RevisionSummary } from './revision-summaries';
import type { SignedIn } from './sessions';

export interface Revision extends RevisionSummary {
  plan: StoredRevision['plan'];
  description: Plan;
  design: Design;
  target: TargetSnapshot;
}

export interface Save {
  plan: Plan;
  /** What changed and why. */
  note: string;
}

const snapshotOf = ({ id: _id, version: _version, ...target }: Target): TargetSnapshot => target;

const tablesOf = ({ carrier }: Design): Tables =>
  carrier ? { carrier: carrierTables(carrier.words as CarrierWords) } : {};

export function revisionsService({ db, clock }: Context) {
  async function find(id: number): Promise<StoredRevision> {
    const revision = await repositories(db).revisions.find(id);
    if (!revision) throw notFound('revision');
    return revision;
  }

  async function get(id: number): Promise<Revision> {
    const { plan, description, design, target, ...record } = await find(id);
    return { ...(await summaryOf(record, repositories(db))), plan, description, design, target };
  }

  return {
    get,
    async list(planId: number, page: Page): Promise<Items<RevisionSummary>> {
      const all = repositories(db);
      if (!(await all.plans.find(planId))) throw notFound('plan');
      const { items, next } = itemsOf(await all.revisions.list(planId, page), page);
      return { items: await summariesOf(items, all), next };
    },
    /**
     * Saves the next revision of a plan; the author's draft goes with it.
     *
     * @param version of the plan that the edits start from
     * @throws {AppError} stale, with what is stored now
     */
    async save(planId: number, version: number, { plan, note }: Save, by: SignedIn): Promise<Revision> {
      const id = await inTransaction(db, async (trx) => {
        const all = repositories(trx);
        const target = await targetOf(plan, all);
        const design = designOf(plan, target.registerMap);
        const description = design.plan;
        const at = clock();
        if (!(await all.plans.find(planId))) throw notFound('plan');
        if (!(await all.plans.update(planId, version, description, target.id, at))) {
          throw stale('plan', await stateOf((await all.plans.find(planId))!, all));
        }
        const number = (await all.revisions.newestNumber(planId)) + 1;
        const about = { planId, number, targetId: target.id, note, description, savedBy: by.id, at };
        const made = { design, tables: tablesOf(design), target: snapshotOf(target), summary: loopSummary(design) };
        const revisionId = await all.revisions.insert({ ...about, ...made });
        await all.plans.setHead(planId, revisionId);
        await all.drafts.remove(planId, by.id);
        const detail = { plan: planId, number, digest: design.digest };
        await all.audit.append({ at, personId: by.id, action: 'revision.save', subject: description.name, detail });
        return revisionId;
      });
      return get(id);
    },
    async files(id: number): Promise<FileEntry[]> {
      return revisionFiles(await find(id)).map(entryOf);
    },
    async file(id: number, name: string): Promise<StoredFile> {
      return revisionFile(await find(id), name);
    },
  };
}

export type RevisionsService = ReturnType<typeof revisionsService>;
