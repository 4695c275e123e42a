import type { Plan } from '../../shared/model/plan';
import { api } from './client';
import { everyPage } from './pages';

export interface PersonName {
  id: number;
  name: string;
}

export interface TargetName {
  slug: string;
  name: string;
}

/** Findings of a design by severity. */
export interface FindingCounts {
  pass: number;
  caution: number;
  fail: number;
}

export type LastVerdict = 'pass' | 'fail' | 'undecided';

export interface RevisionSummary {
  id: number;
  number: number;
  savedAt: string;
  by: PersonName;
  note: string;
  /** SHA-256 of engine, plan and words, hex. */
  digest: string;
  engine: string;
  counts: FindingCounts;
  replays: { total: number; lastVerdict: LastVerdict | null; lastId: number | null };
}

/** What a row of the plans list says of the last stage of one loop. */
export interface LoopSummary {
  loop: 'carrier' | 'clock';
  /** Exact Bn·T, cycles per symbol; null where the loop is unstable. */
  noiseBandwidth: number | null;
  phaseMarginDeg: number | null;
  /** 48 samples of the phase step on a log axis, 4 to 1200 updates. */
  step: number[];
}

export interface PlanHead {
  id: number;
  number: number;
  savedAt: string;
  by: PersonName;
  digest: string;
  engine: string;
  counts: FindingCounts;
  summary: LoopSummary | null;
}

export interface ReleaseOfPlan {
  version: string;
  state: string;
  revisionNumber: number;
}

export interface PlanSummary {
  id: number;
  name: string;
  target: TargetName;
  modulation: string;
  symbolRateBd: number;
  version: number;
  head: PlanHead | null;
  /** The signed-in person has edits that are not saved as a revision. */
  hasDraft: boolean;
  release: ReleaseOfPlan | null;
  changedAt: string;
}

/** A plan that need not be whole yet: any key of a plan description may be absent. */
export interface DraftPlan {
  name?: string;
  target?: string;
  signal?: Partial<Plan['signal']>;
  carrier?: Plan['carrier'];
  clock?: Plan['clock'];
  environment?: Plan['environment'];
  limits?: Plan['limits'];
}

/** What one person has typed since a revision. */
export interface Draft {
  /** Number of the revision that the edits start from; 0 before the first one. */
  basedOn: number;
  /** The last values that could be read. */
  plan: DraftPlan;
  /** Text of the fields that cannot be read, by JSON pointer. */
  typed: Record<string, string>;
}

export interface PlanSheet {
  id: number;
  name: string;
  target: TargetName;
  version: number;
  /** Description of the head revision, before the first one as it was created. */
  description: Plan;
  head: RevisionSummary | null;
  draft: (Draft & { updatedAt: string }) | null;
  createdBy: PersonName;
  createdAt: string;
  release?: ReleaseOfPlan | null;
}

export const listPlans = (): Promise<PlanSummary[]> => everyPage<PlanSummary>('/plans');

export const getPlan = (id: number): Promise<PlanSheet> => api.get<PlanSheet>(`/plans/${id}`);

export const createPlan = (plan: DraftPlan): Promise<{ id: number }> => api.post<{ id: number }>('/plans', { plan });

/** A quantity of an uploaded description that was written with its unit. */
export interface Understood {
  pointer: string;
  written: string;
  /** Value and unit as they were read. */
  text: string;
}

/** Checks an uploaded description and fills in its defaults; nothing is stored. Rejects with a pointer for each fault. */
export const readYaml = (yaml: string): Promise<{ plan: Plan; understood: Understood[] }> =>
  api.post('/plans/from-yaml', { yaml });

export const putDraft = (id: number, draft: Draft): Promise<unknown> => api.put(`/plans/${id}/draft`, draft);

export const removeDraft = (id: number): Promise<unknown> => api.delete(`/plans/${id}/draft`);
