import { describe, expect, it } from 'vitest';
import { afterRemedy, carrierFinding, clockFinding, findingsAbout } from './verdicts';

const stage = (noiseBandwidth: number, damping: number = Math.SQRT1_2) => [{ name: 'track', damping, noiseBandwidth }];
const error = (amplitudeToleranceDb: number) => ({ amplitudeToleranceDb });

describe('amplitude.damping', () => {
  // Derived: damping goes with the root of the gain, and Gardner's gain with the square of the amplitude: −4 dB leave
  // ζ·10^(−4/20) of it, 0.707 → 0.446, and −2 dB 0.562.
  it.each([
    [2, 'pass', 0.562],
    [4, 'caution', 0.446],
  ])('of Gardner at ±%f dB is a %s', (tolerance, severity, damping) => {
    const finding = clockFinding('amplitude.damping', {
      signal: error(tolerance),
      clock: { delay: 0, stages: stage(0.0005) },
    });
    expect(finding).toMatchObject({ severity, limit: 0.5, sense: 'min' });
    expect(finding.value).toBeCloseTo(damping, 2);
  });

  it('types a damping that keeps enough', () => {
    const parts = { signal: error(4), clock: { stages: stage(0.0005) } };
    const finding = clockFinding('amplitude.damping', parts);
    expect(finding.change!.pointer).toBe('/clock/stages/0/damping');
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });

  it('is a matter of a gain control with an error', () => {
    expect(findingsAbout('amplitude.damping', { signal: error(0) })).toEqual([]);
  });
});

describe('amplitude.phase-margin', () => {
  it('passes the sample link', () => {
    expect(carrierFinding('amplitude.phase-margin')).toMatchObject({ severity: 'pass', limit: 45, unit: '°' });
  });

  // Derived: BnT 0.01 keeps 48.0° with ten updates of delay; twice the gain crosses at nearly twice the frequency,
  // where the same delay costs about twice as much.
  it('fails where the margin holds but for the gain control, and types a narrower loop', () => {
    const parts = { signal: error(6), carrier: { delay: 10, stages: stage(0.01) } };
    expect(carrierFinding('stability.phase-margin', parts).severity).toBe('pass');
    const finding = carrierFinding('amplitude.phase-margin', parts);
    expect(finding).toMatchObject({ severity: 'fail', change: { pointer: '/carrier/stages/0/noiseBandwidth' } });
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });
});

describe('amplitude.bandwidth', () => {
  // Derived: 2·BnTu = (2g1² + 2g2 + g1·g2)/(g1(4 − 2g1 − g2)), here at 10^(±a/10) of the gains 300/11401 and 4/11401.
  const bandwidth = (ratio: number): number => {
    const [g1, g2] = [(ratio * 300) / 11401, (ratio * 4) / 11401];
    return (2 * g1 ** 2 + 2 * g2 + g1 * g2) / (g1 * (4 - 2 * g1 - g2)) / 2;
  };

  it.each([
    [2, 'pass'],
    [4, 'caution'],
  ])('of a square law at ±%f dB is a %s', (tolerance, severity) => {
    const finding = clockFinding('amplitude.bandwidth', {
      signal: error(tolerance),
      clock: { delay: 0, stages: stage(0.01) },
    });
    expect(finding).toMatchObject({ severity, limit: 50, unit: '%' });
    expect(finding.value).toBeCloseTo(100 * (bandwidth(10 ** (tolerance / 10)) / bandwidth(1) - 1), 6);
  });
});
