import { describe, expect, it } from 'vitest';
import { secondOrderGains } from '../../../shared/loop/gains';
import { linearLoop } from '../../../shared/loop/linear-loop';
import { closedLoopShape, emptyResponse, marginCurve } from '../../../shared/loop/response-curves';
import { gainCrossings } from '../../../shared/loop/margins';
import { impulseResponse } from './brute-force';

const nominal = (bandwidth: number, delay: number, averaged = 1) =>
  linearLoop({
    gains: secondOrderGains({ damping: Math.SQRT1_2, theta: bandwidth / (1.5 * Math.SQRT1_2) }),
    delay,
    averaged,
  });

describe('closedLoopShape', () => {
  // Independent: Fourier sum of the impulse response.
  it('is |H| and |1 − H| of the impulse response', () => {
    const loop = nominal(0.01, 3);
    const h = impulseResponse(loop, 4000);
    const { response } = closedLoopShape(loop, 1e6);
    for (const i of [10, 50, 80, 104]) {
      const omega = 2 * Math.PI * response.frequency[i]!;
      const re = h.reduce((sum, value, n) => sum + value * Math.cos(n * omega), 0);
      const im = h.reduce((sum, value, n) => sum - value * Math.sin(n * omega), 0);
      expect(response.hDb[i]).toBeCloseTo(20 * Math.log10(Math.hypot(re, im)), 5);
      expect(response.eDb[i]).toBeCloseTo(20 * Math.log10(Math.hypot(1 - re, im)), 5);
      expect(response.frequencyHz[i]).toBeCloseTo(1e6 * response.frequency[i]!, 6);
    }
  });

  // Analog type 2 with ζ = 1/√2: |H|² = (1 + 2x)/(1 + x²), x = (ω/ωn)², is largest at x = (√5 − 1)/2, where it is the
  // golden ratio, and ½ at x = 2 + √5.
  it('has the peak and the 3 dB bandwidth of the analog loop when it is slow', () => {
    const shape = closedLoopShape(nominal(1e-4, 0), 1);
    const theta = 1e-4 / (1.5 * Math.SQRT1_2);
    expect(shape.bandwidth3Db! / ((2 * theta * Math.sqrt(2 + Math.sqrt(5))) / (2 * Math.PI))).toBeCloseTo(1, 3);
    expect(shape.peakingDb).toBeCloseTo(10 * Math.log10((1 + Math.sqrt(5)) / 2), 3);
  });

  it('keeps the frequencies of a loop that has no response', () => {
    const response = emptyResponse(nominal(0.05, 20), 1e6);
    expect(response.hDb.every((value) => value === null)).toBe(true);
    expect(response.frequency.at(-1)).toBe(0.5);
  });
});

describe('marginCurve', () => {
  // Derived: 64.7° at D = 0, unstable beyond 38 updates.
  it('falls with every update of delay and ends where the loop does', () => {
    const loop = nominal(0.01, 3);
    const { delay, phaseDeg } = marginCurve(loop, gainCrossings(loop));
    expect(delay).toHaveLength(65);
    expect(phaseDeg[0]).toBeCloseTo(64.7, 1);
    expect(phaseDeg[38]).toBeGreaterThan(0);
    expect(phaseDeg[39]).toBeNull();
  });
});
