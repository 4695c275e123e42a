import type { Knex } from 'knex';
import semver from 'semver';
import { inTransaction } from '../db';
import { conflict, invalidAt, notFound, stale } from '../errors';
import { itemsOf, type Items, type Page } from '../page';
import { repositories, type Repositories } from '../repositories/index';
import type { EntryRecord } from '../repositories/release-entries';
import type { FileEntry, StoredFile } from '../repositories/release-files';
import type { ReleaseRecord, ReleaseSummary } from '../repositories/releases';
import type { Context } from './context';
import { gatesOf, type Gate } from './release-gates';
import { releaseFiles, type FilledSlot } from './manifest';
import { summariesOf, type RevisionSummary } from './revision-summaries';
import type { SignedIn } from './sessions';

export interface ReleaseEntry {
  slot: string;
  plan: { id: number; name: string };
  revision: RevisionSummary;
  /** Number of the plan's newest revision where that is a newer one. */
  newer: number | null;
}

export interface Release extends ReleaseSummary {
  entries: ReleaseEntry[];
  gates: Gate[];
  files: FileEntry[];
}

const withoutTargetId = ({ targetId: _targetId, ...summary }: ReleaseRecord): ReleaseSummary => summary;

const slotPattern = /^[a-z][a-z0-9_]{0,30}$/;

type Filled = EntryRecord & { revision: RevisionSummary };

async function filledEntries(releaseId: number, all: Repositories): Promise<Filled[]> {
  const entries = await all.releaseEntries.list(releaseId);
  const records = await all.revisions.listByIds(entries.map(({ revisionId }) => revisionId));
  const byId = new Map((await summariesOf(records, all)).map((revision) => [revision.id, revision]));
  return entries.map((entry) => ({ ...entry, revision: byId.get(entry.revisionId)! }));
}

async function whole(release: ReleaseRecord, all: Repositories): Promise<Release> {
  const filled = await filledEntries(release.id, all);
  const entries = filled.map(({ slot, plan, newest, revision }) => {
    return { slot, plan, revision, newer: newest > revision.number ? newest : null };
  });
  const gates = release.state === 'draft' ? gatesOf(release, filled) : [];
  return { ...withoutTargetId(release), entries, gates, files: await all.releaseFiles.list(release.id) };
}

async function filesOf({ target, version }: ReleaseRecord, entries: readonly Filled[], { revisions }: Repositories) {
  const slots: FilledSlot[] = [];
  for (const { slot, revisionId } of entries) slots.push({ slot, revision: (await revisions.find(revisionId))! });
  return releaseFiles({ target, version, entries: slots });
}

/** The draft, its version raised and its row locked until the transaction ends. */
async function openDraft(id: number, version: number, all: Repositories): Promise<ReleaseRecord> {
  const release = await all.releases.find(id);
  if (!release) throw notFound('release');
  if (release.state !== 'draft') throw conflict('A frozen release cannot be changed.');
  if (!(await all.releases.raiseVersion(id, version))) {
    throw stale('release', withoutTargetId((await all.releases.find(id))!));
  }
  return release;
}

/** @throws {AppError} conflict, when the release is not ready or the typed version is another */
function requireFreezable(release: ReleaseRecord, typed: string, entries: readonly Filled[]): void {
  if (typed !== release.version) throw invalidAt('/version', `is not the version of this release, ${release.version}`);
  const shut = gatesOf(release, entries).filter(({ state }) => state === 'shut');
  if (shut.length > 0) throw conflict(`The release is not ready: ${shut.map(({ text }) => text).join(' ')}`);
}

