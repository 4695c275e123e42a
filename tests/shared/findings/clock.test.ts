import { describe, expect, it } from 'vitest';
import { afterRemedy, clockFinding } from './verdicts';

describe('clock.ppm-range', () => {
  const limited = (integratorLimitPpm: number) => ({ clock: { arithmetic: { integratorLimitPpm } } });

  it('passes a limit that holds both ends', () => {
    expect(clockFinding('clock.ppm-range', limited(50))).toMatchObject({ severity: 'pass', limit: 40, unit: 'ppm' });
  });

  // Two ends add: ±20 ppm each need ±40 ppm.
  it('fails a limit that holds only one, and types one that holds both', () => {
    const finding = clockFinding('clock.ppm-range', limited(30));
    expect(finding).toMatchObject({ severity: 'fail', change: { value: 44, label: 'Set 3.18 to ±44 ppm' } });
    expect(afterRemedy(finding, limited(30)).severity).toBe('pass');
  });

  it('widens the word where that is what is short', () => {
    const parts = { clock: { arithmetic: { integratorBits: 20 } } };
    const finding = clockFinding('clock.ppm-range', parts);
    expect(finding.change!.pointer).toBe('/clock/arithmetic/integratorBits');
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });

  // By hand: 20 bits with 8 of guard hold 2^11/2^31, a millionth: 1 ppm, whatever the limit says.
  it('widens the word before the limit where both are short', () => {
    const arithmetic = { integratorBits: 20, integratorLimitPpm: 30 };
    const finding = clockFinding('clock.ppm-range', { clock: { arithmetic } });
    expect(finding).toMatchObject({
      change: { value: 26, label: 'Set 3.14 to 26 bits' },
      remedy: 'Set 3.14 to 26 bits, then 3.18 to ±44 ppm.',
    });
    const wider = { clock: { arithmetic: { ...arithmetic, integratorBits: 26 } } };
    const next = clockFinding('clock.ppm-range', wider);
    expect(next.change!.label).toBe('Set 3.18 to ±44 ppm');
    expect(afterRemedy(next, wider).severity).toBe('pass');
  });
});

describe('clock.slope', () => {
  // F. Gardner 1986: 0.62428 at roll-off 0.2.
  it.each([
    [0.2, 'pass'],
    [0.05, 'caution'],
  ])('at roll-off %f is a %s', (rollOff, severity) => {
    const finding = clockFinding('clock.slope', { signal: { rollOff } });
    expect(finding.severity).toBe(severity);
    if (rollOff === 0.2) expect(finding.value).toBeCloseTo(0.62428, 5);
  });
});
