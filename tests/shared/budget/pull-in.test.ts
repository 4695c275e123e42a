import { describe, expect, it } from 'vitest';
import { pullIn } from '../../../shared/budget/pull-in';
import { carrierDetector } from '../../../shared/detectors/carrier';
import { sCurveShape } from '../../../shared/detectors/detector';

const zeta = Math.SQRT1_2;
/** Gains of an analog loop of order 2 that is slow against its updates. */
const slow = (omegaN: number) => ({ g1: 2 * zeta * omegaN, g2: omegaN ** 2, updateInterval: 1, delay: 0 });
/** s = sin(Mx)/M. */
const sine = (symmetry: number): [powers: number[], period: number] => [
  [1 / (2 * symmetry ** 2)],
  (2 * Math.PI) / symmetry,
];
const shapeOf = (esN0: number): [powers: number[], period: number] => {
  const model = carrierDetector('sign', { modulation: 'QPSK', rollOff: 0.35, amplitude: 1, esN0 });
  return [sCurveShape(model).powers, model.period];
};

interface Lagging {
  g1: number;
  g2: number;
  updateInterval: number;
  delay: number;
}

/** Symbols until a loop on sin(Mx)/M, run symbol by symbol from its recursion, stays within half a period; null when it never does. */
function simulated({ g1, g2, updateInterval, delay }: Lagging, symmetry: number, offset: number, most: number) {
  const line = Array.from({ length: delay }, () => 0);
  let [phase, integral, word, sum, lastNull, changed] = [0.3, 0, 0, 0, 0, 0];
  for (let k = 0; k < most; k++) {
    sum += Math.sin(symmetry * phase) / symmetry;
    if ((k + 1) % updateInterval === 0) {
      line.push(sum / updateInterval);
      const error = line.shift()!;
      integral += (g2 * error) / updateInterval;
      word = (g1 * error) / updateInterval + integral;
      sum = 0;
    }
    phase += offset - word;
    const nearest = Math.round((phase * symmetry) / (2 * Math.PI));
    if (nearest !== lastNull) [lastNull, changed] = [nearest, k];
  }
  return changed < 0.8 * most ? changed : null;
}

describe('pullIn', () => {
  // Published (F. Gardner 2005): Δω²/(2ζωn³) for sin φ; for sin(4φ)/4 16 times that, for noiseless sign QPSK 2.75 times.
  it('takes the time of the books where nothing lags', () => {
    const [omegaN, offset] = [1e-4, 2e-3];
    const book = offset ** 2 / (2 * zeta * omegaN ** 3);
    const times = [sine(1), sine(4), shapeOf(1e6)].map(
      (shape) => pullIn(slow(omegaN), ...shape, offset).symbols! / book,
    );
    expect(times[0]).toBeCloseTo(1, 5);
    expect(times[1]).toBeCloseTo(16, 3);
    expect(times[2]).toBeCloseTo(2.75, 1);
  });

  // Outside simulation: sign QPSK at 10 dB, BnT 0.01, ΔfT 0.01 took 3580 symbols.
  it('comes near a simulation of a detector with noise', () => {
    const omegaN = (2 * 0.01) / (1.5 * zeta);
    const { symbols } = pullIn(slow(omegaN), ...shapeOf(10), 2 * Math.PI * 0.01);
    expect(Math.abs(symbols! / 3580 - 1)).toBeLessThan(0.1);
  });

  // By hand: the beat of a sine turns by a quarter on the way through the lag: Δω = π/(2M(½ + D)).
  it('drives the integrator away where the beat lags by a quarter', () => {
    expect(pullIn({ g1: 0.02, g2: 2e-4, updateInterval: 1, delay: 3 }, ...sine(2), 0).reach).toBeCloseTo(
      Math.PI / (4 * 3.5),
      9,
    );
    // U = 4, D = 2: λ = 3.5 + 8.
    expect(pullIn({ g1: 0.02, g2: 2e-4, updateInterval: 4, delay: 2 }, ...sine(4), 0).reach).toBeCloseTo(
      Math.PI / (8 * 11.5),
      9,
    );
  });

  // The loop's own recursion in this file; the estimate holds above six lock-in ranges within 15 %.
  it.each([
    [{ g1: 0.026, g2: 3.5e-4, updateInterval: 1, delay: 0 }, 2, 0.1],
    [{ g1: 0.026, g2: 3.5e-4, updateInterval: 1, delay: 3 }, 2, 0.1],
    [{ g1: 0.026, g2: 3.5e-4, updateInterval: 1, delay: 6 }, 2, 0.1],
    [{ g1: 0.05, g2: 1.2e-3, updateInterval: 4, delay: 0 }, 2, 0.08],
    [{ g1: 0.03, g2: 4e-4, updateInterval: 4, delay: 3 }, 4, 0.018],
  ])('takes the time that the recursion takes: %j, M %i', (loop, symmetry, offset) => {
    const estimate = pullIn(loop, ...sine(symmetry), offset);
    const took = simulated(loop, symmetry, offset, Math.ceil(5 * estimate.symbols!));
    expect(took! / estimate.symbols!).toBeGreaterThan(0.85);
    expect(took! / estimate.symbols!).toBeLessThan(1.15);
  });

  it('gives no time beyond the reach, and the recursion never locks there', () => {
    const loop = { g1: 0.026, g2: 3.5e-4, updateInterval: 1, delay: 3 };
    const { symbols, reach } = pullIn(loop, ...sine(2), 0.25);
    expect(reach).toBeLessThan(0.25);
    expect(symbols).toBeNull();
    expect(simulated(loop, 2, 0.25, 100_000)).toBeNull();
  });
});
