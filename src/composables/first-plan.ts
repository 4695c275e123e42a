import type { LocationQuery } from 'vue-router';
import { defaultsAt } from '../../shared/plan/rules';
import { getPlan, type DraftPlan } from '../api/plans';
import { importKey } from './use-plan-import';

const typedKey = 'keepstep.new-plan';

export interface FirstPlan {
  plan: DraftPlan;
  /** It is what the person typed before leaving or reloading. */
  restored: boolean;
}

/**
 * What the form of a new plan starts from: a copy of a plan, an uploaded description, what was being typed, or the
 * defaults of the schema.
 */
export async function firstPlan(query: LocationQuery): Promise<FirstPlan> {
  if (typeof query.copy === 'string') return { plan: await copyOf(Number(query.copy)), restored: false };
  const uploaded = sessionStorage.getItem(importKey);
  sessionStorage.removeItem(importKey);
  if (uploaded) return { plan: (JSON.parse(uploaded) as { plan: DraftPlan }).plan, restored: false };
  const typed = sessionStorage.getItem(typedKey);
  if (typed) return { plan: JSON.parse(typed) as DraftPlan, restored: true };
  return { plan: { ...blank(), ...(typeof query.target === 'string' && { target: query.target }) }, restored: false };
}

/** Keeps a plan that is not stored yet over a reload of this tab. */
export const keepNewPlan = (plan: DraftPlan): void => sessionStorage.setItem(typedKey, JSON.stringify(plan));
export const forgetNewPlan = (): void => sessionStorage.removeItem(typedKey);

async function copyOf(id: number): Promise<DraftPlan> {
  const { description } = await getPlan(id);
  return { ...description, name: `${description.name}, copy` };
}

const blank = (): DraftPlan => ({
  signal: defaultsAt('/signal'),
  environment: defaultsAt('/environment'),
  limits: defaultsAt('/limits'),
});

/** A loop as “Add” puts it into a plan: the schema's defaults and one stage. */
export const firstLoop = (loop: 'carrier' | 'clock'): Record<string, unknown> => ({
  ...defaultsAt(`/${loop}`),
  stages: [{ name: 'track', damping: Math.SQRT1_2, noiseBandwidth: loop === 'carrier' ? 0.005 : 0.001 }],
});
