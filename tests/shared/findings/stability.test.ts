import { describe, expect, it } from 'vitest';
import { afterRemedy, carrierFinding, findingsAbout } from './verdicts';

const stages = (noiseBandwidth: number) => [{ name: 'track', noiseBandwidth }];

describe('stability.closed-loop', () => {
  it('passes the sample link, for both loops', () => {
    expect(findingsAbout('stability.closed-loop').map(({ severity, title }) => [severity, title])).toEqual([
      ['pass', 'Carrier loop is stable'],
      ['pass', 'Clock recovery is stable'],
    ]);
  });

  // Derived: BnT 0.05 bears at most 7 updates of delay.
  it('fails a loop whose delay is too long, and says what it bears', () => {
    const parts = { carrier: { delay: 12, stages: stages(0.05) } };
    const finding = carrierFinding('stability.closed-loop', parts);
    expect(finding).toMatchObject({ severity: 'fail', title: 'Carrier loop is unstable', limit: 1 });
    expect(finding.value).toBeGreaterThan(1);
    expect(finding.reason).toContain('2.4');
    expect(finding.reason).toContain('bear at most 7');
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });
});

describe('stability.phase-margin', () => {
  // Derived: 56.4° with five updates of delay, 31.4° with twenty, at BnT 0.01.
  it.each([
    [5, 'pass', 56.4],
    [20, 'fail', 31.4],
  ])('with a delay of %i is a %s', (delay, severity, degrees) => {
    const finding = carrierFinding('stability.phase-margin', { carrier: { delay, stages: stages(0.01) } });
    expect(finding).toMatchObject({ severity, limit: 45, unit: '°', sense: 'min' });
    expect(Math.abs(finding.value! - degrees)).toBeLessThan(0.1);
  });

  it('types a bandwidth that keeps the margin', () => {
    const parts = { carrier: { delay: 20, stages: stages(0.01) } };
    const finding = carrierFinding('stability.phase-margin', parts);
    expect(finding.change!.pointer).toBe('/carrier/stages/0/noiseBandwidth');
    expect(finding.change!.label).toMatch(/^Set 2.7 of track to 0.00\d+$/);
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });

  // Derived: BnT 0.002 has 65.3° of margin, but powers of two take ζ from 0.707 to about 0.5, where it is near 52°.
  it('types finer words where only the words lack the margin', () => {
    const parts = {
      carrier: { delay: 0, stages: stages(0.002), arithmetic: { gainForm: 'shift' } },
      limits: { phaseMarginDeg: 60 },
    } as const;
    const finding = carrierFinding('stability.phase-margin', parts);
    expect(finding).toMatchObject({ severity: 'fail', change: { pointer: '/carrier/arithmetic/gainForm' } });
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });

  it('says nothing of a loop that is unstable', () => {
    expect(
      findingsAbout('stability.phase-margin', { clock: undefined, carrier: { delay: 60, stages: stages(0.05) } }),
    ).toEqual([]);
  });
});

describe('stability.gain-margin', () => {
  it('passes the sample link', () => {
    expect(carrierFinding('stability.gain-margin')).toMatchObject({ severity: 'pass', unit: 'dB', limit: 7 });
  });

  // Derived: BnT 0.01 with 20 updates of delay bears 2.486 times its gain, 7.9 dB; with ±2 dB of gain error that is close.
  it.each([
    [2, 'caution'],
    [8, 'fail'],
  ])('with a gain error of %i dB is a %s', (amplitudeToleranceDb, severity) => {
    const parts = { signal: { amplitudeToleranceDb }, carrier: { delay: 20, stages: stages(0.01) } };
    const finding = carrierFinding('stability.gain-margin', parts);
    expect(finding.severity).toBe(severity);
    expect(finding.value).toBeCloseTo(20 * Math.log10(2.4857), 2);
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });
});

describe('stability.peaking', () => {
  // Derived from |H|² of 2ζs + 1 over s² + 2ζs + 1 at BnT so small that the loop is the analog one: 2.10 dB at 1/√2,
  // 5.65 dB at 0.3.
  const analogPeakDb = (zeta: number): number => {
    let peak = 0;
    for (let x = 0.01; x < 3; x += 0.001) {
      const d = (2 * zeta * x) ** 2;
      peak = Math.max(peak, (1 + d) / ((1 - x * x) ** 2 + d));
    }
    return 10 * Math.log10(peak);
  };

  it.each([
    [Math.SQRT1_2, 'pass'],
    [0.3, 'caution'],
  ])('with a damping factor of %f is a %s', (damping, severity) => {
    const parts = { carrier: { delay: 0, stages: [{ name: 'track', damping, noiseBandwidth: 1e-4 }] } };
    const finding = carrierFinding('stability.peaking', parts);
    expect(finding).toMatchObject({ severity, limit: 4, unit: 'dB' });
    expect(finding.value).toBeCloseTo(analogPeakDb(damping), 2);
    if (severity === 'caution') expect(afterRemedy(finding, parts).severity).toBe('pass');
  });

  it('types a narrower loop where the delay makes the peak', () => {
    const parts = { carrier: { delay: 20, stages: stages(0.01) } };
    const finding = carrierFinding('stability.peaking', parts);
    expect(finding).toMatchObject({ severity: 'caution', change: { pointer: '/carrier/stages/0/noiseBandwidth' } });
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });
});
