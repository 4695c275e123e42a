import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { commonUnit, formatQuantity, numberText, plainText, quantityText } from '../../../shared/quantities/format';
import { parseQuantity } from '../../../shared/quantities/parse';
import type { Unit } from '../../../shared/quantities/units';

describe('numberText', () => {
  it.each([
    [0.7071, {}, '0.7071'],
    [-0.7071, {}, '\u22120.7071'],
    [-0.00001, { decimals: 2 }, '0.00'],
    [2587, {}, '2\u202f587'],
    [1234567.25, {}, '1\u202f234\u202f567.25'],
    [0.011935, { significant: 5, exponent: true }, '1.1935e\u22122'],
    [7.9564e-5, { significant: 5, exponent: true }, '7.9564e\u22125'],
    [3e-7, {}, '0.0000003'],
    [0.13, { decimals: 3, sign: true }, '+0.130'],
    [0, { sign: true }, '0'],
  ])('writes %d', (value, style, text) => {
    expect(numberText(value, style)).toBe(text);
  });
});

describe('formatQuantity', () => {
  it.each<[number, Unit, string]>([
    [27.5e6, 'Bd', '27.5 MBd'],
    [1.55e9, 'Hz', '1.55 GHz'],
    [1000, 'Hz', '1 kHz'],
    [999, 'Hz', '999 Hz'],
    [0.0123, 'Hz', '12.3 mHz'],
    [0, 'Hz', '0 Hz'],
    [20, 'ppm', '20 ppm'],
    [0.01, '%', '1 %'],
    [3, '° rms', '3° rms'],
    [10000, 'symbols', '10\u202f000 symbols'],
  ])('writes %d %s', (value, unit, text) => {
    expect(quantityText(value, { unit })).toBe(text);
  });

  it('keeps the fewest digits that a field asks for', () => {
    expect(formatQuantity(1, { unit: 'dB', symmetric: true, least: 1 }).number).toBe('±1.0');
  });

  it('is read back as the same number, whatever the unit', () => {
    const units = fc.constantFrom<Unit>('Hz', 'Bd', 'ppm', '%', '', 'dB');
    const values = fc.double({ min: 1e-9, max: 1e12, noNaN: true });
    fc.assert(
      fc.property(units, values, (unit, value) => {
        const parts = formatQuantity(value, { unit });
        const reading = parseQuantity(parts.number, { unit, shownExponent: parts.exponent });
        expect(reading).toMatchObject({ kind: 'value' });
        expect(reading.kind === 'value' && Math.abs(reading.value / value - 1)).toBeLessThan(3e-16);
      }),
    );
  });
});

describe('plainText', () => {
  it('gives ASCII that a spreadsheet reads', () => {
    expect(plainText('\u22122\u202f587.5')).toBe('-2587.5');
  });
});

describe('commonUnit', () => {
  it.each([
    [[70_000, -77_500], 'kHz', 3],
    [[2250, 1e6], 'MHz', 6],
    [[0, 0.0064], 'mHz', -3],
    [[0], 'Hz', 0],
    [[], 'Hz', 0],
  ])('%j Hz are in %s', (values, unit, exponent) => {
    expect(commonUnit(values, 'Hz')).toEqual({ unit, exponent });
  });
});
