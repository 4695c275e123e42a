import { describe, expect, it } from 'vitest';
import { analogPoles } from '../../../shared/loop/analog-poles';
import { dominantDamping } from '../../../shared/loop/dominant-pair';
import { stageLoop } from '../../../shared/loop/stage-loop';
import type { WantedLoop } from '../../../shared/loop/stage-loop';

const loop = {
  order: 2,
  delay: 0,
  updateInterval: 1,
  method: 'nominal',
  prewarp: false,
  thirdOrder: { a3: 1.1, b3: 2.4 },
} as const;
const wanted = (stage: object, changes: object = {}): WantedLoop => ({
  pointer: '/carrier/stages/1',
  stage: { name: 'track', ...stage },
  loop: { ...loop, ...changes },
  symbolRateBd: 1e6,
});

describe('stageLoop', () => {
  it('takes the bandwidth per symbol and the gains per update', () => {
    const { gains } = stageLoop(wanted({ noiseBandwidth: 0.0025 }, { updateInterval: 4 })).loop;
    expect(gains.g1).toBeCloseTo(300 / 11401, 14);
  });

  // ωn = 2·BnT/(ζ + 1/(4ζ))/T: 0.01 at 1 MBd and ζ = 1/√2 is 18 856 rad/s = 3001 Hz.
  it('takes a natural frequency instead', () => {
    const hertz = (0.02 / (1.5 * Math.SQRT1_2) / (2 * Math.PI)) * 1e6;
    const { gains } = stageLoop(wanted({ naturalFrequencyHz: hertz })).loop;
    expect(gains.g2).toBeCloseTo(4 / 11401, 14);
  });

  it('pre-warps at the natural frequency', () => {
    const { loop: warped, theta } = stageLoop(wanted({ naturalFrequencyHz: 50_000, damping: 1 }, { prewarp: true }));
    expect(theta).toBeCloseTo(Math.tan(Math.PI * 0.05), 12);
    expect(2 * Math.atan(dominantDamping(warped)!.theta)).toBeCloseTo(2 * Math.PI * 0.05, 12);
  });

  it('keeps a natural frequency with its delay when that is asked exactly', () => {
    const solved = stageLoop(wanted({ naturalFrequencyHz: 3000, damping: 0.6 }, { method: 'exact', delay: 10 }));
    const pair = dominantDamping(solved.loop)!;
    expect(pair.damping).toBeCloseTo(0.6, 9);
    expect((pair.theta * 1e6) / Math.PI).toBeCloseTo(3000, 5);
  });

  it.each([
    [
      { noiseBandwidth: 0.1 },
      { method: 'exact', delay: 6 },
      'noiseBandwidth',
      /^the widest BnT that this delay allows is 0.061/,
    ],
    [
      { naturalFrequencyHz: 1e5 },
      { method: 'exact', delay: 6 },
      'naturalFrequencyHz',
      /^the highest natural frequency/,
    ],
    [{ noiseBandwidth: 0.01, damping: 1 }, { order: 3 }, 'damping', /^a loop of order 3 takes no damping factor$/],
    [{ noiseBandwidth: 1e-9 }, {}, 'noiseBandwidth', /must lie between 1e-7 and 0.5$/],
    [{ noiseBandwidth: 0.4 }, { updateInterval: 2 }, 'noiseBandwidth', /must lie between 5e-8 and 0.25$/],
    [{ naturalFrequencyHz: 1e6 }, {}, 'naturalFrequencyHz', /must lie between .* Hz$/],
    [
      { naturalFrequencyHz: 5e5, damping: 0.5 },
      { prewarp: true },
      'naturalFrequencyHz',
      /between|half the update rate/,
    ],
  ])('refuses %o of %o at %s', (stage, changes, key, message) => {
    const solve = (): unknown => stageLoop(wanted(stage, changes));
    expect(solve).toThrow(expect.objectContaining({ parameter: `/carrier/stages/1/${key}` }));
    expect(solve).toThrow(message);
  });

  it('solves again at the bandwidth that it named as the widest', () => {
    const { loop: reached } = stageLoop(wanted({ noiseBandwidth: 0.06 }, { method: 'exact', delay: 6 }));
    expect(dominantDamping(reached)!.damping).toBeCloseTo(Math.SQRT1_2, 9);
  });
});

describe('analogPoles', () => {
  it.each([
    [0.5, [-5, 8.660254]],
    [2, [-2.679492, 0]],
  ])('are those of the quadratic at ζ = %f', (damping, [re, im]) => {
    const [pole] = analogPoles({ order: 2, damping, omega: 10 });
    expect(pole![0]).toBeCloseTo(re!, 6);
    expect(pole![1]).toBeCloseTo(im!, 6);
  });

  it('are −K for order 1', () => {
    expect(analogPoles({ order: 1, damping: 1, omega: 3 })).toEqual([[-3, 0]]);
  });

  // Vieta: the three roots of s³ + 2.4s² + 1.1s + 1 add up to −2.4 and multiply to −1.
  it('are the roots of the form of order 3', () => {
    const poles = analogPoles({ order: 3, damping: 1, omega: 1 });
    expect(poles.reduce((sum, [re]) => sum + re, 0)).toBeCloseTo(-2.4, 10);
    const [pair, , real] = poles as [[number, number], [number, number], [number, number]];
    expect((pair[0] ** 2 + pair[1] ** 2) * real[0]).toBeCloseTo(-1, 10);
  });
});
