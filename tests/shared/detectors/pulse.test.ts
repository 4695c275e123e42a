import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  pulseAutocorrelation,
  raisedCosine,
  raisedCosineSlope,
  raisedCosineSpectrum,
  sampledCorrelation,
} from '../../../shared/detectors/pulse';

const rollOffs = fc.double({ min: 0, max: 1, noNaN: true });
const times = fc.double({ min: -20, max: 20, noNaN: true });

/** The textbook form, which has no value where 2αt is 1 (J. Proakis, "Digital Communications"). */
const textbook = (t: number, rollOff: number): number =>
  ((Math.sin(Math.PI * t) / (Math.PI * t)) * Math.cos(Math.PI * rollOff * t)) / (1 - (2 * rollOff * t) ** 2);

/** ∫ of an even function over the band, by Simpson's rule on either side of the corners of the spectrum. */
function overBand(of: (f: number) => number, rollOff: number): number {
  const corner = (1 - rollOff) / 2;
  return 2 * (simpson(of, 0, corner) + simpson(of, corner, corner + rollOff));
}

function simpson(of: (f: number) => number, from: number, to: number): number {
  const count = 2000;
  let sum = of(from) + of(to);
  for (let i = 1; i < count; i += 1) sum += (i % 2 === 1 ? 4 : 2) * of(from + ((to - from) * i) / count);
  return (sum * (to - from)) / count / 3;
}

describe('raisedCosine', () => {
  it('is the textbook pulse, and its limit where that has none', () => {
    for (const rollOff of [0, 0.2, 0.35, 1]) {
      for (const t of [0.1, 0.77, 3.3, 11.9]) expect(raisedCosine(t, rollOff)).toBeCloseTo(textbook(t, rollOff), 13);
    }
    // By hand: at t = 1/(2α) the pulse is (π/4)·sinc(1/(2α)): α = 1 → ½, α = ¼ → 0.
    expect(raisedCosine(0.5, 1)).toBeCloseTo(0.5, 14);
    expect(raisedCosine(2, 0.25)).toBeCloseTo(0, 14);
    expect(raisedCosine(0, 0.35)).toBeCloseTo(1, 15);
  });

  it('vanishes at every whole symbol but 0, whatever the roll-off', () => {
    fc.assert(
      fc.property(rollOffs, fc.integer({ min: 1, max: 60 }), (rollOff, k) => {
        expect(Math.abs(raisedCosine(k, rollOff))).toBeLessThan(1e-14);
      }),
    );
  });
});

describe('raisedCosineSlope', () => {
  // K. Mueller, M. Müller 1976: 2|g′(1)| = 2 cos(πα)/(1 − 4α²); derived: 2|g′(½)|.
  it.each([
    [0.2, 1.92623, 2.57004],
    [0.35, 1.78035, 2.61711],
    [0.5, Math.PI / 2, 2.6859],
    [1, 0.66667, 3],
  ])('has the slopes of the detectors at roll-off %f', (rollOff, atOne, atHalf) => {
    expect(-2 * raisedCosineSlope(1, rollOff)).toBeCloseTo(atOne, 5);
    expect(-2 * raisedCosineSlope(0.5, rollOff)).toBeCloseTo(atHalf, 5);
  });

  it('is the slope of the pulse everywhere, close to its removable singularities too', () => {
    fc.assert(
      fc.property(rollOffs, fc.oneof(times, fc.constantFrom(0, 1e-9, 0.5, 1)), (rollOff, t) => {
        for (const at of [t, rollOff > 0.03 ? 1 / (2 * rollOff) + t * 1e-8 : t]) {
          const step = 1e-4;
          const [before, after] = [raisedCosine(at - step, rollOff), raisedCosine(at + step, rollOff)];
          expect(Math.abs(raisedCosineSlope(at, rollOff) - (after - before) / (2 * step))).toBeLessThan(1e-6);
        }
      }),
    );
  });
});

describe('raisedCosineSpectrum', () => {
  it('is the spectrum of the pulse', () => {
    for (const rollOff of [0.05, 0.35, 1]) {
      for (const t of [0, 0.3, 1.7]) {
        const back = overBand((f) => raisedCosineSpectrum(f, rollOff) * Math.cos(2 * Math.PI * f * t), rollOff);
        expect(back).toBeCloseTo(raisedCosine(t, rollOff), 9);
      }
    }
  });
});

describe('pulseAutocorrelation', () => {
  it('is the integral over the squared spectrum', () => {
    for (const rollOff of [0.05, 0.35, 1]) {
      for (const lag of [0, 0.5, 1, 2.6, 1 / rollOff]) {
        const integral = overBand(
          (f) => raisedCosineSpectrum(f, rollOff) ** 2 * Math.cos(2 * Math.PI * f * lag),
          rollOff,
        );
        expect(pulseAutocorrelation(lag, rollOff)).toBeCloseTo(integral, 9);
      }
    }
  });
});

describe('sampledCorrelation', () => {
  // Independent: the sum itself; what is beyond 4000 symbols is below 1e-9 at these roll-offs.
  it('is the sum over all symbols', () => {
    for (const rollOff of [0.2, 0.35, 1]) {
      for (const [t, lag] of [
        [0, 0],
        [0.5, 0],
        [0.5, 1],
        [-0.3, 0.5],
        [0.25, -2.5],
      ] as const) {
        let sum = 0;
        for (let j = -4000; j <= 4000; j += 1) sum += raisedCosine(t - j, rollOff) * raisedCosine(t + lag - j, rollOff);
        expect(sampledCorrelation(t, lag, rollOff)).toBeCloseTo(sum, 9);
      }
    }
  });
});
