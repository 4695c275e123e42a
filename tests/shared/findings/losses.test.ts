import { describe, expect, it } from 'vitest';
import { afterRemedy, carrierFinding, clockFinding, findingsAbout } from './verdicts';

const stages = (noiseBandwidth: number) => [{ name: 'track', noiseBandwidth }];
const quiet = { environment: { phaseNoise: undefined } };

describe('noise.squaring-loss', () => {
  // Published: 1 + 1/(2γ) for the BPSK Costas loop, 1.500 at 0 dB and 2 at −3.01 dB.
  it.each([
    [0, 'pass', 1.5],
    [-4, 'caution', 1 + 1 / (2 * 10 ** -0.4)],
  ])('of Costas at %f dB is a %s', (esN0Db, severity, loss) => {
    const signal = { modulation: 'BPSK', esN0Db };
    const finding = carrierFinding('noise.squaring-loss', { ...quiet, signal, carrier: { detector: 'costas' } });
    expect(finding).toMatchObject({ severity, unit: 'dB', limit: 3 });
    expect(10 ** (finding.value! / 10) / loss).toBeCloseTo(1, 6);
  });

  // Derived (closed form of the power law): M = 8 loses 8.9 at 10 dB; decisions lose less.
  it('sends the eighth power to decisions', () => {
    const parts = { signal: { modulation: '8PSK', esN0Db: 13 }, carrier: { detector: 'power-law' } };
    const finding = carrierFinding('noise.squaring-loss', parts);
    expect(finding).toMatchObject({ severity: 'caution', change: { value: 'decision', label: 'Set 2.1 to decision' } });
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });

  it('names no detector where noise leaves the others no slope', () => {
    const parts = { signal: { modulation: '8PSK', esN0Db: -10 }, carrier: { detector: 'power-law' } };
    expect(carrierFinding('noise.squaring-loss', parts)).toMatchObject({ severity: 'caution', change: null });
  });

  it('is a matter of phase detectors', () => {
    expect(findingsAbout('noise.squaring-loss', { carrier: undefined })).toEqual([]);
  });
});

describe('noise.cycle-slip', () => {
  // Derived: BPSK on known symbols has σ² = BnT/γ and ρ = γ/(4·BnT); 0.0101005 is the exact BnT for 0.01, ζ = 1/2.
  it.each([
    [3, 'pass'],
    [-5, 'caution'],
    [-9, 'fail'],
  ])('at %f dB is a %s', (esN0Db, severity) => {
    const carrier = {
      detector: 'known-symbols',
      delay: 0,
      stages: [{ name: 'track', damping: 0.5, noiseBandwidth: 0.01 }],
    };
    const finding = carrierFinding('noise.cycle-slip', { ...quiet, signal: { modulation: 'BPSK', esN0Db }, carrier });
    expect(finding).toMatchObject({ severity, limit: 10, unit: 'dB', estimate: true });
    expect(finding.value).toBeCloseTo(esN0Db - 10 * Math.log10(4 * 0.0101005), 1);
  });

  it('types a bandwidth at which slips are rare', () => {
    const parts = { ...quiet, signal: { esN0Db: 6 }, carrier: { delay: 0, stages: stages(0.05) } };
    const finding = carrierFinding('noise.cycle-slip', parts);
    expect(finding.severity).toBe('fail');
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });
});

describe('noise.timing-total', () => {
  it('passes the sample link', () => {
    expect(clockFinding('noise.timing-total')).toMatchObject({ severity: 'pass', limit: 0.01, unit: 'symbols rms' });
  });

  // By hand: jitter nearly goes with √BnT, so what is 0.0057 at 0.0005 is beyond 0.01 at 0.002.
  it('fails a loop that is four times as wide, and types one that is not', () => {
    const parts = { clock: { stages: stages(0.002) } };
    const finding = clockFinding('noise.timing-total', parts);
    expect(finding).toMatchObject({ severity: 'fail', change: { pointer: '/clock/stages/0/noiseBandwidth' } });
    const again = afterRemedy(finding, parts);
    expect(again.severity).toBe('pass');
    expect(again.value).toBeGreaterThan(0.009);
  });

  it('says so where no bandwidth keeps the limit', () => {
    const parts = { limits: { timingJitterSymbols: 1e-5 } };
    expect(clockFinding('noise.timing-total', parts)).toMatchObject({ severity: 'fail', change: null });
  });
});

describe('clock.pattern-noise', () => {
  it('passes the sample link', () => {
    expect(clockFinding('clock.pattern-noise')).toMatchObject({ severity: 'pass', limit: 0.005 });
  });

  // F. Gardner 1986: the pattern stays when the noise is gone, and grows as the roll-off shrinks.
  it('cautions a wide loop at small roll-off in no noise to speak of', () => {
    const parts = { signal: { esN0Db: 60, rollOff: 0.2 }, clock: { stages: stages(0.02) } };
    const finding = clockFinding('clock.pattern-noise', parts);
    expect(finding).toMatchObject({ severity: 'caution', title: 'Pattern noise takes the timing limit' });
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });
});
