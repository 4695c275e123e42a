import type { Design, Finding, LoopDesign } from '../../../shared/model/design';
import { fieldNumber, fieldOf } from '../../../shared/plan/fields';
import { numberText } from '../../../shared/quantities/format';
import type { Freshness } from '../../composables/use-design';
import { countsOf, severities, worstOf } from './verdict-of';

export interface SheetState {
  design: Design | null;
  freshness: Freshness;
  /** Pointers of the wrong fields, as the form shows them. */
  wrong: readonly string[];
  /** What the sheet shows: “This draft”, “r14”. */
  subject: string;
}

/** Number and label of a field for a sentence: “1.4 Roll-off α”. */
export function fieldName(pointer: string): string {
  const field = fieldOf(pointer);
  return field ? `${field.no} ${field.label}` : pointer.replace(/^\//, '');
}

export const verdictCounts = (design: Design | null): { state: Finding['severity']; count: number }[] => {
  if (!design) return [];
  const counts = countsOf(design);
  return severities.filter((state) => counts[state] > 0).map((state) => ({ state, count: counts[state] }));
};

export function verdictState({ design, wrong }: SheetState): 'pass' | 'caution' | 'fail' | 'none' {
  if (wrong.length > 0) return 'fail';
  return design ? worstOf(countsOf(design)) : 'none';
}

/** What the sheet comes to, in one sentence. */
export function verdictSentence({ design, freshness, wrong, subject }: SheetState): string {
  if (wrong.length > 0) return `${wrong.length} ${wrong.length === 1 ? 'field is' : 'fields are'} wrong. The first is`;
  if (freshness === 'failed') return 'The server gives no answer. What you type is kept; it is asked again every 5 s.';
  if (!design) return freshness === 'none' ? 'Give the symbol rate (1.2) and a loop: the results follow.' : '';
  return findingSentence(design.findings, subject);
}

function findingSentence(findings: readonly Finding[], subject: string): string {
  const first = (severity: Finding['severity']) => findings.find((finding) => finding.severity === severity);
  const failed = first('fail');
  if (failed) return `${subject} can be saved but not frozen: ${lower(failed.title)}.`;
  const doubtful = first('caution');
  if (doubtful) return `${subject} can be frozen. The first to look at: ${lower(doubtful.title)}.`;
  return `${subject} can be frozen: nothing fails and nothing calls for caution.`;
}

/** Titles begin sentences; inside one they do not. Symbols such as ζ, BnT and NCO keep their letters. */
const lower = (title: string): string =>
  /^[A-Z][a-z]/.test(title) && !title.startsWith('Bn') ? title.charAt(0).toLowerCase() + title.slice(1) : title;

/** The two numbers that people ask for first, of the last stage: jitter and margin. */
export function verdictAside(design: Design | null): string | undefined {
  const loop = design?.carrier ?? design?.clock;
  const stage = loop?.stages.at(-1);
  if (!loop || !stage) return undefined;
  const parts = [jitterOf(loop), marginOf(stage.margins.phaseDeg)].filter((part) => part !== undefined);
  return parts.length > 0 ? `${stage.name} ${parts.join(', ')}` : undefined;
}

function jitterOf({ budget }: LoopDesign): string | undefined {
  const total = budget?.stages.at(-1)?.total ?? null;
  if (!budget || total === null) return undefined;
  return budget.unit === 'deg'
    ? `${numberText(total, { decimals: 2 })}° jitter`
    : `${numberText(total, { decimals: 4 })} symbols jitter`;
}

const marginOf = (degrees: number | null): string | undefined =>
  degrees === null ? undefined : `${numberText(degrees, { decimals: 1 })}° margin`;

/** The freshness as the strip shows it; nothing while there is nothing to be fresh. */
export function shownFreshness({ freshness, design }: SheetState): { state: Exclude<Freshness, 'none'> } | undefined {
  if (freshness === 'none') return design ? { state: 'stale' } : undefined;
  return { state: freshness };
}

/** Why the results no longer belong to the fields; undefined while they do. */
export function staleReason({ freshness, wrong }: SheetState): string | undefined {
  if (freshness === 'failed') return 'The server gives no answer; these are the results of before.';
  const [first] = wrong;
  if (freshness !== 'stale') return undefined;
  return first === undefined ? 'The description is not whole.' : `${fieldNumber(first)} must be mended first.`;
}
