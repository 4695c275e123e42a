import { describe, expect, it } from 'vitest';
import { afterRemedy, carrierFinding, clockFinding, findingsAbout } from './verdicts';

const stages = (noiseBandwidth: number) => [{ name: 'track', noiseBandwidth }];

describe('dynamics.drift-error', () => {
  // Published (Rice 2009): g2 = 4/11401 at BnT 0.01, ζ = 1/√2; the error under ḟ is 360·ḟ·T²/g2 degrees.
  const drifting = (dopplerRateHzPerS: number) => ({
    signal: { symbolRateBd: 1e5 },
    carrier: { delay: 0, stages: stages(0.01) },
    environment: { dopplerRateHzPerS, carrierTolerancePpm: 0, phaseNoise: undefined },
  });

  it.each([
    [5e3, 'pass', 0.9],
    [2e4, 'caution', 0.9],
    [1e5, 'fail', 3],
  ])('under %f Hz/s is a %s', (rate, severity, limit) => {
    const finding = carrierFinding('dynamics.drift-error', drifting(rate));
    expect(finding).toMatchObject({ severity, unit: '°' });
    expect(finding.limit).toBeCloseTo(limit, 12);
    expect(finding.value! / ((360 * rate * 1e-10) / (4 / 11401))).toBeCloseTo(1, 9);
  });

  it('types a bandwidth that follows closely', () => {
    const finding = carrierFinding('dynamics.drift-error', drifting(2e4));
    expect(finding.change!.pointer).toBe('/carrier/stages/0/noiseBandwidth');
    expect(afterRemedy(finding, drifting(2e4)).severity).toBe('pass');
  });

  it('sends a loop whose delay bears no wider bandwidth to order 3', () => {
    const parts = drifting(1e5);
    const finding = carrierFinding('dynamics.drift-error', { ...parts, carrier: { ...parts.carrier, delay: 8 } });
    expect(finding).toMatchObject({ severity: 'fail', change: null });
    expect(finding.remedy).toContain('order 3');
    const third = carrierFinding('dynamics.drift-error', { ...parts, carrier: { ...parts.carrier, order: 3 } });
    expect(third).toMatchObject({ severity: 'pass', value: 0 });
  });

  it('is a matter of a carrier that drifts', () => {
    expect(findingsAbout('dynamics.drift-error')).toEqual([]);
  });
});

describe('dynamics.order-for-drift', () => {
  const parts = {
    carrier: { order: 1, stages: stages(0.01) },
    environment: { dopplerRateHzPerS: 100, carrierTolerancePpm: 0 },
  };

  it('fails order 1 under any drift, and types order 2', () => {
    const finding = carrierFinding('dynamics.order-for-drift', parts);
    expect(finding).toMatchObject({ severity: 'fail', change: { value: 2, label: 'Set 2.2 to order 2' } });
    const second = { ...parts, carrier: { ...parts.carrier, order: 2 } };
    expect(findingsAbout('dynamics.order-for-drift', second)).toEqual([]);
    expect(carrierFinding('dynamics.drift-error', second).severity).toBe('pass');
  });

  it('rests where nothing drifts', () => {
    expect(findingsAbout('dynamics.order-for-drift', { ...parts, environment: { dopplerRateHzPerS: 0 } })).toEqual([]);
  });
});

describe('dynamics.offset-error', () => {
  // Order 1 has exact BnT = g1/(2(2 − g1)); the error per update that an offset of Δf·T cycles makes is 360·ΔfT/g1.
  const first = (offsetHz: number) => ({
    signal: { symbolRateBd: 1e6 },
    carrier: { order: 1, method: 'exact', delay: 0, stages: stages(0.01) },
    environment: { carrierTolerancePpm: 0, dopplerHz: offsetHz },
  });
  const g1 = 0.04 / 1.02;

  it.each([
    [100, 'pass'],
    [1000, 'fail'],
  ])('of order 1 at %f Hz is a %s', (offsetHz, severity) => {
    const finding = carrierFinding('dynamics.offset-error', first(offsetHz));
    expect(finding).toMatchObject({ severity, unit: '°', limit: 3 });
    expect(finding.value! / ((360 * offsetHz * 1e-6) / g1)).toBeCloseTo(1, 8);
  });

  it('types order 2, which has none', () => {
    expect(carrierFinding('dynamics.offset-error', first(1000)).change).toMatchObject({
      pointer: '/carrier/order',
      value: 2,
    });
    const second = { ...first(1000), carrier: { ...first(1000).carrier, order: 2 } };
    expect(findingsAbout('dynamics.offset-error', second)).toEqual([]);
  });

  // By hand: 40 ppm over 4·0.0005 symbols per symbol is 0.02 symbols.
  it('holds a clock loop to its own limit', () => {
    const finding = clockFinding('dynamics.offset-error', { clock: { order: 1, stages: stages(0.0005) } });
    expect(finding).toMatchObject({ severity: 'fail', limit: 0.01, unit: 'symbols' });
    expect(finding.value).toBeCloseTo(0.02, 3);
  });
});
