import { Ajv2020 } from 'ajv/dist/2020.js';
import { describe, expect, it } from 'vitest';
import wordsSchema from '../../../schemas/words.schema.json';
import { polyphaseBank } from '../../../shared/detectors/polyphase-bank';
import { clockDatapath } from '../../../shared/fixed-point/datapath/clock-exact';
import { bankTable, interpolatorTable } from '../../../shared/fixed-point/interpolator-table';
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

describe('bankTable', () => {
  // By hand, times 4: 0.125 → ½ → 0, 0.375 → 1½ → 2, −0.625 → −2½ → −2, 0.7 → 2.8 → 3.
  it('rounds to nearest, a half to the even integer', () => {
    expect(bankTable([[0.125, 0.375, -0.625, 0.7]], 4)).toEqual([[0, 2, -2, 3]]);
  });

  it('has no −0', () => {
    expect(Object.is(bankTable([[-1e-9, 1, 0, 0]], 12)[0]![0], 0)).toBe(true);
  });
});

describe('the table of a polyphase bank', () => {
  const bank = polyphaseBank({ rollOff: 0.35, samplesPerSymbol: 2, fractions: 4 });
  const clock = { ...gardnerLink.clock, interpolator: 'polyphase' as const };
  const words = clockWords({
    ...gardnerLink,
    clock: { ...clock, counter: { widthBits: 32, fractionBits: 2, tableBits: 12 } },
    bank,
  });
  const valid = new Ajv2020({ strict: false }).compile(wordsSchema);

  it('is kept in the words, and read from there', () => {
    expect(words.taps![2]!).toEqual(bank[2]!.map((tap) => Math.round(1024 * tap)));
    const moved = { ...words, taps: words.taps!.map((taps) => taps.map((tap) => tap + 1)) };
    expect(interpolatorTable(moved).coefficients[0]).toEqual([1, 1025, 1, 1]);
  });

  it('is asked for by the schema of the words, of a polyphase bank alone', () => {
    expect(valid(words), JSON.stringify(valid.errors)).toBe(true);
    const { taps, ...without } = words;
    expect(taps).toHaveLength(4);
    expect(valid(without)).toBe(false);
    expect(valid({ ...without, interpolator: 'cubic' })).toBe(true);
    expect(() => interpolatorTable(without)).toThrow(expect.objectContaining({ parameter: 'taps' }));
  });

  // By hand: a ramp of 100 a sample is taken at the nominal half-way place of 2 samples per symbol, fraction 0, and
  // comes out as the sample two before the newest.
  it('drives the datapath', () => {
    const datapath = clockDatapath(words);
    const seen = Array.from({ length: 6 }, (_, t) => datapath.step([100 * t, -100 * t]).interpolants);
    for (const [t, [interpolant]] of seen.entries()) {
      if (t < 3) continue;
      expect(interpolant!.mu).toBe(0);
      expect(interpolant!.value.map(Number)).toEqual([100 * (t - 2), -100 * (t - 2)]);
    }
  });
});
