import { describe, expect, it } from 'vitest';
import { afterRemedy, carrierFinding } from './verdicts';

const stages = (noiseBandwidth: number) => [{ name: 'track', noiseBandwidth }];

describe('bandwidth.exact-against-wanted', () => {
  // Derived: wanted 0.05 with five updates of delay is 0.1653.
  it('cautions when the delay widens the loop', () => {
    const parts = { carrier: { delay: 5, stages: stages(0.05) } };
    const finding = carrierFinding('bandwidth.exact-against-wanted', parts);
    expect(finding).toMatchObject({
      severity: 'caution',
      title: 'Carrier loop misses the wanted bandwidth',
      unit: '%',
    });
    expect(finding.value).toBeCloseTo(230.6, 0);
    expect(finding.change).toEqual({ pointer: '/carrier/method', value: 'exact', label: 'Set 2.5 to exact' });
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });

  it('does not offer what cannot be reached', () => {
    const finding = carrierFinding('bandwidth.exact-against-wanted', { carrier: { delay: 7, stages: stages(0.0535) } });
    expect(finding.change).toBeNull();
    expect(finding.remedy).toContain('2.4');
  });

  it('rests where the loop has what it asks for', () => {
    expect(carrierFinding('bandwidth.exact-against-wanted', { carrier: { delay: 0 } }).severity).toBe('pass');
  });
});

describe('bandwidth.delay-product', () => {
  it.each([
    [0.009, 'pass'],
    [0.011, 'caution'],
  ])('with ten updates of delay calls BnT %f a %s', (noiseBandwidth, severity) => {
    const parts = { carrier: { delay: 10, stages: stages(noiseBandwidth) } };
    const finding = carrierFinding('bandwidth.delay-product', parts);
    expect(finding).toMatchObject({ severity, limit: 0.1, source: 'common practice' });
    expect(finding.value).toBeCloseTo(10 * noiseBandwidth, 12);
    if (severity === 'caution') expect(afterRemedy(finding, parts).severity).toBe('pass');
  });
});
