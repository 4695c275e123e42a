import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { analogPoles } from '../../../shared/loop/analog-poles';
import { thirdOrderGains } from '../../../shared/loop/gains';
import { linearLoop } from '../../../shared/loop/linear-loop';
import { noiseBandwidth } from '../../../shared/loop/noise-bandwidth';
import { stageLoop } from '../../../shared/loop/stage-loop';
import { thirdOrderBandwidth } from '../../../shared/loop/third-order-form';

const wanted = (
  thirdOrder: { a3: number; b3: number },
  noiseBandwidth: number,
  method: 'nominal' | 'exact' = 'nominal',
) => ({
  pointer: '/carrier/stages/0',
  stage: { name: 'track', noiseBandwidth },
  loop: { order: 3, delay: 2, updateInterval: 1, method, prewarp: false, thirdOrder } as const,
  symbolRateBd: 1e6,
});

describe('thirdOrderBandwidth', () => {
  it('keeps the digits of the published table for its pair', () => {
    expect(thirdOrderBandwidth({ a3: 1.1, b3: 2.4 })).toBe(0.7845);
  });

  // Independent: ∫ |H(jω)|² dω/2π over ω ≥ 0, H = (b3·s² + a3·s + 1)/(s³ + b3·s² + a3·s + 1), by the midpoint rule in ω = tan x.
  it.each([
    [2, 2],
    [1.1, 2.5],
    [0.6, 4],
  ])('is the integral of the analog response for a3 = %f, b3 = %f', (a3, b3) => {
    const points = 200_000;
    let sum = 0;
    for (let i = 0; i < points; i += 1) {
      const x = ((i + 0.5) / points) * (Math.PI / 2);
      const w = Math.tan(x);
      const above = (1 - b3 * w * w) ** 2 + (a3 * w) ** 2;
      const below = (1 - b3 * w * w) ** 2 + (a3 * w - w ** 3) ** 2;
      sum += (above / below) * (1 + w * w);
    }
    expect((sum * (Math.PI / 2 / points)) / (2 * Math.PI)).toBeCloseTo(thirdOrderBandwidth({ a3, b3 }), 4);
  });

  it('is the bandwidth of a slow discrete loop with that form', () => {
    const form = { a3: 2, b3: 2 };
    const loop = linearLoop({ gains: thirdOrderGains(5e-5, form), delay: 0, averaged: 1 });
    expect(noiseBandwidth(loop)! / 1e-4 / thirdOrderBandwidth(form)).toBeCloseTo(1, 3);
  });
});

describe('a stage with a form of its own', () => {
  // Vieta on s³ + 3s² + 3s + 1, the triple pole at −1 that a3 = b3 = 3 means.
  it('has the poles of its form', () => {
    const poles = analogPoles({ order: 3, damping: 1, omega: 2, form: { a3: 3, b3: 3 } });
    expect(poles.reduce((sum, [re]) => sum + re, 0)).toBeCloseTo(-6, 4);
    for (const [re] of poles) expect(re).toBeCloseTo(-2, 3);
  });

  it('keeps an exact bandwidth', () => {
    const { loop } = stageLoop(wanted({ a3: 1.5, b3: 2 }, 0.01, 'exact'));
    expect(noiseBandwidth(loop)).toBeCloseTo(0.01, 11);
  });

  it('is refused where the analog loop is not stable', () => {
    const make = () => stageLoop(wanted({ a3: 0.5, b3: 2 }, 0.01));
    expect(make).toThrow(expect.objectContaining({ parameter: '/carrier/thirdOrder/a3' }));
  });

  // Derived: q² + a3³ is above 0, so θ stays below a3.
  it('has gains above 0 for any stable form, pre-warped or not', () => {
    const coefficient = fc.double({ min: 0.05, max: 20, noNaN: true });
    fc.assert(
      fc.property(coefficient, coefficient, fc.boolean(), (a3, b3, prewarp) => {
        fc.pre(a3 * b3 > 1.000001);
        const { loop, ...rest } = wanted({ a3, b3 }, 0.5);
        const { gains } = stageLoop({ ...rest, loop: { ...loop, prewarp } }).loop;
        expect(Math.min(gains.g1, gains.g2, gains.g3)).toBeGreaterThan(0);
      }),
      { seed: 20261201 },
    );
  });
});
