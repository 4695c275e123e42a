import { describe, expect, it } from 'vitest';
import { tableVariance, truncationVariance, worstSpurDbc } from '../../../shared/budget/nco';
import { rotatorTable, wholeCircle } from '../../../shared/fixed-point/rotator-table';

const words = (widthBits: number, phaseBits: number, tableBits = 24) => ({ tableBits, nco: { widthBits, phaseBits } });

/** Largest line but the carrier's, dBc, of e^jφ with the phase of a word cut to P bits, over one whole period. */
function largestSpur(widthBits: number, phaseBits: number, word: number): number {
  const period = 2 ** widthBits;
  const phases = Array.from({ length: period }, (_, k) => {
    const phase = (k * word) % period;
    return ((phase >> (widthBits - phaseBits)) * 2 * Math.PI) / 2 ** phaseBits - (2 * Math.PI * phase) / period;
  });
  // Turned back by the wanted phase, the carrier stands at line 0.
  const lines = Array.from({ length: period }, (_, line) => {
    let [re, im] = [0, 0];
    phases.forEach((error, k) => {
      const angle = error - (2 * Math.PI * line * k) / period;
      re += Math.cos(angle);
      im += Math.sin(angle);
    });
    return Math.hypot(re, im) / period;
  });
  return 20 * Math.log10(Math.max(...lines.slice(1)) / lines[0]!);
}

describe('worstSpurDbc', () => {
  // Published: −6.0206·P + 3.92 with one discarded bit in use, −6.0206·P with four or more; P = 8: −44.2, −48.1.
  it('is −44.2 and −48.1 dBc at eight bits', () => {
    expect(worstSpurDbc(words(9, 8))).toBeCloseTo(-44.2, 1);
    expect(worstSpurDbc(words(12, 8))).toBeCloseTo(-48.1, 1);
    expect(worstSpurDbc(words(32, 8))).toBeCloseTo(-48.13, 2);
  });

  // The transform of the truncated phase itself, summed out in this file.
  it.each([1, 2, 3, 4])('is the largest line of the truncated phase, %i discarded bits', (discarded) => {
    const spurs = [1, 3, 5].map((word) => largestSpur(6 + discarded, 6, word));
    expect(Math.abs(worstSpurDbc(words(6 + discarded, 6))! - Math.max(...spurs))).toBeLessThan(1e-6);
  });

  it('has none where nothing is discarded', () => {
    expect(worstSpurDbc(words(12, 12))).toBeNull();
    expect(truncationVariance(words(12, 12))).toBe(0);
  });
});

describe('truncationVariance', () => {
  // Published: total truncation noise −(6.0206·P − 5.17) dBc.
  it('is the published noise', () => {
    expect(10 * Math.log10(truncationVariance(words(32, 10)))).toBeCloseTo(-(60.206 - 5.17), 2);
  });

  // Every phase of a short accumulator, in this file.
  it.each([1, 2, 5])('is the variance over all phases, %i discarded bits', (discarded) => {
    const errors = Array.from({ length: 2 ** discarded }, (_, i) => (2 * Math.PI * i) / 2 ** (8 + discarded));
    const mean = errors.reduce((sum, error) => sum + error, 0) / errors.length;
    const variance = errors.reduce((sum, error) => sum + (error - mean) ** 2, 0) / errors.length;
    expect(truncationVariance(words(8 + discarded, 8))).toBeCloseTo(variance, 12);
  });
});

describe('tableVariance', () => {
  // The angles of the integer tables themselves, 12 phase bits; they scatter a few per cent about the model.
  it.each([8, 10, 12])('is the variance of the table’s own angles, %i bits', (tableBits) => {
    const { cosine, sine } = wholeCircle(rotatorTable({ phaseBits: 12, tableBits }));
    let square = 0;
    cosine.forEach((c, i) => {
      const angle = (2 * Math.PI * i) / cosine.length;
      square +=
        Math.atan2(
          sine[i]! * Math.cos(angle) - c * Math.sin(angle),
          c * Math.cos(angle) + sine[i]! * Math.sin(angle),
        ) ** 2;
    });
    expect(Math.abs(square / cosine.length / tableVariance(words(32, 12, tableBits)) - 1)).toBeLessThan(0.06);
  });
});
