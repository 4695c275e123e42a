import { describe, expect, it } from 'vitest';
import { pullOutOverOmega } from '../../../shared/budget/pull-out';

const cells = 60;
const half = (curve: (x: number) => number, end: number): number[] =>
  Array.from({ length: cells + 1 }, (_, i) => (i === cells ? 0 : curve((end * i) / cells)));

/** Largest step that a loop of order 2 follows without crossing its unstable null, by running it and halving. */
function simulated(curve: (x: number) => number, end: number, damping: number): number {
  const stays = (offset: number): boolean => {
    let [phase, rate] = [0, offset];
    for (let time = 0; time < 60; time += 1e-3) {
      const s = curve(phase);
      phase += 1e-3 * (rate - 2 * damping * s);
      rate -= 1e-3 * s;
      if (phase > end) return false;
    }
    return true;
  };
  let [low, high] = [0, 20];
  for (let round = 0; round < 16; round += 1) {
    const middle = (low + high) / 2;
    if (stays(middle)) low = middle;
    else high = middle;
  }
  return low;
}

describe('pullOutOverOmega', () => {
  // F. Gardner 2005: 1.8·(ζ + 1) for sin φ, good to 2 %.
  it.each([0.5, Math.SQRT1_2, 1, 2])('is 1.8·(ζ + 1) for a sinusoid, ζ = %f', (damping) => {
    const value = pullOutOverOmega(half(Math.sin, Math.PI), Math.PI / cells, damping);
    expect(Math.abs(value / (1.8 * (damping + 1)) - 1)).toBeLessThan(0.02);
  });

  // Derived: 1.62 for the S-curve of sign on QPSK without noise, sin φ up to π/4, at ζ = 1/√2.
  it('is 1.62 for a curve that breaks off at π/4', () => {
    const value = pullOutOverOmega(half(Math.sin, Math.PI / 4), Math.PI / 4 / cells, Math.SQRT1_2);
    expect(Math.abs(value / 1.62 - 1)).toBeLessThan(0.02);
  });

  it('goes with 1/M', () => {
    const curve = (x: number): number => Math.sin(4 * x) / 4;
    const value = pullOutOverOmega(half(curve, Math.PI / 4), Math.PI / 4 / cells, 1);
    expect(Math.abs(value / ((1.8 * 2) / 4) - 1)).toBeLessThan(0.02);
  });

  // The loop's own differential equation, run in this file.
  it.each([0.3, 1, 3])('is the step at which the loop leaves a null inside the period, ζ = %f', (damping) => {
    const curve = (x: number): number => Math.sin(x) + 0.9 * Math.sin(2 * x);
    const end = Math.acos(-1 / 1.8);
    const value = pullOutOverOmega(half(curve, Math.PI), Math.PI / cells, damping);
    expect(Math.abs(value / simulated(curve, end, damping) - 1)).toBeLessThan(0.02);
  });
});
