import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Field } from '../../../shared/model/register-map';
import {
  fieldMask,
  fieldRange,
  fitsField,
  hexText,
  rawBits,
  resetWord,
  withField,
} from '../../../shared/registers/bits';

const field = (high: number, low: number, more: Partial<Field> = {}): Field => ({ name: 'f', high, low, ...more });

const place = fc.tuple(fc.integer({ min: 0, max: 31 }), fc.integer({ min: 0, max: 31 }));
const word = fc.integer({ min: 0, max: 0xffffffff });

describe('bits of a field', () => {
  it('has the mask of a register diagram', () => {
    expect(fieldMask(field(31, 0))).toBe(0xffffffff);
    expect(fieldMask(field(31, 31))).toBe(0x80000000);
    expect(fieldMask(field(16, 8))).toBe(0x0001ff00);
  });

  // Two's complement of w bits runs from −2^(w−1) to 2^(w−1) − 1.
  it('has the range of its coding', () => {
    expect(fieldRange(field(31, 0))).toEqual({ least: 0n, most: 4294967295n });
    expect(fieldRange(field(31, 0, { coding: 'signed' }))).toEqual({ least: -2147483648n, most: 2147483647n });
    expect(fieldRange(field(5, 5, { coding: 'signed' }))).toEqual({ least: -1n, most: 0n });
    expect(fitsField(512n, field(9, 0, { coding: 'signed' }))).toBe(false);
    expect(fitsField(-512n, field(9, 0, { coding: 'signed' }))).toBe(true);
  });

  it('writes its own bits and no others, in any place of a 32-bit word', () => {
    fc.assert(
      fc.property(place, word, word, ([a, b], before, bits) => {
        const at = field(Math.max(a, b), Math.min(a, b));
        const raw = rawBits(BigInt(bits), at);
        const after = BigInt(withField(before, at, raw));
        const mask = ((1n << BigInt(at.high - at.low + 1)) - 1n) << BigInt(at.low);
        expect(after & ~mask).toBe(BigInt(before) & ~mask);
        expect((after & mask) >> BigInt(at.low)).toBe(BigInt(raw));
      }),
    );
  });

  it('puts reset values and reserved bits together', () => {
    const fields = [field(31, 28, { coding: 'signed', reset: -1 }), field(7, 0, { reset: 0x99 })];
    expect(resetWord({ name: 'R', offset: 0, reserved: 0x00c0ffff, fields })).toBe(0xf0c0ff99);
  });

  it('prints all the digits of a register', () => {
    expect(hexText(79, 32)).toBe('0x0000004F');
    expect(hexText(5, 3)).toBe('0x5');
    expect(hexText(0x123n, 16)).toBe('0x0123');
  });
});
