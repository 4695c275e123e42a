import { describe, expect, it } from 'vitest';
import { significantDown, significantUp } from '../../../shared/math/significant';

// Read off the decimal digits.
describe.each([
  [0.01239, 2, 0.012, 0.013],
  [0.012, 2, 0.012, 0.012],
  [0.3, 2, 0.3, 0.3],
  [99.5, 2, 99, 100],
  [123456, 4, 123400, 123500],
  [1e-7, 4, 1e-7, 1e-7],
  [9.9999, 1, 9, 10],
])('%d with %d digits', (value, digits, down, up) => {
  it('goes down', () => {
    expect(significantDown(value, digits)).toBe(down);
  });

  it('goes up', () => {
    expect(significantUp(value, digits)).toBe(up);
  });
});

describe('what rounding put a hair off', () => {
  it('counts as the number itself', () => {
    expect(0.1 + 0.2).toBeGreaterThan(0.3);
    expect(significantUp(0.1 + 0.2, 2)).toBe(0.3);
    expect(0.7 + 0.1).toBeLessThan(0.8);
    expect(significantDown(0.7 + 0.1, 2)).toBe(0.8);
  });
});
