import { describe, expect, it, vi } from 'vitest';
import { gaussianOf, upperTail } from '../../../shared/replay/gaussian';
import { TrialRandom } from '../../../shared/replay/random';

// Millions of draws take their time on a busy machine.
vi.setConfig({ testTimeout: 60_000 });

/** The word whose upper tail is nearest to a probability. */
const wordOf = (tail: number): number => (Math.round(tail * 2 ** 32 - 0.5) << 1) >>> 0;

describe('gaussianOf', () => {
  // Quantiles of the normal distribution (Abramowitz & Stegun, table 26.5).
  it.each([
    [0.25, 0.67448975],
    [0.1, 1.28155157],
    [0.025, 1.95996398],
    [0.001, 3.09023231],
    [0.0001, 3.71901649],
    [0.00001, 4.26489079],
  ])('has the upper tail %f at %f', (tail, quantile) => {
    expect(gaussianOf(wordOf(tail))).toBeCloseTo(quantile, 4);
    expect(gaussianOf(wordOf(tail) | 1)).toBe(-gaussianOf(wordOf(tail)));
  });

  it('falls without a jump from 6.34 σ to 0', () => {
    let last = gaussianOf(0);
    expect(last).toBeCloseTo(6.34, 2);
    for (let v = 1; v < 2 ** 31; v = Math.floor(v * 1.001) + 1) {
      const next = gaussianOf((v << 1) >>> 0);
      expect(next).toBeLessThan(last);
      last = next;
    }
    expect(gaussianOf(0xfffffffe)).toBeCloseTo(0, 8);
  });

  // P(X > x) for x = 1, 2, 3, 4: the standard table. Each count is binomial: within five deviations of its mean.
  it('has the right tails and moments over two million draws', () => {
    const random = new TrialRandom({ seed: 1, point: 2, trial: 3 });
    const draws = 2_000_000;
    const beyond = [0, 0, 0, 0];
    let [sum, squares, fourth] = [0, 0, 0];
    for (let n = 0; n < draws; n++) {
      const x = gaussianOf(random.word());
      sum += x;
      squares += x * x;
      fourth += x ** 4;
      for (let k = 0; k < 4 && Math.abs(x) > k + 1; k++) beyond[k]! += 1;
    }
    [0.3173105079, 0.0455002639, 0.0026997961, 0.0000633425].forEach((probability, k) => {
      const deviation = Math.sqrt(draws * probability * (1 - probability));
      expect(Math.abs(beyond[k]! - draws * probability)).toBeLessThan(5 * deviation);
    });
    expect(Math.abs(sum / draws)).toBeLessThan(5 / Math.sqrt(draws));
    expect(Math.abs(squares / draws - 1)).toBeLessThan(5 * Math.sqrt(2 / draws));
    expect(Math.abs(fourth / draws - 3)).toBeLessThan(5 * Math.sqrt(96 / draws));
  });
});

describe('upperTail', () => {
  // Abramowitz & Stegun, tables 26.1 and 26.2.
  it.each([
    [0, 0.5],
    [1, 0.15865525393],
    [2.5, 0.00620966533],
    [3, 0.00134989803],
    [5, 2.866515719e-7],
  ])('beyond %f is %f', (x, tail) => {
    expect(upperTail(x) / tail).toBeCloseTo(1, 8);
  });
});
