import { describe, expect, it } from 'vitest';
import { afterRemedy, carrierFinding } from './verdicts';

describe('quantisation.bandwidth and quantisation.damping', () => {
  it('pass with twelve bits', () => {
    expect(carrierFinding('quantisation.bandwidth').severity).toBe('pass');
    expect(carrierFinding('quantisation.damping').severity).toBe('pass');
  });

  it.each(['quantisation.bandwidth', 'quantisation.damping'])(
    '%s fails with three bits, and types enough of them',
    (slug) => {
      const parts = { carrier: { arithmetic: { mantissaBits: 3 } } };
      const finding = carrierFinding(slug, parts);
      expect(finding.severity).toBe('fail');
      expect(finding.change!.pointer).toBe('/carrier/arithmetic/mantissaBits');
      expect(afterRemedy(finding, parts).severity).toBe('pass');
    },
  );

  // One power of two per gain is off by up to a third, far beyond 2 % of damping.
  it('send powers of two to the multiplier', () => {
    const parts = { carrier: { arithmetic: { gainForm: 'shift' } } };
    const finding = carrierFinding('quantisation.damping', parts);
    expect(finding).toMatchObject({
      severity: 'fail',
      change: { value: 'multiplier', label: 'Set 2.12 to multiplier' },
    });
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });

  it('say how many bits the multiplier then needs', () => {
    const arithmetic = { gainForm: 'shift', mantissaBits: 3 };
    const finding = carrierFinding('quantisation.damping', { carrier: { arithmetic } });
    const bits = Number(/^Set 2\.12 to multiplier, then 2\.13 to (\d+) bits\.$/.exec(finding.remedy!)?.[1]);
    const enough = { gainForm: 'multiplier', mantissaBits: bits };
    expect(carrierFinding('quantisation.damping', { carrier: { arithmetic: enough } }).severity).toBe('pass');
    expect(carrierFinding('quantisation.bandwidth', { carrier: { arithmetic: enough } }).severity).toBe('pass');
  });
});

describe('quantisation.gain-vanishes', () => {
  it('passes the sample link', () => {
    expect(carrierFinding('quantisation.gain-vanishes').severity).toBe('pass');
  });

  // By hand: 8 NCO bits, no guard bits and an error of ±2^−32 ask for less than 2^−64 LSB per error LSB.
  it('fails when a gain is less than half the least word', () => {
    const finding = carrierFinding('quantisation.gain-vanishes', {
      signal: { amplitude: 1e6 },
      carrier: {
        stages: [{ name: 'track', noiseBandwidth: 1e-6 }],
        nco: { widthBits: 8, phaseBits: 8 },
        arithmetic: { errorBits: 32, errorFullScaleLog2: -32, guardBits: 0, gainForm: 'shift' },
      },
    });
    expect(finding).toMatchObject({ severity: 'fail', title: 'Carrier loop loses a gain altogether' });
    expect(finding.remedy).toContain('2.8');
  });
});
