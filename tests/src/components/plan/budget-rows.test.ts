import { describe, expect, it } from 'vitest';
import {
  budgetGroups,
  dominantText,
  interactionRows,
  shareOf,
  startText,
} from '../../../../src/components/plan/budget-rows';
import type { GainCell, GainRow } from '../../../../src/components/plan/group-rows';
import { design } from '../../support/plan';

const { carrier, clock } = design();
const rows = (loop: typeof carrier, title: string): GainRow[] =>
  budgetGroups(loop!).find((group) => group.title === title)?.rows ?? [];
const values = (loop: typeof carrier, title: string, label: string): (number | null)[] =>
  rows(loop, title)
    .find((row) => row.label === label)!
    .cells.map((cell) => (cell as GainCell | null)?.value ?? null);

describe('budgetGroups', () => {
  // A separate integration of mask and noise gives 1.961° at BnT 0.004, delay 3, without quantisation, which adds less than 0.01°.
  it('adds the terms up to the total', () => {
    expect(values(carrier, 'Jitter, rms', 'Total')[1]).toBeCloseTo(1.961, 1);
    expect(values(carrier, 'Jitter, rms', 'Limit')).toEqual([3, 3]);
  });

  it('shares out the whole of the mean square', () => {
    for (const loop of [carrier, clock]) {
      const shares = rows(loop, 'Share of the total, of its square').map(
        ({ cells }) => (cells.at(-1) as GainCell).value ?? 0,
      );
      expect(shares.reduce((sum, value) => sum + value, 0)).toBeCloseTo(100, 6);
    }
  });

  // QPSK: ambiguous from Rs/8 on, false locks every Rs/4: 3.4375 and 6.875 MHz at 27.5 MBd. Word: 27.5 MHz/2^32 = 6.40 mHz.
  it('puts what belongs to the whole loop under the last stage', () => {
    expect(values(carrier, 'Range and acquisition', 'Unambiguous below')[1]).toBeCloseTo(3.4375, 9);
    expect(values(carrier, 'Range and acquisition', 'False locks every')[1]).toBeCloseTo(6.875, 9);
    expect(values(carrier, 'Detector at lock', 'One LSB of the word')[1]).toBeCloseTo(6.4, 2);
    expect(rows(carrier, 'Detector at lock').every(({ cells }) => cells[0] === null)).toBe(true);
  });

  // −6.0206 P + 3.92 dBc with one discarded bit, −6.0206 P with four or more: 12 phase bits of 32 (published).
  it('names the worst spur', () => {
    expect(values(carrier, 'Cost and bounds, last stage', 'Worst spur of the NCO')[1]).toBeCloseTo(-72.2, 1);
  });

  it('leaves out what a design of an earlier engine does not say', () => {
    const old = { ...carrier!, budget: null, interpolator: null };
    expect(budgetGroups(old).map(({ title }) => title)).not.toContain('Jitter, rms');
  });
});

describe('shareOf', () => {
  const stage = { ...carrier!.budget!.stages[1]!, thermal: 3, oscillator: 4, total: 5 };
  it('is the share of the squares', () => {
    expect(shareOf(stage, 'thermal')).toBeCloseTo(36, 12);
    expect(shareOf({ ...stage, total: null }, 'thermal')).toBeNull();
  });
});

describe('dominantText', () => {
  it('names the largest term of the last stage and its share', () => {
    expect(dominantText(carrier!)).toMatch(
      /^Stage track is within its limit; its largest term is (noise|oscillator), \d+ % of the mean square\.$/,
    );
    expect(dominantText({ ...carrier!, budget: null })).toBeUndefined();
  });
});

describe('interactionRows', () => {
  const of = {
    bandwidthRatio: 8,
    clockNeedsCarrier: false,
    carrierNeedsClock: true,
    startFirst: 'clock' as const,
    carrierFromTimingDeg: 0.2,
    lossFromTimingDb: 0.01,
    clockGainFromPhase: null,
  };
  it('leaves out what is not known and says which loop starts', () => {
    expect(interactionRows(of)).toHaveLength(3);
    expect(startText(of)).toBe('Clock recovery can start first; the carrier loop needs it locked.');
  });
});
