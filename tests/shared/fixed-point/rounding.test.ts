import { describe, expect, it } from 'vitest';
import { fit, toStored, toBigInt } from '../../../shared/fixed-point/format';
import { roundShift } from '../../../shared/fixed-point/rounding';

describe('roundShift', () => {
  // By hand, x/2 for x = −5 … 5.
  it.each([
    ['floor', [-3, -2, -2, -1, -1, 0, 0, 1, 1, 2, 2]],
    ['nearest', [-2, -2, -1, -1, 0, 0, 1, 1, 2, 2, 3]],
    ['convergent', [-2, -2, -2, -1, 0, 0, 0, 1, 2, 2, 2]],
  ] as const)('halves whole numbers by %s', (rounding, halves) => {
    const values = Array.from({ length: 11 }, (_, k) => Number(roundShift(BigInt(k - 5), 1, rounding)));
    expect(values.map((value) => value + 0)).toEqual(halves);
  });

  it('takes convergent halves of negative numbers to the even neighbour', () => {
    expect([-10n, -6n, -2n, 2n, 6n].map((x) => roundShift(x, 2, 'convergent'))).toEqual([-2n, -2n, 0n, 0n, 2n]);
  });

  it('shifts left without loss, sign and all', () => {
    expect(roundShift(-3n, -62, 'nearest')).toBe(-3n * 2n ** 62n);
  });

  it('leaves −1 for the smallest negative number under floor and 0 under nearest', () => {
    expect(roundShift(-1n, 63, 'floor')).toBe(-1n);
    expect(roundShift(-1n, 63, 'nearest')).toBe(0n);
  });
});

describe('fit', () => {
  it('saturates a left shift of a negative number', () => {
    expect(fit(roundShift(-3n, -62, 'floor'), 64, 'saturate')).toBe(-(2n ** 63n));
  });

  it('wraps as two’s complement does', () => {
    expect([127n, 128n, -128n, -129n, 300n].map((x) => fit(x, 8, 'wrap'))).toEqual([127n, -128n, -128n, 127n, 44n]);
  });

  it('saturates at −2^(W−1) and 2^(W−1) − 1', () => {
    expect([127n, 128n, -128n, -129n].map((x) => fit(x, 8, 'saturate'))).toEqual([127n, 127n, -128n, -128n]);
  });
});

describe('toStored', () => {
  it('stores a number up to 2^53 − 1 and digits beyond', () => {
    expect(toStored(2n ** 53n - 1n)).toBe(9007199254740991);
    expect(toStored(2n ** 53n + 1n)).toBe('9007199254740993');
    expect(toBigInt('9007199254740993')).toBe(2n ** 53n + 1n);
  });
});
