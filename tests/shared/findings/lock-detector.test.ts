import { describe, expect, it } from 'vitest';
import { afterRemedy, carrierFinding, findingsAbout } from './verdicts';

const detector = (threshold: number, averagingSymbols = 256) => ({
  carrier: { lockDetector: { threshold, averagingSymbols } },
});

describe('lock-detector.threshold', () => {
  // Published form, e^(−M²σ²/2) times what noise leaves: 0.660 at 10 dB of the fourth power over its mean; by the blocks of
  // the datapath, whose denominator is the noisy power, it lies near 0.7.
  it.each([
    [0.5, 'pass'],
    [0.9, 'fail'],
  ])('of %f is a %s', (threshold, severity) => {
    const finding = carrierFinding('lock-detector.threshold', detector(threshold));
    expect(finding).toMatchObject({ severity, value: threshold, sense: 'max' });
    expect(Math.abs(finding.limit! - 0.68)).toBeLessThan(0.03);
    if (severity === 'fail') expect(afterRemedy(finding, detector(threshold)).severity).toBe('pass');
  });
});

describe('lock-detector.false-alarm', () => {
  // Out of lock the average of N scatters by about 1/√(2N), 0.044 for 256: 0.5 is far out, 0.1 is not.
  it.each([
    [0.5, 'pass'],
    [0.1, 'caution'],
  ])('at a threshold of %f is a %s', (threshold, severity) => {
    const finding = carrierFinding('lock-detector.false-alarm', detector(threshold));
    expect(finding).toMatchObject({ severity, limit: 1e-3, estimate: true });
    if (severity === 'pass') return;
    expect(finding.change!.pointer).toBe('/carrier/lockDetector/threshold');
    expect(afterRemedy(finding, detector(threshold)).severity).toBe('pass');
  });

  it('types a longer block where no threshold serves, and names the threshold that then does', () => {
    const finding = carrierFinding('lock-detector.false-alarm', detector(0.3, 16));
    expect(finding).toMatchObject({
      severity: 'caution',
      change: { pointer: '/carrier/lockDetector/averagingSymbols' },
    });
    const threshold = Number(/then 2\.20 to (0\.\d+)\.$/.exec(finding.remedy!)?.[1]);
    const longer = detector(threshold, finding.change!.value as number);
    expect(carrierFinding('lock-detector.false-alarm', longer).severity).toBe('pass');
    expect(carrierFinding('lock-detector.miss', longer).severity).toBe('pass');
  });

  it('says so where no block is long enough', () => {
    const finding = carrierFinding('lock-detector.false-alarm', { signal: { esN0Db: -4 }, ...detector(0.01) });
    expect(finding).toMatchObject({ severity: 'caution', change: null });
  });

  it('looks at the thresholds of the stages as well', () => {
    const stages = [
      { name: 'acquire', noiseBandwidth: 0.01, until: { symbols: 8000, lockMetric: 0.05 } },
      { name: 'track', noiseBandwidth: 0.004 },
    ];
    const finding = carrierFinding('lock-detector.false-alarm', { carrier: { stages } });
    expect(finding.change).toMatchObject({ pointer: '/carrier/stages/0/until/lockMetric' });
    expect(finding.change!.label).toContain('2.27 of acquire');
    expect(afterRemedy(finding, { carrier: { stages } }).severity).toBe('pass');
  });

  it('is a matter of the carrier loop', () => {
    expect(findingsAbout('lock-detector.false-alarm', { carrier: undefined })).toEqual([]);
  });
});

describe('lock-detector.miss', () => {
  it.each([
    [0.5, 'pass'],
    [0.68, 'caution'],
  ])('at a threshold of %f is a %s', (threshold, severity) => {
    const finding = carrierFinding('lock-detector.miss', detector(threshold));
    expect(finding).toMatchObject({ severity, limit: 1e-3, estimate: true });
    if (severity === 'caution') expect(afterRemedy(finding, detector(threshold)).severity).toBe('pass');
  });
});
