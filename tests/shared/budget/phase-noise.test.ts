import { describe, expect, it } from 'vitest';
import { oscillatorVariance, phaseNoiseDensity, phaseNoiseGrid } from '../../../shared/budget/phase-noise';
import { nominalGains, secondOrderGains } from '../../../shared/loop/gains';
import { linearLoop } from '../../../shared/loop/linear-loop';
import { broadcastMask } from '../sample-plan';

const nominal = (bandwidth: number, delay = 0) =>
  linearLoop({
    gains: secondOrderGains({ damping: Math.SQRT1_2, theta: bandwidth / (1.5 * Math.SQRT1_2) }),
    delay,
    averaged: 1,
  });

const degreesRms = (variance: number | null): number => (180 / Math.PI) * Math.sqrt(variance as number);

describe('phaseNoiseDensity', () => {
  it('is 2·10^(L/10), straight between points over log f', () => {
    expect(phaseNoiseDensity(broadcastMask, 1e3)).toBeCloseTo(2e-5, 12);
    expect(10 * Math.log10(phaseNoiseDensity(broadcastMask, Math.sqrt(1e3 * 1e4)) / 2)).toBeCloseTo(-61.5, 9);
  });

  it('rises by 30 dB a decade below the table and is flat above it', () => {
    expect(10 * Math.log10(phaseNoiseDensity(broadcastMask, 10) / 2)).toBeCloseTo(5, 9);
    expect(10 * Math.log10(phaseNoiseDensity(broadcastMask, 1e9) / 2)).toBeCloseTo(-114, 9);
  });
});

