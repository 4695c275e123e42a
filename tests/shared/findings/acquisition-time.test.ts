import { describe, expect, it } from 'vitest';
import { afterRemedy, carrierFinding, findingsAbout } from './verdicts';

const stages = (symbols: number) => [
  { name: 'acquire', noiseBandwidth: 0.01, until: { symbols } },
  { name: 'track', noiseBandwidth: 0.004 },
];

describe('acquisition.stage-time', () => {
  it('passes the sample link', () => {
    expect(findingsAbout('acquisition.stage-time').map(({ severity }) => severity)).toEqual(['pass', 'pass']);
  });

  // Common practice: a type-2 loop settles in a few times 1/(ζωn); ωn = 0.0189 at BnT 0.01 makes that hundreds of symbols.
  it('cautions a stage that is left after a hundred symbols, and types enough', () => {
    const parts = { carrier: { stages: stages(100) } };
    const finding = carrierFinding('acquisition.stage-time', parts);
    expect(finding).toMatchObject({ severity: 'caution', value: 100, unit: 'symbols', estimate: true });
    expect(finding.change!.pointer).toBe('/carrier/stages/0/until/symbols');
    expect(finding.change!.label).toMatch(/^Set 2\.21 of acquire to \d+ symbols$/);
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });

  it('is a matter of several stages', () => {
    const carrier = { stages: [{ name: 'track', noiseBandwidth: 0.004 }] };
    expect(findingsAbout('acquisition.stage-time', { carrier, clock: undefined })).toEqual([]);
  });
});

describe('acquisition.total-time', () => {
  // By hand: the last stage takes over when the first ends, here at 8000 and 12000 of 10000 symbols.
  it.each([
    [8000, 'pass'],
    [12000, 'caution'],
  ])('with a first stage of %i symbols is a %s', (symbols, severity) => {
    const parts = { carrier: { stages: stages(symbols) } };
    const finding = carrierFinding('acquisition.total-time', parts);
    expect(finding).toMatchObject({ severity, value: symbols, limit: 10000, estimate: true });
    if (severity === 'pass') return;
    expect(finding.change).toMatchObject({ pointer: '/carrier/stages/0/until/symbols', value: 10000 });
    expect(afterRemedy(finding, parts).severity).toBe('pass');
  });

  it('says so where the stages need the time themselves', () => {
    const parts = { carrier: { stages: stages(700) }, limits: { acquisitionSymbols: 300 } };
    expect(carrierFinding('acquisition.total-time', parts)).toMatchObject({ severity: 'caution', change: null });
  });
});
