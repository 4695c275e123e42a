import { describe, expect, it } from 'vitest';
import { gainGroups } from '../../../../src/components/plan/gain-rows';
import { widthBehindPoint, type GainCell, type GainRow } from '../../../../src/components/plan/group-rows';
import { design } from '../../support/plan';

const carrier = design().carrier!;
const rows = (title: string): GainRow[] => gainGroups(carrier).find((group) => group.title === title)!.rows;
const values = (title: string, label: string): (number | null)[] =>
  rows(title)
    .find((row) => row.label === label)!
    .cells.map((cell) => (cell as GainCell | null)?.value ?? null);

describe('gainGroups', () => {
  // M. Rice 2009, appendix C, by hand in exact fractions: ζ = 1/√2 and BnT = 1/100 give g1 = 300/11401, g2 = 4/11401.
  it('shows the gains of the loop', () => {
    expect(values('Gains of the loop', 'Proportional g1')[0]).toBeCloseTo(300 / 11401, 12);
    expect(values('Gains of the loop', 'Integral g2')[0]).toBeCloseTo(4 / 11401, 14);
  });

  // Sign detector on QPSK at 10 dB: slope 1.3880 (Mengali & D'Andrea 1997), so one unit turns 300/11401/1.3880.
  it('gives the gains per detector unit', () => {
    expect(values('Gains, per detector unit', 'Proportional')[0]).toBeCloseTo(300 / 11401 / 1.388, 5);
  });

  // Bn = BnT · 27.5 MBd; the row takes the prefix of its largest value.
  it('writes frequencies of a row in one prefix', () => {
    const row = rows('What the loop does, delay included').find(({ label }) => label === 'Noise bandwidth Bn')!;
    expect(row.unit).toBe('kHz');
    const [exact] = values('What the loop does, delay included', 'Noise bandwidth BnT');
    expect((row.cells[0] as GainCell).value).toBeCloseTo(exact! * 27500, 9);
  });

  // Largest stable extra delay of ζ = 1/√2: 38 updates at BnT 0.01 (by the table of the stability limit, derived).
  it('says how much delay the gains bear', () => {
    expect(values('What the loop does, delay included', 'Stable up to delay')[0]).toBe(38);
  });

  // Published (F. Gardner, Phaselock Techniques): ζ goes with the root of the gain, so ±1 dB of amplitude is 10^(±1/40).
  it('shows the loop at both ends of the gain control', () => {
    const title = 'With the amplitude 1 dB low and high';
    const [, low] = values(title, 'Damping ζ, low');
    const [, high] = values(title, 'Damping ζ, high');
    expect(Math.abs(high! / low! / 10 ** (2 / 40) - 1)).toBeLessThan(0.01);
  });

  it('leaves out what a loop of this order does not have', () => {
    expect(rows('Words').map(({ label }) => label)).not.toContain('Second integral');
  });
});

describe('widthBehindPoint', () => {
  it.each([
    [{ value: 0.011102, decimals: 6 }, 7],
    [{ value: 2.6313e-2, significant: 5, exponent: true }, 8],
    [{ value: 251, decimals: 0 }, 0],
    [null, 0],
  ])('counts the characters from the point on: %o', (cell, width) => {
    expect(widthBehindPoint(cell)).toBe(width);
  });
});
