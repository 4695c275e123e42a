import { describe, expect, it } from 'vitest';
import { afterRemedy, carrierFinding, findingsAbout } from './verdicts';

const narrow = { name: 'acquire', noiseBandwidth: 0.004 };

describe('acquisition.ambiguity', () => {
  it('passes ±77.5 kHz at 27.5 MBd', () => {
    const finding = carrierFinding('acquisition.ambiguity');
    expect(finding).toMatchObject({ severity: 'pass', unit: 'MHz', sense: 'max' });
    expect(finding.limit).toBeCloseTo(3.4375, 12);
  });

  // Published: 18 kBd QPSK is unambiguous below 2250 Hz.
  it('fails beyond Rs/8 for QPSK', () => {
    const parts = { signal: { symbolRateBd: 18e3 }, environment: { carrierTolerancePpm: 0, dopplerHz: 3000 } };
    const finding = carrierFinding('acquisition.ambiguity', parts);
    expect(finding).toMatchObject({ severity: 'fail', value: 3, limit: 2.25, unit: 'kHz' });
    expect(finding.reason).toContain('4.2');
  });

  it('says nothing where the offset is not known', () => {
    expect(findingsAbout('acquisition.ambiguity', { environment: { carrierFrequencyHz: undefined } })).toEqual([]);
  });
});

describe('acquisition.integrator-range', () => {
  const limited = (integratorLimitHz: number) => ({ carrier: { arithmetic: { integratorLimitHz } } });

  it('passes a limit that holds the carrier', () => {
    expect(carrierFinding('acquisition.integrator-range', limited(250e3)).severity).toBe('pass');
  });

  it('fails a limit that does not, and types one that does', () => {
    const finding = carrierFinding('acquisition.integrator-range', limited(70e3));
    expect(finding).toMatchObject({
      severity: 'fail',
      title: 'The integrator stops short of the carrier',
      unit: 'kHz',
    });
    expect(finding.value).toBeCloseTo(70, 5);
    expect(finding.limit).toBeCloseTo(77.5, 9);
    expect(finding.reason).toContain('2.18 stops short of the carrier offset');
    expect(finding.change).toEqual({
      pointer: '/carrier/arithmetic/integratorLimitHz',
      value: 86_000,
      label: 'Set 2.18 to ±86 kHz',
    });
    expect(afterRemedy(finding, limited(70e3)).severity).toBe('pass');
  });

  it('widens the word where that is what is short', () => {
    const parts = { carrier: { arithmetic: { integratorBits: 30 } } };
    const finding = carrierFinding('acquisition.integrator-range', parts);
    expect(finding.change!.pointer).toBe('/carrier/arithmetic/integratorBits');
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });

  // By hand: 30 bits with 8 of guard hold 2^21·27.5e6/2^32 Hz = 13.4 kHz; three bits more hold 107 kHz.
  it('widens the word before the limit where both are short', () => {
    const arithmetic = { integratorBits: 30, integratorLimitHz: 70e3 };
    const finding = carrierFinding('acquisition.integrator-range', { carrier: { arithmetic } });
    expect(finding).toMatchObject({
      change: { value: 33 },
      remedy: 'Set 2.14 to 33 bits, then 2.18 to ±86 kHz.',
    });
    const wider = { carrier: { arithmetic: { ...arithmetic, integratorBits: 33 } } };
    const next = carrierFinding('acquisition.integrator-range', wider);
    expect(next.change!.label).toBe('Set 2.18 to ±86 kHz');
    expect(afterRemedy(next, wider).severity).toBe('pass');
  });
});

describe('acquisition.pull-in-range', () => {
  // By hand, for the first harmonic: QPSK with D = 3 turns round at Rs/(4·4·3.5) = 491 kHz at 27.5 MBd; the others move
  // that by a few per cent.
  it('rests far inside the range', () => {
    const finding = carrierFinding('acquisition.pull-in-range', { carrier: { stages: [narrow] } });
    expect(finding).toMatchObject({ severity: 'pass', estimate: true, unit: 'kHz' });
    expect(Math.abs(finding.limit! / 491 - 1)).toBeLessThan(0.05);
  });

  it.each([
    [420e3, 'caution'],
    [520e3, 'fail'],
  ])('fires at ±%d Hz: %s', (dopplerHz, severity) => {
    const environment = { carrierTolerancePpm: 0, dopplerHz };
    const finding = carrierFinding('acquisition.pull-in-range', { carrier: { stages: [narrow] }, environment });
    expect(finding).toMatchObject({ severity, title: 'The delay turns the pull-in round' });
    expect(finding.remedy).toContain('2.4');
  });

  it('says nothing where no cycle slips', () => {
    const environment = { carrierTolerancePpm: 0, dopplerHz: 1e3 };
    expect(findingsAbout('acquisition.pull-in-range', { environment })).toEqual([]);
  });
});

describe('acquisition.pull-in', () => {
  it('passes the sample link, as an estimate', () => {
    expect(carrierFinding('acquisition.pull-in')).toMatchObject({ severity: 'pass', estimate: true, limit: 8000 });
  });

  it('cautions when half the time is gone, and types a wider stage', () => {
    const parts = {
      carrier: { stages: [{ name: 'acquire', noiseBandwidth: 0.004 }] },
      limits: { acquisitionSymbols: 5000 },
    };
    const finding = carrierFinding('acquisition.pull-in', parts);
    expect(finding).toMatchObject({ severity: 'caution', limit: 5000 });
    expect(finding.reason).toContain('5.6');
    expect(finding.change!.pointer).toBe('/carrier/stages/0/noiseBandwidth');
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });

  // With ζ = 2, four symbols an update and one update of delay no gains reach BnT 0.0205.
  it('does not type a bandwidth that no gains make with the delay', () => {
    const stages = [{ name: 'acquire', damping: 2, noiseBandwidth: 0.0006 }];
    const finding = carrierFinding('acquisition.pull-in', {
      environment: { carrierTolerancePpm: 60 },
      carrier: { updateInterval: 4, delay: 1, method: 'exact', stages },
      limits: { acquisitionSymbols: 2000 },
    });
    expect(finding).toMatchObject({
      severity: 'caution',
      change: null,
      remedy: 'Replay the range of offsets, or allow more symbols.',
    });
  });

  it('does not type a bandwidth that the delay forbids', () => {
    const parts = {
      carrier: { delay: 20, stages: [{ name: 'acquire', noiseBandwidth: 0.004 }] },
      limits: { acquisitionSymbols: 1000 },
    };
    expect(carrierFinding('acquisition.pull-in', parts)).toMatchObject({ severity: 'caution', change: null });
  });
});
