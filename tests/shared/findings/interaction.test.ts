import { describe, expect, it } from 'vitest';
import { afterRemedy, findingsAbout } from './verdicts';
import type { PlanParts } from '../sample-plan';

const stages = (noiseBandwidth: number) => [{ name: 'track', noiseBandwidth }];

function findingOf(slug: string, parts: PlanParts = {}) {
  const [finding, more] = findingsAbout(slug, parts);
  if (!finding || more) throw new Error(`not one finding ${slug}`);
  return finding;
}

describe('interaction.bandwidth-ratio', () => {
  // By hand: 0.004 over 0.0005 is 8, nearly so with the delays; 0.002 makes it 2.
  it.each([
    [0.0005, 'pass', 8],
    [0.002, 'caution', 2],
    [0.02, 'pass', 5],
  ])('with a clock loop of %f is a %s', (bandwidth, severity, ratio) => {
    const parts = { clock: { delay: 0, stages: stages(bandwidth) } };
    const finding = findingOf('interaction.bandwidth-ratio', parts);
    expect(finding).toMatchObject({ severity, limit: 3, sense: 'min' });
    expect(Math.abs(finding.value! / ratio - 1)).toBeLessThan(0.06);
    if (severity === 'pass') return;
    expect(finding.change!.label).toMatch(/^Set 3\.7 of track to 0\.00\d+$/);
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });

  it('is a matter of two loops', () => {
    expect(findingsAbout('interaction.bandwidth-ratio', { clock: undefined })).toEqual([]);
  });
});

describe('interaction.start-order', () => {
  it('lets Gardner start alone', () => {
    expect(findingOf('interaction.start-order').severity).toBe('pass');
  });

  it('cautions a timing detector that decides, and types one that does not', () => {
    const parts = { clock: { detector: 'zero-crossing' } };
    const finding = findingOf('interaction.start-order', parts);
    expect(finding).toMatchObject({ severity: 'caution', title: 'Each loop waits for the other' });
    expect(finding.change).toEqual({ pointer: '/clock/detector', value: 'gardner', label: 'Set 3.1 to gardner' });
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });
});

describe('interaction.timing-loss', () => {
  it('passes the sample link', () => {
    expect(findingOf('interaction.timing-loss')).toMatchObject({ severity: 'pass', limit: 0.3, unit: 'dB' });
  });

  // By hand: jitter of 0.0057 costs 0.003 dB at 10 dB, all of it with the variance; forty times the bandwidth makes that 0.12
  // and more by the pattern, against 0.05 allowed.
  it('fails a loop so wide that its neighbours leak in, and types a narrower one', () => {
    const parts = { clock: { stages: stages(0.02) }, limits: { implementationLossDb: 0.05 } };
    const finding = findingOf('interaction.timing-loss', parts);
    expect(finding).toMatchObject({ severity: 'fail', change: { pointer: '/clock/stages/0/noiseBandwidth' } });
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });
});

describe('interaction.timing-slope', () => {
  it('passes Gardner, which needs no phase', () => {
    expect(findingOf('interaction.timing-slope')).toMatchObject({ severity: 'pass', value: 1 });
  });

  // Derived: a normal error leaves e^(−σ²/2), 0.9 at 26.3°.
  it('cautions decisions behind a carrier that jitters by more than 26.3°', () => {
    const parts = {
      signal: { modulation: 'BPSK', esN0Db: -5 },
      carrier: { detector: 'costas', delay: 0, stages: stages(0.05) },
      clock: { detector: 'zero-crossing', stages: stages(0.0005) },
      environment: { phaseNoise: undefined },
    };
    const finding = findingOf('interaction.timing-slope', parts);
    expect(finding.severity).toBe('caution');
    expect(finding.value).toBeLessThan(0.9);
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });
});

describe('noise.implementation-loss', () => {
  it('passes the sample link', () => {
    expect(findingOf('noise.implementation-loss')).toMatchObject({ severity: 'pass', limit: 0.3, unit: 'dB' });
  });

  it('fails where the jitter costs more than the plan allows, and types a narrower loop', () => {
    const parts = {
      environment: { phaseNoise: undefined },
      carrier: { stages: stages(0.05) },
      limits: { implementationLossDb: 0.1 },
    };
    const finding = findingOf('noise.implementation-loss', parts);
    expect(finding).toMatchObject({ severity: 'fail', change: { pointer: '/carrier/stages/0/noiseBandwidth' } });
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });
});
