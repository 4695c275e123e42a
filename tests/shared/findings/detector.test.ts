import { describe, expect, it } from 'vitest';
import { afterRemedy, carrierFinding, clockFinding } from './verdicts';

describe('detector.false-null', () => {
  it('rests where lock is the only stable zero', () => {
    expect(carrierFinding('detector.false-null')).toMatchObject({ severity: 'pass', value: null });
    expect(clockFinding('detector.false-null').severity).toBe('pass');
  });

  // Derived (quadrature of the S-curve): decisions on 16QAM have stable nulls near ±31° at 20 dB.
  it('names the false null of decisions on 16QAM', () => {
    const parts = { signal: { modulation: '16QAM', esN0Db: 20 }, carrier: { detector: 'decision' } };
    const finding = carrierFinding('detector.false-null', parts);
    expect(finding).toMatchObject({ severity: 'caution', title: 'Carrier loop can rest off lock', unit: '°' });
    expect(Math.abs(finding.value! - 31)).toBeLessThan(1);
    const known = { ...parts, carrier: { detector: 'known-symbols' } };
    expect(carrierFinding('detector.false-null', known).severity).toBe('pass');
  });
});

describe('detector.slope-with-noise', () => {
  // Derived: 1.3880 of √2 are left at 10 dB, 0.6033 at 3 dB.
  it.each([
    [10, 'pass', 1.388],
    [3, 'caution', 0.6033],
  ])('of QPSK signs at %f dB is a %s', (esN0Db, severity, slope) => {
    const finding = carrierFinding('detector.slope-with-noise', { signal: { esN0Db } });
    expect(finding.severity).toBe(severity);
    expect(finding.value).toBeCloseTo(slope / Math.SQRT2, 3);
  });

  it.each([
    [{ modulation: 'QPSK', esN0Db: 2 }, 'sign', 'power-law'],
    [{ modulation: 'BPSK', esN0Db: -8 }, 'sign', 'costas'],
  ])('sends %j to a detector without decisions', (signal, detector, steady) => {
    const parts = { signal, carrier: { detector } };
    const finding = carrierFinding('detector.slope-with-noise', parts);
    expect(finding).toMatchObject({ severity: 'caution', change: { value: steady } });
    expect(afterRemedy(finding, parts)).toMatchObject({ severity: 'pass', value: 1 });
  });

  it('knows no other detector for 8PSK', () => {
    const parts = { signal: { modulation: '8PSK', esN0Db: 9 }, carrier: { detector: 'decision' } };
    expect(carrierFinding('detector.slope-with-noise', parts)).toMatchObject({ severity: 'caution', change: null });
  });

  it('sends deciding timing detectors to Gardner', () => {
    const parts = { signal: { esN0Db: -3 }, clock: { detector: 'zero-crossing' } };
    const finding = clockFinding('detector.slope-with-noise', parts);
    expect(finding).toMatchObject({ severity: 'caution', change: { value: 'gardner', label: 'Set 3.1 to gardner' } });
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });
});
