import { describe, expect, it } from 'vitest';
import { decimalConstant, hexConstant } from '../../../shared/files/c-constant';

describe('decimalConstant', () => {
  // C99 6.4.4.1: an integer constant has no sign, so that −2^31 is written as −(2^31 − 1) − 1, like INT32_MIN.
  it.each([
    [0n, false, 'UINT32_C(0)'],
    [4294967295n, false, 'UINT32_C(4294967295)'],
    [4294967296n, false, 'UINT64_C(4294967296)'],
    [18446744073709551615n, false, 'UINT64_C(18446744073709551615)'],
    [2147483647n, true, 'INT32_C(2147483647)'],
    [2147483648n, true, 'INT64_C(2147483648)'],
    [-1n, true, '(-INT32_C(1))'],
    [-2147483647n, true, '(-INT32_C(2147483647))'],
    [-2147483648n, true, '(-INT32_C(2147483647) - 1)'],
    [-2147483649n, true, '(-INT64_C(2147483649))'],
    [-9223372036854775808n, true, '(-INT64_C(9223372036854775807) - 1)'],
  ])('of %d, signed: %s, is %s', (value, signed, text) => {
    expect(decimalConstant(value, signed)).toBe(text);
  });
});

describe('hexConstant', () => {
  it.each([
    [79, 32, 'UINT32_C(0x0000004F)'],
    [5, 3, 'UINT32_C(0x5)'],
    [4294967295n, 32, 'UINT32_C(0xFFFFFFFF)'],
    [4294967296n, 32, 'UINT64_C(0x0000000100000000)'],
  ])('of %d in %d bits is %s', (value, bits, text) => {
    expect(hexConstant(value, bits)).toBe(text);
  });
});
