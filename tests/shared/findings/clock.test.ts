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

describe('clock.interpolator', () => {
  // Derived (spectral integral): 21.1 dB for linear and 31.4 dB for cubic at 2 samples per symbol, α = 0.35.
  it.each([
    ['cubic', 31.4, 10, 'pass'],
    ['linear', 21.1, 10, 'fail'],
    ['cubic', 31.4, 20, 'fail'],
    ['cubic', 31.4, 18, 'caution'],
  ])('%s, %f dB clean, beside %f dB is a %s', (interpolator, cleanDb, esN0Db, severity) => {
    const finding = clockFinding('clock.interpolator', { signal: { esN0Db }, clock: { interpolator } });
    expect(finding).toMatchObject({ severity, limit: 0.3, unit: 'dB' });
    expect(finding.value! / (10 * Math.log10(1 + 10 ** ((esN0Db - cleanDb) / 10)))).toBeCloseTo(1, 1);
  });

  it('types the first finer interpolator that is clean enough', () => {
    const parts = { clock: { interpolator: 'linear' } };
    const finding = clockFinding('clock.interpolator', parts);
    expect(finding.change).toEqual({
      pointer: '/clock/interpolator',
      value: 'parabolic',
      label: 'Set 3.25 to parabolic',
    });
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });

  it('asks for more samples where none is', () => {
    const finding = clockFinding('clock.interpolator', { signal: { esN0Db: 50 } });
    expect(finding).toMatchObject({ severity: 'fail', change: null });
    expect(finding.remedy).toContain('1.3');
  });

  // Sampled once a symbol, what lies beyond half the rate folds back, and no interpolator undoes it.
  it('asks for two samples per symbol where the band folds', () => {
    const parts = { signal: { samplesPerSymbol: 1 }, clock: { detector: 'mueller-muller' } };
    const finding = clockFinding('clock.interpolator', parts);
    expect(finding).toMatchObject({ severity: 'fail', change: null });
    expect(finding.remedy).toContain('gardner or zero-crossing');
  });
});
