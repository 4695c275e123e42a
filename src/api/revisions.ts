import type { Design } from '../../shared/model/design';
import type { Plan } from '../../shared/model/plan';
import { api } from './client';
import { completeDesign } from './older-designs';
import { everyPage } from './pages';
import type { DraftPlan, RevisionSummary, TargetName } from './plans';
import type { FileEntry } from './releases';

/** A target as it was when a revision was saved. */
export interface TargetSnapshot {
  slug: string;
  name: string;
  loopClockHz: number;
  cPrefix: string;
  /** Hexadecimal, `0x…`. */
  baseAddress: string;
  registerMap: unknown;
  mapNumber: number;
}

export interface Revision extends RevisionSummary {
  plan: { id: number; name: string; target: TargetName };
  description: Plan;
  design: Design;
  target: TargetSnapshot;
}

/** The body of the refusal (412) of a save over a plan that somebody else has saved meanwhile. */
export interface StalePlan {
  version: number;
  head: RevisionSummary;
  description: Plan;
}

export const listRevisions = (planId: number): Promise<RevisionSummary[]> =>
  everyPage<RevisionSummary>(`/plans/${planId}/revisions`);

/** A revision whole; what its engine did not work out stands in its design as null or empty. */
export async function getRevision(id: number): Promise<Revision> {
  const revision = await api.get<Revision>(`/revisions/${id}`);
  return { ...revision, design: completeDesign(revision.design) };
}

/**
 * Saves a plan as its next revision.
 *
 * @param version the plan's version that the edits start from; rejects with 412 and the current state when it is stale
 */
export const saveRevision = (
  planId: number,
  version: number,
  body: { plan: DraftPlan; note: string },
): Promise<RevisionSummary> =>
  api.post<RevisionSummary>(`/plans/${planId}/revisions`, body, { ifMatch: `"${version}"` });

export const listFiles = async (revisionId: number): Promise<FileEntry[]> =>
  (await api.get<{ items: FileEntry[] }>(`/revisions/${revisionId}/files`)).items;

export const fileText = (revisionId: number, name: string): Promise<string> =>
  api.text(`/revisions/${revisionId}/files/${encodeURIComponent(name)}`);
