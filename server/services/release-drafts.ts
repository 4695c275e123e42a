import { inTransaction } from '../db';
import { conflict, notFound, stale } from '../errors';
import type { ReleaseRecord } from '../repositories/releases';
import { repositories, type Repositories } from '../repositories/index';
import type { Context } from './context';
import { withoutTargetId } from './release-contents';
import type { SignedIn } from './sessions';

/** A change of a draft that was read at a version. */
export interface DraftChange {
  id: number;
  /** Version of the release that the change starts from. */
  version: number;
  by: SignedIn;
}

async function open({ id, version }: DraftChange, all: Repositories): Promise<ReleaseRecord> {
  await all.releases.lock(id);
  const release = await all.releases.find(id);
  if (!release) throw notFound('release');
  if (release.state !== 'draft') throw conflict('A frozen release cannot be changed.');
  if (!(await all.releases.raiseVersion(id, version))) throw stale('release', withoutTargetId(release));
  return release;
}

/**
 * Runs one change of a draft in a transaction: raises its version, keeps its row locked to the end, writes the trail.
 *
 * @param action what the audit trail calls it
 * @param work the change itself; answers the detail for the trail. The version in the row is already the raised one.
 * @throws {AppError} stale, conflict or not-found
 */
export function changeDraft(
  { db, clock }: Context,
  action: string,
  change: DraftChange,
  work: (release: ReleaseRecord, all: Repositories) => Promise<object>,
): Promise<void> {
  return inTransaction(db, async (trx) => {
    const all = repositories(trx);
    const release = await open(change, all);
    const detail = await work(release, all);
    const subject = `${release.target.slug} ${release.version}`;
    await all.audit.append({ at: clock(), personId: change.by.id, action, subject, detail });
  });
}
