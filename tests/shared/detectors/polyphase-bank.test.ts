import { lusolve } from 'mathjs';
import { describe, expect, it } from 'vitest';
import { interpolatorError } from '../../../shared/detectors/interpolator-error';
import { polyphaseBank } from '../../../shared/detectors/polyphase-bank';
import { raisedCosineSpectrum } from '../../../shared/detectors/pulse';

const places = [-1, 0, 1, 2];

/** ∫ G²(fN) cos 2πfτ df by the trapezoidal rule, τ in samples, over 20 000 points. */
function correlation(samples: number, rollOff: number, samplesPerSymbol: number): number {
  const count = 20_000;
  let sum = 0;
  for (let i = 0; i <= count; i += 1) {
    const f = ((1 + rollOff) / 2) * (i / count);
    const term = raisedCosineSpectrum(f, rollOff) ** 2 * Math.cos((2 * Math.PI * f * samples) / samplesPerSymbol);
    sum += i === 0 || i === count ? term / 2 : term;
  }
  return sum / count;
}

describe('polyphaseBank', () => {
  // Independent: normal equations from a numerical integral, solved by mathjs.
  it.each([
    [0.35, 2],
    [0.2, 3],
    [1, 2.5],
  ])('solves the normal equations at roll-off %f, %f samples per symbol', (rollOff, samplesPerSymbol) => {
    const r = (samples: number): number => correlation(samples, rollOff, samplesPerSymbol);
    const matrix = places.map((n) => places.map((m) => r(n - m)));
    const bank = polyphaseBank({ rollOff, samplesPerSymbol, fractions: 8 });
    for (const k of [1, 4, 7]) {
      const expected = lusolve(
        matrix,
        places.map((n) => r(n - k / 8)),
      ) as number[][];
      bank[k]!.forEach((tap, i) => expect(tap).toBeCloseTo(expected[i]![0]!, 5));
    }
  });

  it('passes a sample on where the fraction is 0, and turns round at ½', () => {
    const bank = polyphaseBank({ rollOff: 0.35, samplesPerSymbol: 2, fractions: 16 });
    bank[0]!.forEach((tap, i) => expect(tap).toBeCloseTo(i === 1 ? 1 : 0, 12));
    for (const k of [1, 5, 8]) {
      bank[k]!.forEach((tap, i) => expect(tap).toBeCloseTo(bank[16 - k]![3 - i]!, 11));
    }
  });

  // Least squares over the signal's own spectrum: no other four taps leave less, so none of the polynomials does.
  it.each([2, 2.5, 4, 16])('leaves less error than any polynomial at %f samples per symbol', (samplesPerSymbol) => {
    const [bank, ...others] = (['polyphase', 'linear', 'parabolic', 'cubic'] as const).map(
      (interpolator) =>
        interpolatorError({ interpolator, rollOff: 0.35, samplesPerSymbol, fractionBits: 8, tableBits: 16 })
          .signalOverErrorDb,
    );
    for (const other of others) expect(bank!).toBeGreaterThan(other);
  });

  // Published: as the band shrinks, least squares goes over into Lagrange's interpolation (Laakso et al. 1996).
  it('comes to Lagrange’s taps at many samples per symbol', () => {
    const bank = polyphaseBank({ rollOff: 0.35, samplesPerSymbol: 64, fractions: 2 });
    [-1 / 16, 9 / 16, 9 / 16, -1 / 16].forEach((tap, i) => expect(Math.abs(bank[1]![i]! - tap)).toBeLessThan(2e-4));
  });
});
