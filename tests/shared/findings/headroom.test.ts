import { describe, expect, it } from 'vitest';
import { afterRemedy, carrierFinding, clockFinding, findingsAbout } from './verdicts';

describe('headroom', () => {
  it.each(['proportional', 'increment', 'integrator', 'frequency-word'])('passes the %s of the sample link', (node) => {
    expect(carrierFinding(`headroom.${node}`).severity).toBe('pass');
  });

  it('threatens nothing where all is well', () => {
    const { reason } = carrierFinding('headroom.proportional');
    expect(reason).toMatch(/^Stage acquire: the largest error leaves [0-9.]+ of 32 bits\.$/);
    expect(carrierFinding('headroom.frequency-word').reason).toMatch(
      /^Sum of centre frequency, .* leaves [0-9.]+ of 32/,
    );
  });

  // By hand: the error of QPSK reaches 1 + 4·√2·√(1/20) = 2.265 at 10 dB, beyond ±2 by log2 1.1325 = 0.18 bits.
  it('cautions when noise peaks leave the error word, and widens its scale', () => {
    const finding = carrierFinding('headroom.error');
    expect(finding).toMatchObject({
      severity: 'caution',
      unit: 'bits',
      limit: 0,
      change: { value: 2, label: 'Set 2.11 to ±4' },
    });
    expect(finding.value).toBeCloseTo(-Math.log2((1 + 4 * Math.SQRT2 * Math.sqrt(1 / 20)) / 2), 9);
    expect(afterRemedy(finding).severity).toBe('pass');
  });

  it('fails when that error would wrap', () => {
    expect(
      carrierFinding('headroom.error', { carrier: { arithmetic: { overflow: { error: 'wrap' } } } }).severity,
    ).toBe('fail');
  });

  it('cautions when samples are clipped', () => {
    const parts = { signal: { sampleFullScaleLog2: 0 } };
    const finding = carrierFinding('headroom.sample', parts);
    expect(finding.severity).toBe('caution');
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });

  it.each([
    [
      'proportional',
      {
        arithmetic: { errorBits: 2 },
        stages: [{ name: 'track', noiseBandwidth: 0.45 }],
        delay: 0,
        nco: { widthBits: 8, phaseBits: 8 },
      },
      { signal: { amplitude: 0.01 } },
    ],
    ['increment', { arithmetic: { integratorBits: 24, guardBits: 8 } }, {}],
    ['integrator', { arithmetic: { integratorBits: 30 } }, {}],
    ['frequency-word', { nco: { centreHz: 13.7e6 } }, {}],
  ])('fails when the %s leaves its word', (node, carrier, parts) => {
    const finding = carrierFinding(`headroom.${node}`, { ...parts, carrier });
    expect(finding.severity).toBe('fail');
    expect(finding.value).toBeLessThan(0);
  });

  it('holds every node to the limit of the plan', () => {
    expect(carrierFinding('headroom.integrator', { limits: { headroomBits: 8 } })).toMatchObject({
      severity: 'caution',
      limit: 8,
    });
  });

  it('widens an integrator that is too narrow', () => {
    const parts = { carrier: { arithmetic: { integratorBits: 30 } } };
    expect(afterRemedy(carrierFinding('headroom.integrator', parts), parts).severity).toBe('pass');
  });

  it('widens one with a limit as well, since the limit is no wider than the word', () => {
    const parts = { carrier: { arithmetic: { integratorBits: 30, integratorLimitHz: 250e3 } } };
    const finding = carrierFinding('headroom.integrator', parts);
    expect(finding).toMatchObject({ severity: 'fail', change: { pointer: '/carrier/arithmetic/integratorBits' } });
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });

  // By hand: an error of ±64 at g1 0.0315 and Kd 0.34 steps by 0.0315·64/(0.34·2) = 2.9 cycles, where ±½ fit.
  it.each([
    ['saturate', 'caution'],
    ['wrap', 'fail'],
  ])('takes a full-scale error that would %s for a %s, as no signal need ever make it', (overflow, severity) => {
    const clock = {
      stages: [{ name: 'track', noiseBandwidth: 0.012 }],
      arithmetic: { errorFullScaleLog2: 6, overflow },
    };
    const finding = clockFinding('headroom.proportional', { signal: { rollOff: 0.1 }, clock });
    expect(finding.severity).toBe(severity);
    expect(finding.remedy).toBe('Lower 3.7, or the scale of the error (3.11).');
  });

  // 10^6 ppm of 2^31 counter LSB per sample with 8 guard bits needs 39 bits and a sign.
  it('knows the integrator of the clock', () => {
    const parts = { environment: { clockTolerancePpm: 20 }, clock: { arithmetic: { integratorBits: 20 } } };
    expect(clockFinding('headroom.integrator').severity).toBe('pass');
    expect(clockFinding('headroom.integrator', parts).severity).toBe('fail');
  });

  it('names the loop where there are two', () => {
    expect(findingsAbout('headroom.integrator').map(({ title }) => title)).toEqual([
      'Carrier: the integrator holds the offset',
      'Clock: the integrator holds the offset',
    ]);
  });
});
