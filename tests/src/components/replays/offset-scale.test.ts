import { describe, expect, it } from 'vitest';
import { offsetScale } from '../../../../src/components/replays/offset-scale';

describe('offsetScale', () => {
  it('takes the unit from the largest and the digits from the finest offset', () => {
    const scale = offsetScale([-77_500, -69_750, 0]);
    expect(scale.unit).toBe('kHz');
    expect([-77_500, -69_750, 0, 93_000].map(scale.text)).toEqual(['−77.50', '−69.75', '0.00', '+93.00']);
  });

  it('stops at three digits where the spacing does not end', () => {
    expect(offsetScale([-1000, -1000 / 3, 1000]).text(-1000 / 3)).toBe('−0.333');
  });

  it('holds for no offset at all', () => {
    expect(offsetScale([0])).toMatchObject({ unit: 'Hz', decimals: 0 });
  });
});
