import { describe, expect, it } from 'vitest';
import { headroomGroups } from '../../../../src/components/plan/headroom-rows';
import { design } from '../../support/plan';

const groups = headroomGroups(design().carrier!, { oscillator: 'NCO', esN0Db: 10 });
const [before, behind] = groups;

describe('headroomGroups', () => {
  it('parts the nodes before the gains from those behind them', () => {
    expect(groups.map(({ heading }) => heading)).toEqual(['Detector units', 'NCO units, weights in line']);
    expect(before!.rows.map(({ label }) => label)).toEqual(['Sample, 4σ at 10 dB', 'Error, 4σ at 10 dB']);
  });

  it('shows each node once, at the stage with the least headroom', () => {
    const labels = behind!.rows.map(({ label }) => label);
    expect(labels).toHaveLength(4);
    expect(labels[0]).toBe('Proportional, acquire');
  });

  // ±25 ppm at both ends of 1.55 GHz are ±77.5 kHz.
  it('names the offset that the integrator is held to', () => {
    expect(behind!.rows.map(({ label }) => label)).toContain('Integrator at ±77.5 kHz');
  });

  it('stands weights in line: a 40-bit word with 8 guard bits begins where a 32-bit word does', () => {
    expect(behind!.rows.map(({ bits, guard, offset }) => [bits, guard, offset])).toEqual([
      [32, 0, 0],
      [40, 8, 0],
      [40, 8, 0],
      [32, 0, 0],
    ]);
  });

  // NCO clock 27.5 MHz: bit 30 weighs 27.5 MHz/4 = 6.875 MHz, bit 0 27.5 MHz/2^32 = 6.40 mHz.
  it('gives weights their frequency', () => {
    const marks = behind!.axis.map(({ label, sub }) => [label, sub]);
    expect(marks[0]).toEqual(['30', '6.88 MHz']);
    expect(marks.at(-2)).toEqual(['0', '6.4 mHz']);
    expect(marks.at(-1)).toEqual(['−8', undefined]);
  });
});
