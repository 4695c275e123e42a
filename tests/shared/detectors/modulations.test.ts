import { describe, expect, it } from 'vitest';
import { distinctPoints, pointsOf, ringRatiosOf, rotationalSymmetry } from '../../../shared/detectors/modulations';
import type { Modulation } from '../../../shared/detectors/modulations';
import { carrierWords } from '../../../shared/fixed-point/words';
import { workOut } from '../../../shared/design';
import { qpskLink } from '../fixed-point/link';
import { samplePlan } from '../sample-plan';

describe('ringRatiosOf', () => {
  // ETSI EN 302 307-1, code rate 3/4 (memory).
  it('takes those of a code rate where a plan has none', () => {
    expect(ringRatiosOf('16APSK')).toEqual([2.85]);
    expect(ringRatiosOf('32APSK')).toEqual([2.84, 5.27]);
    expect(ringRatiosOf('64QAM', [3])).toEqual([]);
  });

  it.each([
    ['16APSK', [2.84, 5.27], '16APSK takes one ring ratio, such as 2.85'],
    ['32APSK', [2.85], '32APSK takes 2 ring ratios, such as 2.84 and 5.27'],
    ['32APSK', [3, 3], 'the ring ratios must rise from above 1: each ring is outside the last'],
    ['16APSK', [1], 'the ring ratios must rise from above 1: each ring is outside the last'],
  ] as const)('refuses on %s %o', (modulation, ratios, message) => {
    const fault = expect.objectContaining({ parameter: '/signal/ringRatios', message });
    expect(() => ringRatiosOf(modulation, ratios)).toThrow(fault);
    const signal = { ...samplePlan().signal, modulation, ringRatios: [...ratios] };
    expect(() => workOut(samplePlan({ signal }))).toThrow(fault);
  });

  it('puts them into the words', () => {
    const signal = { ...qpskLink.signal, modulation: '32APSK' } as const;
    const words = (detector: 'decision' | 'known-symbols') =>
      carrierWords({ ...qpskLink, signal, carrier: { ...qpskLink.carrier, detector } });
    expect(words('decision').ringRatios).toEqual([2.84, 5.27]);
    expect(words('known-symbols').ringRatios).toEqual([2.84, 5.27]);
  });
});

describe('points', () => {
  it.each(Object.keys(rotationalSymmetry) as Modulation[])('of %s have unit power and their symmetry', (modulation) => {
    const points = pointsOf(modulation);
    expect(points.reduce((sum, [i, q]) => sum + i * i + q * q, 0) / points.length).toBeCloseTo(1, 12);
    if (modulation === 'OQPSK') return;
    const power = rotationalSymmetry[modulation];
    const distinct = distinctPoints(modulation);
    expect(distinct).toHaveLength(points.length / power);
    const turned = Array.from({ length: power }, (_, k) => (2 * Math.PI * k) / power).flatMap((angle) =>
      distinct.map(([i, q]) => [i * Math.cos(angle) - q * Math.sin(angle), i * Math.sin(angle) + q * Math.cos(angle)]),
    );
    for (const [i, q] of points) {
      expect(turned.filter((each) => Math.hypot(each[0]! - i, each[1]! - q) < 1e-9)).toHaveLength(1);
    }
  });
});
