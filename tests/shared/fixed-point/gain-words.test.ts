import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { gainOf, gainWord, type GainForm } from '../../../shared/fixed-point/gain-words';

/** Every mantissa that a form allows, straight from its definition. */
function allowed(form: GainForm, bits: number): number[] {
  const all = Array.from({ length: 2 ** (bits - 1) - 1 }, (_, k) => k + 1);
  if (form === 'shift') return [1];
  if (form === 'multiplier') return all.filter((m) => m >= 2 ** (bits - 2));
  return all.filter((m) => [m - 1, m, m + 1].some((near) => near > 0 && Number.isInteger(Math.log2(near))));
}

/** The nearest allowed gain by trying every one. */
function nearestByTrial(gain: number, form: GainForm, bits: number): number {
  let best = 0;
  for (const mantissa of allowed(form, bits)) {
    for (let shift = -63; shift <= 63; shift++) {
      const value = mantissa * 2 ** -shift;
      const [gap, least] = [Math.abs(value - gain), Math.abs(best - gain)];
      if (gap < least || (gap === least && value < best)) best = value;
    }
  }
  return best;
}

const form = fc.constantFrom<GainForm>('multiplier', 'shift', 'shift-add');

describe('gainWord', () => {
  it('is the nearest of all gains that the hardware can hold', () => {
    fc.assert(
      fc.property(
        form,
        fc.integer({ min: 2, max: 9 }),
        fc.integer({ min: 1, max: 4095 }),
        fc.integer({ min: -60, max: 60 }),
        (f, bits, m, e) => {
          const gain = m * 2 ** e;
          expect(gainOf(gainWord({ gain, form: f, mantissaBits: bits }))).toBe(nearestByTrial(gain, f, bits));
          expect(gainOf(gainWord({ gain: -gain, form: f, mantissaBits: bits }))).toBe(
            -nearestByTrial(gain, f, bits) + 0,
          );
        },
      ),
      { numRuns: 300, seed: 11 },
    );
  });

  it('keeps a multiplier mantissa at full length', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 2, max: 32 }),
        fc.double({ min: 1e-6, max: 1e6, noNaN: true }),
        (mantissaBits, gain) => {
          const { mantissa } = gainWord({ gain, form: 'multiplier', mantissaBits });
          expect(mantissa).toBeGreaterThanOrEqual(2 ** (mantissaBits - 2));
          expect(mantissa).toBeLessThan(2 ** (mantissaBits - 1));
        },
      ),
    );
  });

  // By hand: 1.5 lies midway between 1 and 2, 6 midway between 4 and 8.
  it.each([1.5, 6, -1.5])('takes the smaller magnitude for the tie %f between powers of two', (gain) => {
    expect(Math.abs(gainOf(gainWord({ gain, form: 'shift', mantissaBits: 8 })))).toBe(
      2 ** Math.floor(Math.log2(Math.abs(gain))),
    );
  });

  it.each([
    [2 ** -64, { mantissa: 0, shift: 0 }],
    [2 ** -64 * 1.001, { mantissa: 1, shift: 63 }],
    [0, { mantissa: 0, shift: 0 }],
  ])('gives %f, half the least gain or less, no word at all', (gain, word) => {
    expect(gainWord({ gain, form: 'shift', mantissaBits: 8 })).toEqual(word);
  });

  it('rounds over the top of the mantissa into the next shift', () => {
    expect(gainWord({ gain: 127.9, form: 'multiplier', mantissaBits: 8 })).toEqual({ mantissa: 64, shift: -1 });
  });

  it('holds the largest gain where more is wanted', () => {
    expect(gainWord({ gain: 1e300, form: 'multiplier', mantissaBits: 8 })).toEqual({ mantissa: 127, shift: -63 });
  });

  // Spread of ζ from one power of two per gain over BnT .001 … .05 at ζ = 1/√2: .500 … 1.033 (derived, two ways).
  it('turns ζ = .7071 into .500 … 1.033 when each gain is one power of two', () => {
    const zetas = Array.from({ length: 2000 }, (_, k) => {
      const theta = (0.001 * 50 ** (k / 1999)) / (Math.SQRT1_2 + 1 / (4 * Math.SQRT1_2));
      const scale = 1 + 2 * Math.SQRT1_2 * theta + theta ** 2;
      const power = (gain: number) => gainOf(gainWord({ gain, form: 'shift', mantissaBits: 2 }));
      const [g1, g2] = [power((4 * Math.SQRT1_2 * theta) / scale), power((4 * theta ** 2) / scale)];
      // Damping of the bilinear image: s1 s2 and s1 + s2 from the characteristic polynomial at z = ±1.
      return (2 * g1) / (4 * Math.sqrt(g2 * (1 - g1 / 2 - g2 / 4)));
    });
    expect(Math.min(...zetas)).toBeCloseTo(0.5, 2);
    expect(Math.max(...zetas)).toBeCloseTo(1.033, 2);
  });

  it('names a gain that is not finite', () => {
    const fault = expect.objectContaining({ parameter: 'gain' });
    expect(() => gainWord({ gain: NaN, form: 'shift', mantissaBits: 8 })).toThrow(fault);
  });
});
