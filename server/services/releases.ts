import semver from 'semver';
import { inTransaction } from '../db';
import { conflict, invalidAt, notFound } from '../errors';
import { itemsOf, type Items, type Page } from '../page';
import type { StoredFile } from '../repositories/release-files';
import type { ReleaseRecord, ReleaseSummary } from '../repositories/releases';
import { repositories } from '../repositories/index';
import type { Context } from './context';
import { whole, withoutTargetId, type Release } from './release-contents';
import { changeDraft, type DraftChange } from './release-drafts';
import { freezeRelease } from './release-freeze';
import type { SignedIn } from './sessions';

export type { Release };

const slotPattern = /^[a-z][a-z0-9_]{0,30}$/;

export function releasesService(context: Context) {
  const { db, clock } = context;

  async function answer(release: ReleaseRecord | undefined): Promise<Release> {
    if (!release) throw notFound('release');
    return whole(release, repositories(db));
  }

  const get = async (id: number): Promise<Release> => answer(await repositories(db).releases.find(id));

  async function frozenFile(release: ReleaseRecord | undefined, name: string): Promise<StoredFile> {
    if (!release || release.state !== 'frozen') throw notFound('frozen release');
    const file = await repositories(db).releaseFiles.find(release.id, name);
    if (!file) throw notFound('file');
    return file;
  }

  return {
    get,
    async getByVersion(slug: string, version: string): Promise<Release> {
      return answer(await repositories(db).releases.findByVersion(slug, version));
    },
    async list(slug: string | undefined, page: Page): Promise<Items<ReleaseSummary>> {
      const { items, next } = itemsOf(await repositories(db).releases.list(slug, page), page);
      return { items: items.map(withoutTargetId), next };
    },
    async create(slug: string, version: string, by: SignedIn): Promise<Release> {
      if (semver.valid(version) !== version) throw invalidAt('/version', 'must be a version such as 2.4.0');
      const id = await inTransaction(db, async (trx) => {
        const { audit, releases, targets } = repositories(trx);
        const target = await targets.find(slug);
        if (!target) throw invalidAt('/target', 'is not the slug of a target');
        const taken = await releases.findByVersion(slug, version);
        if (taken) throw conflict(`${target.name} has a release ${version} already.`);
        const subject = `${slug} ${version}`;
        await audit.append({ at: clock(), personId: by.id, action: 'release.create', subject });
        return releases.insert(target.id, version, by.id, clock());
      });
      return get(id);
    },
    /** Puts a revision into a slot of a draft, in place of what was there. */
    async putEntry(change: DraftChange, slot: string, revisionId: number): Promise<Release> {
      if (!slotPattern.test(slot)) throw invalidAt('/slot', 'must be a C identifier in small letters');
      await changeDraft(context, 'release.put-entry', change, async ({ id, target, targetId }, all) => {
        const revision = await all.revisions.find(revisionId);
        if (!revision) throw invalidAt('/revisionId', 'is not a revision');
        if (revision.targetId !== targetId) {
          throw invalidAt('/revisionId', `was saved for another target than ${target.name}`);
        }
        await all.releaseEntries.put(id, slot, revisionId);
        return { slot, revisionId };
      });
      return get(change.id);
    },
    async removeEntry(change: DraftChange, slot: string): Promise<Release> {
      await changeDraft(context, 'release.remove-entry', change, async ({ id }, all) => {
        if (!(await all.releaseEntries.remove(id, slot))) throw notFound('slot');
        return { slot };
      });
      return get(change.id);
    },
    /** Removes a draft; a frozen release stays for ever. */
    async remove(change: DraftChange): Promise<void> {
      await changeDraft(context, 'release.remove', change, async ({ id }, all) => {
        await all.releaseEntries.removeAll(id);
        await all.releases.remove(id, change.version + 1);
        return {};
      });
    },
    /** @param typed the version, typed again by the person */
    async freeze(change: DraftChange, typed: string): Promise<Release> {
      await freezeRelease(context, change, typed);
      return get(change.id);
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
