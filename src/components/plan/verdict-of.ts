import type { Design } from '../../../shared/model/design';
import type { FindingCounts } from '../../api/plans';

type Severity = keyof FindingCounts;

export const severities: readonly Severity[] = ['fail', 'caution', 'pass'];

export const worstOf = (counts: FindingCounts): Severity =>
  severities.find((severity) => counts[severity] > 0) ?? 'pass';

export const countsOf = ({ findings }: Pick<Design, 'findings'>): FindingCounts => ({
  fail: findings.filter(({ severity }) => severity === 'fail').length,
  caution: findings.filter(({ severity }) => severity === 'caution').length,
  pass: findings.filter(({ severity }) => severity === 'pass').length,
});
