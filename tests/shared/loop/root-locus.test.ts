import { create, all } from 'mathjs';
import { describe, expect, it } from 'vitest';
import { nominalGains } from '../../../shared/loop/gains';
import { linearLoop } from '../../../shared/loop/linear-loop';
import type { LinearLoop } from '../../../shared/loop/linear-loop';
import { stabilityLimits } from '../../../shared/loop/margins';
import { closedLoopPoles } from '../../../shared/loop/poles';
import { rootLocus } from '../../../shared/loop/root-locus';

const math = create(all!, {});
const loopOf = (order: number, bandwidth: number, delay: number): LinearLoop =>
  linearLoop({ gains: nominalGains(order, { damping: 0.8, theta: bandwidth }), delay, averaged: 1 });
const locusOf = (loop: LinearLoop) => rootLocus(loop, closedLoopPoles(loop), stabilityLimits(loop).criticalRatios);

describe('rootLocus', () => {
  // Independent: z·(z − 1)² + r·((g1 + g2)·z − g1) at D = 1, roots by mathjs.
  it('holds the roots of the closed-loop polynomial at every ratio', () => {
    const loop = loopOf(2, 0.02, 1);
    const { ratio, poles } = locusOf(loop);
    const { g1, g2 } = loop.gains;
    ratio.forEach((r, i) => {
      const expected = math.polynomialRoot(-r * g1, 1 + r * (g1 + g2), -2, 1);
      for (const [re, im] of poles[i] as [number, number][]) {
        const nearest = Math.min(
          ...expected.map((root) => Number(math.abs(math.subtract(root, math.complex(re, im))))),
        );
        expect(nearest).toBeLessThan(1e-7);
      }
      expect(poles[i]!.reduce((sum, pole) => sum + pole[0]!, 0)).toBeCloseTo(2, 7);
    });
  });

  it('has ratio 1, rises, goes beyond the ratio at which the loop turns unstable, and keeps its branches', () => {
    const loop = loopOf(2, 0.02, 10);
    const { ratio, poles, critical } = locusOf(loop);
    expect(ratio).toContain(1);
    expect([...ratio].sort((a, b) => a - b)).toEqual(ratio);
    expect(ratio.at(-1)).toBeGreaterThan(critical[0]!);
    expect(new Set(poles.map((row) => row.length)).size).toBe(1);
    const own = ratio.indexOf(1);
    closedLoopPoles(loop)
      .slice(0, poles[own]!.length)
      .forEach(([re, im], branch) => {
        expect(poles[own]![branch]![0]).toBeCloseTo(re, 8);
        expect(poles[own]![branch]![1]).toBeCloseTo(im, 8);
      });
    // One step of the gain never carries a branch further than across a part of the circle.
    for (let i = 1; i < poles.length; i += 1) {
      (poles[i] as [number, number][]).forEach(([re, im], branch) => {
        const [beforeRe, beforeIm] = poles[i - 1]![branch] as [number, number];
        expect(Math.hypot(re - beforeRe, im - beforeIm)).toBeLessThan(0.35);
      });
    }
  });

  // Stability by the poles themselves: at a critical ratio one of them is on the circle.
  it.each([
    [2, 0.02, 4],
    [3, 0.01, 2],
    [1, 0.05, 6],
  ])('names the ratios that put a pole on the circle: order %i, θ %f, delay %i', (order, theta, delay) => {
    const loop = loopOf(order, theta, delay);
    const { critical } = locusOf(loop);
    expect(critical.length).toBeGreaterThan(0);
    for (const ratio of critical) {
      const { g1, g2, g3 } = loop.gains;
      const poles = closedLoopPoles({ ...loop, gains: { g1: ratio * g1, g2: ratio * g2, g3: ratio * g3 } });
      expect(Math.min(...poles.map((pole) => Math.abs(Math.hypot(...pole) - 1)))).toBeLessThan(1e-8);
    }
  });

  it('is empty for a loop without gain', () => {
    const loop = linearLoop({ gains: { g1: 0, g2: 0, g3: 0 }, delay: 3, averaged: 1 });
    expect(rootLocus(loop, [], [])).toEqual({ ratio: [], poles: [], critical: [] });
  });
});