describe('oscillatorVariance', () => {
  // The mask through ζ = 1/√2 at 20 MBd (ETSI EN 302 307-1 annex, memory; values derived), ±1 %.
  it.each([
    [0.001, 2.79],
    [0.002, 2.06],
    [0.005, 1.54],
    [0.01, 1.33],
  ])('leaves BnT = %f a jitter of %f°', (bandwidth, degrees) => {
    const loop = nominal(bandwidth);
    const grid = phaseNoiseGrid(broadcastMask, loop, 1e-3, 20e6);
    expect(Math.abs(degreesRms(oscillatorVariance(loop, grid)) / degrees - 1)).toBeLessThan(0.01);
  });

  // Derived: S = Δν/(π f²), a random walk of line width Δν, leaves 2πΔνT · 2/(g1·(4 − 2g1 − g2)).
  it('matches the closed form of random-walk phase noise', () => {
    const loop = nominal(0.02);
    const { g1, g2 } = loop.gains;
    const [lineWidth, rate] = [100, 1e6];
    const level = (f: number): number => 10 * Math.log10(lineWidth / (Math.PI * f * f) / 2);
    const table = [1e-3, 1, 1e3, 1e6].map((f): [number, number] => [f, level(f)]);
    const grid = phaseNoiseGrid(table, loop, 1e-2, rate);
    const closed = ((2 * Math.PI * lineWidth) / rate) * (2 / (g1 * (4 - 2 * g1 - g2)));
    // The walk of the closed form is sampled: its aliases add a little that a density up to half the rate has not.
    expect(Math.abs((oscillatorVariance(loop, grid) as number) / closed - 1)).toBeLessThan(0.03);
  });

  /** ∫ S·|E|² df by the midpoint rule over ln f, so fine that a kink does not matter; E from its own complex arithmetic. */
  function brute(
    table: [number, number][],
    { g1, g2, delay }: { g1: number; g2: number; delay: number },
    rate: number,
  ) {
    const level = (f: number): number => {
      if (f <= table[0]![0]) return table[0]![1] - 30 * Math.log10(f / table[0]![0]);
      const above = table.findIndex(([offset]) => offset >= f);
      if (above < 0) return table.at(-1)![1];
      const [[f0, l0], [f1, l1]] = [table[above - 1]!, table[above]!];
      return l0 + ((l1 - l0) * Math.log10(f / f0)) / Math.log10(f1 / f0);
    };
    const [low, steps] = [1e-12, 400_000];
    const step = Math.log(0.5 / low) / steps;
    let sum = 0;
    for (let i = 0; i < steps; i += 1) {
      const nu = low * Math.exp((i + 0.5) * step);
      const omega = 2 * Math.PI * nu;
      // 1 − z⁻¹ = 2j·sin(ω/2)·e^(−jω/2); L = z^−(1+D)·(g1 + g2/(1 − z⁻¹))/(1 − z⁻¹).
      const chord = 2 * Math.sin(omega / 2);
      const inverse = { re: 0.5, im: -Math.cos(omega / 2) / chord };
      const filter = { re: g1 + g2 * inverse.re, im: g2 * inverse.im };
      const product = {
        re: filter.re * inverse.re - filter.im * inverse.im,
        im: filter.re * inverse.im + filter.im * inverse.re,
      };
      const [cos, sin] = [Math.cos((1 + delay) * omega), Math.sin((1 + delay) * omega)];
      const open = { re: product.re * cos + product.im * sin, im: product.im * cos - product.re * sin };
      sum += (2 * 10 ** (level(nu * rate) / 10) * nu * rate * step) / ((1 + open.re) ** 2 + open.im ** 2);
    }
    return sum;
  }

  const comb = Array.from({ length: 64 }, (_, i): [number, number] => [1e3 * 1.15 ** i, i % 2 ? -160 : -60]);
  // An independent quadrature in this file, to 0.1 %: twice as close as asked of a table that nobody has, and more.
  it.each<[string, [number, number][], number, number]>([
    ['the broadcast mask', broadcastMask, 0.005, 0],
    ['a delay', broadcastMask, 0.01, 10],
    ['a long delay', broadcastMask, 0.004, 40],
    [
      'cliffs',
      [
        [1e3, -40],
        [1.1e3, -120],
        [2e5, -120],
        [2.02e5, -90],
        [1e7, -140],
      ],
      0.005,
      0,
    ],
    ['64 points up and down', comb, 0.02, 2],
    [
      'a spike',
      [
        [1e2, -70],
        [3e4, -110],
        [3.03e4, -30],
        [3.06e4, -110],
        [1e7, -130],
      ],
      0.001,
      0,
    ],
    [
      'offsets above the update rate',
      [
        [5e7, -90],
        [1e9, -150],
      ],
      0.005,
      0,
    ],
    [
      'offsets below every loop',
      [
        [1e-4, 40],
        [1, -150],
      ],
      0.005,
      0,
    ],
    [
      'a fall of 200 dB below the loop',
      [
        [10, 50],
        [1e3, -150],
        [1e6, -150],
      ],
      0.0001,
      0,
    ],
    ['a slow loop', broadcastMask, 1e-6, 0],
  ])('agrees with a fine quadrature: %s', (_name, table, bandwidth, delay) => {
    const loop = nominal(bandwidth, delay);
    const grid = phaseNoiseGrid(table, loop, bandwidth, 20e6);
    const exact = brute(table, { ...loop.gains, delay }, 20e6);
    expect(Math.abs((oscillatorVariance(loop, grid) as number) / exact - 1)).toBeLessThan(1e-3);
  });

  it('is as good on a loop of little damping', () => {
    const gains = secondOrderGains({ damping: 0.25, theta: 0.005 });
    const loop = linearLoop({ gains, delay: 0, averaged: 1 });
    const variance = oscillatorVariance(loop, phaseNoiseGrid(broadcastMask, loop, 1e-3, 20e6)) as number;
    expect(Math.abs(variance / brute(broadcastMask, { ...gains, delay: 0 }, 20e6) - 1)).toBeLessThan(2e-3);
  });

  // Offsets one rounding apart, and one at the foot of what a number can hold: the quadrature ends, and sees no more there
  // than the table without them.
  it.each<[string, [number, number][]]>([
    [
      'neighbours',
      [
        [1e4, -40],
        [1e4 * (1 + 2 ** -52), -120],
        [1e7, -120],
      ],
    ],
    [
      'the least number',
      [
        [5e-324, 50],
        [1e4, -40],
        [1e4 * (1 + 1e-13), -120],
        [1e7, -120],
      ],
    ],
  ])('takes a table of the strangest offsets: %s', (_name, table) => {
    const loop = nominal(0.005);
    const variance = oscillatorVariance(loop, phaseNoiseGrid(table, loop, 1e-6, 20e6)) as number;
    expect(Number.isFinite(variance)).toBe(true);
    expect(variance).toBeGreaterThan(0);
  });

  it('has no finite value for order 1', () => {
    const loop = linearLoop({ gains: nominalGains(1, { damping: 1, theta: 0.01 }), delay: 0, averaged: 1 });
    expect(oscillatorVariance(loop, phaseNoiseGrid(broadcastMask, loop, 1e-3, 1e6))).toBeNull();
  });
});

describe('offsets that all but coincide', () => {
  // By definition a table stays the table of its outer points where two inner ones move together.
  it('are one step, not panels without end', () => {
    const loop = nominal(0.01);
    const flat = (step: number): [number, number][] => [
      [1, -60],
      [1e3, -90],
      [1e3 * (1 + step), -95],
      [1e6, -95],
    ];
    const variance = (step: number): number => {
      const grid = phaseNoiseGrid(flat(step), loop, 1e-2, 1e6);
      expect(grid.weights.length).toBeLessThan(2000);
      return oscillatorVariance(loop, grid)!;
    };
    const wide = variance(1e-6);
    for (const step of [1e-9, 1e-12, 3e-16]) expect(Math.abs(variance(step) / wide - 1)).toBeLessThan(1e-5);
  });
});
