import { describe, expect, it } from 'vitest';
import { countsOfReport, one, total } from '../../scripts/support/counts.mjs';

const file = (status: string, ...tests: string[]) => ({
  status,
  assertionResults: tests.map((test) => ({ status: test })),
});
const report = (numFailedTests: number, ...testResults: ReturnType<typeof file>[]) => ({
  numPassedTests: 7,
  numFailedTests,
  numPendingTests: 1,
  numTodoTests: 1,
  testResults,
});

describe('countsOfReport', () => {
  it('counts tests', () => {
    const counts = countsOfReport(report(1, file('failed', 'passed', 'failed')), 1);
    expect(counts).toEqual({ passed: 7, failed: 1, skipped: 2 });
  });

  it('counts a file that could not be run', () => {
    expect(countsOfReport(report(0, file('failed'), file('passed', 'passed')), 1).failed).toBe(1);
  });

  it('counts a run that failed beside its tests', () => {
    expect(countsOfReport(report(0, file('passed', 'passed')), 1).failed).toBe(1);
  });

  it('counts a run without a report', () => {
    expect(countsOfReport(undefined, 0)).toEqual({ passed: 0, failed: 1, skipped: 0 });
  });
});

describe('total', () => {
  it('adds up', () => {
    expect(total([one(true), one(false), one(true)])).toEqual({ passed: 2, failed: 1, skipped: 0 });
  });
});
