import { csvParse } from 'd3';
import { describe, expect, it } from 'vitest';
import { pointsCsv } from '../../../../src/components/replays/points-csv';
import { result } from '../../support/replay';

describe('pointsCsv', () => {
  it('is read by a CSV parser, digits whole, what is missing empty', () => {
    const third = result(1, 'fail', { offsetHz: -1000 / 3, lockTimeSymbols: null, phaseJitterDeg: null });
    const [first, second] = csvParse(pointsCsv([result(0, 'pass'), third]));
    expect(first).toMatchObject({ es_n0_db: '6.5', locks: '400', lock_time_median_symbols: '2971', verdict: 'pass' });
    expect(Number(second!.offset_hz)).toBe(-1000 / 3);
    expect(second).toMatchObject({ lock_time_median_symbols: '', phase_jitter_deg_rms: '', checksum: '00c0ffee' });
  });
});
