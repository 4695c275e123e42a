import type { EntryRecord } from '../repositories/release-entries';
import type { FileEntry } from '../repositories/release-files';
import type { ReleaseRecord, ReleaseSummary } from '../repositories/releases';
import type { Repositories } from '../repositories/index';
import { gatesOf, type Gate } from './release-gates';
import { summariesOf, type RevisionSummary } from './revision-summaries';

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

/** A release as lists show it. */
export const withoutTargetId = ({ targetId: _targetId, ...summary }: ReleaseRecord): ReleaseSummary => summary;

/** An entry with its revision. */
export type FilledEntry = EntryRecord & { revision: RevisionSummary };

/** The config set of a release, in the order of its slots. */
export async function filledEntries(releaseId: number, all: Repositories): Promise<FilledEntry[]> {
  const entries = await all.releaseEntries.list(releaseId);
  const records = await all.revisions.listByIds(entries.map(({ revisionId }) => revisionId));
  const byId = new Map((await summariesOf(records, all)).map((revision) => [revision.id, revision]));
  return entries.map((entry) => ({ ...entry, revision: byId.get(entry.revisionId)! }));
}

/** A release with its config set, gates and files. */
export async function whole(release: ReleaseRecord, all: Repositories): Promise<Release> {
  const filled = await filledEntries(release.id, all);
  const entries = filled.map(({ slot, plan, newest, revision }) => {
    return { slot, plan, revision, newer: newest > revision.number ? newest : null };
  });
  const gates = release.state === 'draft' ? gatesOf(release, filled) : [];
  return { ...withoutTargetId(release), entries, gates, files: await all.releaseFiles.list(release.id) };
}