export function releasesService({ db, clock }: Context) {
  const log = (trx: Knex, by: SignedIn, action: string, { target, version }: ReleaseSummary, detail: object = {}) =>
    repositories(trx).audit.append({
      at: clock(),
      personId: by.id,
      action,
      subject: `${target.slug} ${version}`,
      detail,
    });

  async function get(id: number): Promise<Release> {
    const all = repositories(db);
    const release = await all.releases.find(id);
    if (!release) throw notFound('release');
    return whole(release, all);
  }

  async function frozenFile(release: ReleaseRecord | undefined, name: string): Promise<StoredFile> {
    if (!release || release.state !== 'frozen') throw notFound('frozen release');
    const file = await repositories(db).releaseFiles.find(release.id, name);
    if (!file) throw notFound('file');
    return file;
  }

  return {
    get,
    async list(slug: string | undefined, page: Page): Promise<Items<ReleaseSummary>> {
      const { items, next } = itemsOf(await repositories(db).releases.list(slug, page), page);
      return { items: items.map(withoutTargetId), next };
    },
    async getByVersion(slug: string, version: string): Promise<Release> {
      const all = repositories(db);
      const release = await all.releases.findByVersion(slug, version);
      if (!release) throw notFound('release');
      return whole(release, all);
    },
    async create(slug: string, version: string, by: SignedIn): Promise<Release> {
      if (semver.valid(version) !== version) throw invalidAt('/version', 'must be a version such as 2.4.0');
      const id = await inTransaction(db, async (trx) => {
        const { releases, targets } = repositories(trx);
        const target = await targets.find(slug);
        if (!target) throw invalidAt('/target', 'is not the slug of a target');
        if (await releases.findByVersion(slug, version))
          throw conflict(`${target.name} has a release ${version} already.`);
        const id = await releases.insert(target.id, version, by.id, clock());
        await log(trx, by, 'release.create', (await releases.find(id))!);
        return id;
      });
      return get(id);
    },
    /** Puts a revision into a slot of a draft, in place of what was there. */
    async putEntry(id: number, version: number, slot: string, revisionId: number, by: SignedIn): Promise<Release> {
      if (!slotPattern.test(slot)) throw invalidAt('/slot', 'must be a C identifier in small letters');
      await inTransaction(db, async (trx) => {
        const all = repositories(trx);
        const release = await openDraft(id, version, all);
        const revision = await all.revisions.find(revisionId);
        if (!revision) throw invalidAt('/revisionId', 'is not a revision');
        if (revision.targetId !== release.targetId) {
          throw invalidAt('/revisionId', `was saved for another target than ${release.target.name}`);
        }
        await all.releaseEntries.put(id, slot, revisionId);
        await log(trx, by, 'release.put-entry', release, { slot, revisionId });
      });
      return get(id);
    },
    async removeEntry(id: number, version: number, slot: string, by: SignedIn): Promise<Release> {
      await inTransaction(db, async (trx) => {
        const all = repositories(trx);
        const release = await openDraft(id, version, all);
        if (!(await all.releaseEntries.remove(id, slot))) throw notFound('slot');
        await log(trx, by, 'release.remove-entry', release, { slot });
      });
      return get(id);
    },
    /** Removes a draft; a frozen release stays for ever. */
    async remove(id: number, version: number, by: SignedIn): Promise<void> {
      await inTransaction(db, async (trx) => {
        const all = repositories(trx);
        const release = await openDraft(id, version, all);
        await all.releaseEntries.removeAll(id);
        await all.releases.remove(id, version + 1);
        await log(trx, by, 'release.remove', release);
      });
    },
    /**
     * Makes the files of a draft and closes it for ever.
     *
     * @param typed the version, typed again by the person
     */
    async freeze(id: number, version: number, typed: string, by: SignedIn): Promise<Release> {
      await inTransaction(db, async (trx) => {
        const all = repositories(trx);
        await all.releases.lock(id);
        const release = await openDraft(id, version, all);
        const entries = await filledEntries(id, all);
        requireFreezable(release, typed, entries);
        const files = await filesOf(release, entries, all);
        const digest = files.at(-1)!.sha256;
        await all.releaseFiles.insert(id, files);
        await all.releases.freeze(id, version + 1, { digest, personId: by.id, at: clock() });
        await log(trx, by, 'release.freeze', release, { digest });
      });
      return get(id);
    },
    async file(id: number, name: string): Promise<StoredFile> {
      return frozenFile(await repositories(db).releases.find(id), name);
    },
    async fileByVersion(slug: string, version: string, name: string): Promise<StoredFile> {
      return frozenFile(await repositories(db).releases.findByVersion(slug, version), name);
    },
  };
}

export type ReleasesService = ReturnType<typeof releasesService>;
