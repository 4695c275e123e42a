import { describe, expect, it } from 'vitest';
import { TrialRandom } from '../../../shared/replay/random';
import { symbolSource } from '../../../shared/replay/source';

const draws = 200_000;

function counts(modulation: string, ringRatios?: number[]): { shares: number[]; radii: number[] } {
  const source = symbolSource(modulation, ringRatios);
  const indices = new Uint8Array(draws);
  source.draw(new TrialRandom({ seed: 4, point: 0, trial: 0 }), draws, indices);
  const shares = source.points.map((_, index) => indices.filter((drawn) => drawn === index).length / draws);
  return { shares, radii: source.points.map(([i, q]) => Math.hypot(i, q)) };
}

describe('symbolSource', () => {
  // By definition each of 2^b points is equally likely; 200 000 draws leave a share uncertain by 3 % at most.
  it.each([
    ['bpsk', 2, undefined],
    ['64qam', 64, undefined],
    ['16apsk', 16, [2.85]],
    ['32apsk', 32, [2.84, 5.27]],
  ])('draws every point of %s alike', (modulation, count, ringRatios) => {
    const { shares } = counts(modulation, ringRatios);
    expect(shares).toHaveLength(count);
    for (const share of shares) expect(Math.abs(share * count - 1)).toBeLessThan(0.1);
  });

  // Rings of 4, 12 and 16 points (ETSI EN 302 307-1); the inner radius follows from E|a|² = 1.
  it('puts the rings of APSK where the words have them', () => {
    const { radii } = counts('32apsk', [2.84, 5.27]);
    const inner = Math.sqrt(32 / (4 + 12 * 2.84 ** 2 + 16 * 5.27 ** 2));
    expect(radii[0]).toBeCloseTo(inner, 9);
    expect(radii[4]).toBeCloseTo(2.84 * inner, 9);
    expect(radii[31]).toBeCloseTo(5.27 * inner, 9);
  });
});
