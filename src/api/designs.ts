import type { Design } from '../../shared/model/design';
import { api } from './client';
import type { DraftPlan } from './plans';

/** What a plan means, worked out by the server, which stores nothing. Rejects with 422 and a pointer for each fault. */
export const workOut = async (plan: DraftPlan, signal: AbortSignal): Promise<Design> =>
  (await api.post<{ design: Design }>('/designs', { plan }, { signal })).design;
