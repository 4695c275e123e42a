import type { PlanSummary } from '../../api/plans';

/** State of a plan by the findings of its newest revision; none before the first one. */
export type PlanState = 'fail' | 'caution' | 'pass' | 'none';

export const planStates: readonly PlanState[] = ['fail', 'caution', 'pass', 'none'];

export interface PlanGroup {
  slug: string;
  name: string;
  plans: PlanSummary[];
}

export function stateOf({ head }: PlanSummary): PlanState {
  if (!head) return 'none';
  if (head.counts.fail > 0) return 'fail';
  return head.counts.caution > 0 ? 'caution' : 'pass';
}

/** The plans whose name, target or modulation holds every typed word. */
export function matching(plans: readonly PlanSummary[], text: string): PlanSummary[] {
  const words = text.toLowerCase().split(/\s+/).filter(Boolean);
  return plans.filter((plan) => {
    const searched = `${plan.name} ${plan.target.name} ${plan.target.slug} ${plan.modulation}`.toLowerCase();
    return words.every((word) => searched.includes(word));
  });
}

export function countByState(plans: readonly PlanSummary[]): Record<PlanState, number> {
  const counts: Record<PlanState, number> = { fail: 0, caution: 0, pass: 0, none: 0 };
  for (const plan of plans) counts[stateOf(plan)] += 1;
  return counts;
}

/** One group for each target, both in the order in which the plans come. */
export function groupByTarget(plans: readonly PlanSummary[]): PlanGroup[] {
  const groups = new Map<string, PlanGroup>();
  for (const plan of plans) {
    const { slug, name } = plan.target;
    const group = groups.get(slug) ?? { slug, name, plans: [] };
    group.plans.push(plan);
    groups.set(slug, group);
  }
  return [...groups.values()];
}
