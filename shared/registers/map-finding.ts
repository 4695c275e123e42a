import type { Change, Finding } from '../model/design';

interface MapFault {
  slug: string;
  severity?: Finding['severity'];
  title: string;
  reason: string;
  remedy?: string;
  change?: Change;
  /** JSON pointers, most telling first. */
  fields: string[];
}

/** A finding on a register map or a binding: exact, with no value of its own. */
export const mapFinding = ({ slug, severity, title, reason, remedy, change, fields }: MapFault): Finding => ({
  slug,
  severity: severity ?? 'fail',
  title,
  value: null,
  limit: null,
  sense: null,
  unit: '',
  reason,
  remedy: remedy ?? null,
  change: change ?? null,
  fields,
  source: 'exact',
  estimate: false,
});

const rank = { fail: 0, caution: 1, pass: 2 } as const;

/** Failing first, then caution, then pass; the order within each is kept. */
export const bySeverity = (findings: readonly Finding[]): Finding[] =>
  [...findings].sort((a, b) => rank[a.severity] - rank[b.severity]);
