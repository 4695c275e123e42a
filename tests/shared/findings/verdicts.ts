import { workOut } from '../../../shared/design';
import type { Finding } from '../../../shared/model/design';
import { filled, samplePlan } from '../sample-plan';
import type { PlanParts } from '../sample-plan';

/** Findings of a kind for the sample plan with some parts replaced, the carrier's before the clock's. */
export const findingsAbout = (slug: string, parts: PlanParts = {}): Finding[] =>
  workOut(samplePlan(parts)).findings.filter((finding) => finding.slug === slug);

/** The one finding of a kind on a plan with the carrier loop alone. */
export function carrierFinding(slug: string, parts: PlanParts = {}): Finding {
  const [finding] = findingsAbout(slug, { ...parts, clock: undefined });
  if (!finding) throw new Error(`no finding ${slug}`);
  return finding;
}

/** The one finding of a kind on a plan with the clock loop alone. */
export function clockFinding(slug: string, parts: PlanParts = {}): Finding {
  const [finding] = findingsAbout(slug, { ...parts, carrier: undefined });
  if (!finding) throw new Error(`no finding ${slug}`);
  return finding;
}

/** The finding of the same kind once its own edit has been typed. */
export function afterRemedy(finding: Finding, parts: PlanParts = {}): Finding {
  if (!finding.change) throw new Error(`${finding.slug} has no edit`);
  const plan = structuredClone(samplePlan(parts)) as unknown as PlanParts;
  const keys = finding.change.pointer.slice(1).split('/');
  const last = keys.pop() as string;
  const place = keys.reduce((at, key) => at[key] as PlanParts, plan);
  place[last] = finding.change.value;
  const loop = finding.fields.find((field) => /^\/(carrier|clock)\//.test(field))?.split('/')[1];
  const again = workOut(filled(plan)).findings.filter(({ slug }) => slug === finding.slug);
  const same = again.find(({ fields }) => fields.some((field) => field.startsWith(`/${loop}/`))) ?? again[0];
  if (!same) throw new Error(`${finding.slug} is gone`);
  return same;
}
