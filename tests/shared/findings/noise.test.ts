import { describe, expect, it } from 'vitest';
import { afterRemedy, carrierFinding, findingsAbout } from './verdicts';

const stages = (noiseBandwidth: number) => [{ name: 'track', noiseBandwidth }];

describe('noise.phase-total', () => {
  // Independent: 1.961° (scipy quad), limit 3°.
  it('passes the sample link', () => {
    const finding = carrierFinding('noise.phase-total');
    expect(finding).toMatchObject({ severity: 'pass', limit: 3, unit: '° rms' });
    expect(finding.value).toBeCloseTo(1.9616, 4);
  });

  it('cautions when the oscillator makes most of it, and types the best bandwidth', () => {
    const parts = { carrier: { stages: stages(0.0009) } };
    const finding = carrierFinding('noise.phase-total', parts);
    expect(finding).toMatchObject({ severity: 'caution', title: 'The oscillator makes most of the jitter' });
    expect(finding.change!.label).toBe('Set 2.7 of track to 0.0034');
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });

  it('fails beyond the limit', () => {
    const finding = carrierFinding('noise.phase-total', { limits: { phaseJitterDeg: 1.5 } });
    expect(finding).toMatchObject({ severity: 'fail', limit: 1.5 });
    expect(
      carrierFinding('noise.phase-total', { carrier: { stages: stages(0.05) }, signal: { esN0Db: 6 } }),
    ).toMatchObject({
      severity: 'fail',
      title: 'Noise makes most of the jitter',
    });
  });

  // Without a mask jitter goes with √BnT: the limit asks for (limit/total)² of it, and a little less for two digits.
  it.each([{ noiseBandwidth: 0.05 }, { naturalFrequencyHz: 400_000 }])(
    'types a narrower loop where noise alone makes it, for %j',
    (bandwidth) => {
      const parts = {
        carrier: { delay: 0, stages: [{ name: 'track', ...bandwidth }] },
        environment: { phaseNoise: undefined },
      };
      const finding = carrierFinding('noise.phase-total', parts);
      expect(finding.severity).toBe('fail');
      const again = afterRemedy(finding, parts);
      expect(again.severity).toBe('pass');
      expect(again.value).toBeGreaterThan(0.9 * 3);
    },
  );

  it('types the best natural frequency where that is what the stage asks for', () => {
    const parts = { carrier: { stages: [{ name: 'track', naturalFrequencyHz: 7000 }] } };
    const finding = carrierFinding('noise.phase-total', parts);
    expect(finding.change!.pointer).toBe('/carrier/stages/0/naturalFrequencyHz');
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });

  it('says so where no bandwidth keeps the limit', () => {
    const limits = { phaseJitterDeg: 1.5 };
    const wide = { carrier: { stages: stages(0.02) }, limits };
    const finding = carrierFinding('noise.phase-total', wide);
    expect(finding.remedy).toContain(', then raise 1.5');
    expect(afterRemedy(finding, wide)).toMatchObject({ severity: 'fail', change: null });
    expect(afterRemedy(finding, wide).remedy).toContain('No bandwidth keeps the limit');
  });

  it('says nothing of a detector whose errors are coloured', () => {
    expect(findingsAbout('noise.phase-total', { carrier: undefined })).toEqual([]);
  });
});
