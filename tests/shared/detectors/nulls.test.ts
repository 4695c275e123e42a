import { describe, expect, it } from 'vitest';
import { carrierDetector, carrierDetectorsFor } from '../../../shared/detectors/carrier';
import { rotationalSymmetry } from '../../../shared/detectors/modulations';
import type { Modulation } from '../../../shared/detectors/modulations';
import { nullsOf } from '../../../shared/detectors/nulls';

const degrees = 180 / Math.PI;
const modelOf = (detector: 'decision' | 'sign', modulation: Modulation, decibels: number) =>
  carrierDetector(detector, { modulation, amplitude: 1, esN0: 10 ** (decibels / 10), rollOff: 0.35 });

describe('nullsOf', () => {
  // By hand: sin x + 2 sin 2x = sin x (1 + 4 cos x) is nought where cos x = −¼, at 104.48°, and falls there.
  it('finds the zeros of a sum of two sines', () => {
    const nulls = nullsOf({ noisy: (x) => Math.sin(x) + 2 * Math.sin(2 * x), period: 2 * Math.PI });
    expect(nulls.map(({ x }) => x * degrees)).toEqual([-104.4775, 0, 104.4775, 180].map((x) => expect.closeTo(x, 3)));
    expect(nulls.map(({ stable }) => stable)).toEqual([false, true, false, true]);
    expect(nulls.map(({ lock }) => lock)).toEqual([false, true, false, false]);
  });

  // Derived, with noise at 20 dB: false locks near ±31° (16QAM) and ±29° (16APSK); found by simulation, ±1°.
  it.each([
    ['16QAM', 31],
    ['16APSK', 29],
  ] as const)('finds the false locks of %s near ±%i°', (modulation, angle) => {
    const stable = nullsOf(modelOf('decision', modulation, 20)).filter((each) => each.stable);
    expect(stable).toHaveLength(3);
    expect(stable[1]).toMatchObject({ x: 0, lock: true });
    expect(Math.abs(stable[2]!.x * degrees - angle)).toBeLessThan(1);
  });

  it('leaves sign on QPSK its lock and what parts it from the next', () => {
    expect(nullsOf(modelOf('sign', 'QPSK', 10))).toEqual([
      { x: 0, stable: true, lock: true },
      { x: Math.PI / 4, stable: false, lock: false },
    ]);
  });

  // Between two stable nulls lies an unstable one, and the curve changes sign at each.
  it.each(Object.keys(rotationalSymmetry) as Modulation[])('alternates on %s', (modulation) => {
    for (const detector of carrierDetectorsFor(modulation)) {
      const model = carrierDetector(detector, { modulation, amplitude: 1, esN0: 10 ** 2.2, rollOff: 0.35 });
      const nulls = nullsOf(model);
      nulls.forEach(({ x, stable }, k) => {
        expect(stable).toBe(!nulls[(k + 1) % nulls.length]!.stable);
        const step = 1e-4 * model.period;
        expect(model.noisy(x + step) > 0).toBe(stable);
        expect(model.noisy(x - step) > 0).toBe(!stable);
      });
    }
  });
});
