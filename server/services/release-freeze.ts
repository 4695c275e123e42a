import { conflict, invalidAt } from '../errors';
import type { StoredFile } from '../repositories/release-files';
import type { ReleaseRecord } from '../repositories/releases';
import type { Repositories } from '../repositories/index';
import type { Context } from './context';
import { releaseFiles, type FilledSlot } from './manifest';
import { filledEntries, type FilledEntry } from './release-contents';
import { changeDraft, type DraftChange } from './release-drafts';
import { gatesOf } from './release-gates';

function requireFreezable(release: ReleaseRecord, typed: string, entries: readonly FilledEntry[]): void {
  if (typed !== release.version) throw invalidAt('/version', `is not the version of this release, ${release.version}`);
  const shut = gatesOf(release, entries).filter(({ state }) => state === 'shut');
  if (shut.length > 0) throw conflict(`The release is not ready: ${shut.map(({ text }) => text).join(' ')}`);
}

async function filesOf(
  { target, version }: ReleaseRecord,
  entries: readonly FilledEntry[],
  { revisions }: Repositories,
): Promise<StoredFile[]> {
  const slots: FilledSlot[] = [];
  for (const { slot, revisionId } of entries) slots.push({ slot, revision: (await revisions.find(revisionId))! });
  return releaseFiles({ target, version, entries: slots });
}

/**
 * Makes the files of a draft and closes it for ever, in one transaction.
 *
 * @param typed the version, typed again by the person
 * @throws {AppError} conflict, naming the gates that are shut; invalid, when another version was typed
 */
export const freezeRelease = (context: Context, change: DraftChange, typed: string): Promise<void> =>
  changeDraft(context, 'release.freeze', change, async (release, all) => {
    const entries = await filledEntries(release.id, all);
    requireFreezable(release, typed, entries);
    const files = await filesOf(release, entries, all);
    const digest = files.at(-1)!.sha256;
    await all.releaseFiles.insert(release.id, files);
    const frozen = { digest, personId: change.by.id, at: context.clock() };
    await all.releases.freeze(release.id, change.version + 1, frozen);
    return { digest };
  });
