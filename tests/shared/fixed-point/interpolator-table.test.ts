import { describe, expect, it } from 'vitest';
import { interpolatorTable } from '../../../shared/fixed-point/interpolator-table';
import { clockWords } from '../../../shared/fixed-point/words';
import { gardnerLink } from './link';

const tableOf = (interpolator: 'linear' | 'parabolic' | 'cubic') => {
  const counter = { widthBits: 32, fractionBits: 2, tableBits: 12 };
  return interpolatorTable(clockWords({ ...gardnerLink, clock: { ...gardnerLink.clock, interpolator, counter } }))
    .coefficients;
};

describe('interpolatorTable', () => {
  // By hand, times 1024. Linear at ¼: ¾, ¼. Parabolic (½) at ½: −⅛, ⅝, ⅝, −⅛. Cubic at ½: −1/16, 9/16, 9/16, −1/16;
  // at ¼: −7/128, 105/128, 35/128, −5/128.
  it.each([
    ['linear', 1, [0, 768, 256, 0]],
    ['parabolic', 2, [-128, 640, 640, -128]],
    ['cubic', 2, [-64, 576, 576, -64]],
    ['cubic', 1, [-56, 840, 280, -40]],
  ] as const)('%s at %i/4', (interpolator, mu, taps) => {
    expect(tableOf(interpolator)[mu]).toEqual(taps);
  });

  it.each(['linear', 'parabolic', 'cubic'] as const)(
    '%s passes a sample on where the fraction is 0',
    (interpolator) => {
      expect(tableOf(interpolator)[0]).toEqual([0, 1024, 0, 0]);
    },
  );

  // By hand, times 4: 1/8 … 7/8 become ½, 1, 1½, 2, 2½, 3, 3½.
  it('takes a half to the even integer', () => {
    const counter = { widthBits: 32, fractionBits: 3, tableBits: 4 };
    const clock = { ...gardnerLink.clock, interpolator: 'linear' as const, counter };
    const { coefficients } = interpolatorTable(clockWords({ ...gardnerLink, clock }));
    expect(coefficients.map((taps) => taps[2])).toEqual([0, 0, 1, 2, 2, 2, 3, 4]);
  });
});
