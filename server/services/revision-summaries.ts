import type { Repositories } from '../repositories/index';
import type { ReplaysOfRevision } from '../repositories/replay-rows';
import type { FindingCounts } from '../repositories/revision-rows';
import type { RevisionRecord } from '../repositories/revisions';
import type { PersonName } from '../repositories/people';

/** A revision as lists and other things show it. */
export interface RevisionSummary {
  id: number;
  number: number;
  savedAt: string;
  by: PersonName;
  note: string;
  digest: string;
  engine: string;
  counts: FindingCounts;
  replays: ReplaysOfRevision;
}

const none: ReplaysOfRevision = { total: 0, lastVerdict: null, lastId: null };

/** Joins revisions with how their replays stand, in the order given. */
export async function summariesOf(
  records: readonly RevisionRecord[],
  { replays }: Pick<Repositories, 'replays'>,
): Promise<RevisionSummary[]> {
  const standing = await replays.ofRevisions(records.map(({ id }) => id));
  return records.map(({ id, number, savedAt, by, note, digest, engine, counts }) => {
    return { id, number, savedAt, by, note, digest, engine, counts, replays: standing.get(id) ?? none };
  });
}

export const summaryOf = async (record: RevisionRecord, all: Pick<Repositories, 'replays'>): Promise<RevisionSummary> =>
  (await summariesOf([record], all))[0]!;
