import { describe, expect, it } from 'vitest';
import { asRegisterMap } from '../../../shared/registers/map-shape';

const field = { name: 'f', high: 3, low: 0 };
const map = (more: object = {}) => ({ registers: [{ name: 'A', offset: 4, fields: [{ ...field, ...more }] }] });

describe('asRegisterMap', () => {
  it('takes a map, or the map of a target', () => {
    expect(asRegisterMap(map())).toEqual(map());
    expect(asRegisterMap({ name: 'Corvid C2', registerMap: map() })).toEqual(map());
  });

  it.each([
    [null, 'The file has no list of registers.'],
    ['registers', 'The file has no list of registers.'],
    [{ registers: {} }, 'The file has no list of registers.'],
    [{ wordBits: 12, registers: [] }, '/wordBits is 8, 16 or 32.'],
    [{ registers: ['A'] }, '/registers/0 is no mapping of keys to values.'],
    [{ registers: [{ name: 'A', fields: [] }] }, '/registers/0 has no offset.'],
    [{ registers: [{ name: 'A', offset: '0x4', fields: [] }] }, '/registers/0/offset is no whole number.'],
    [{ registers: [{ name: 'A', offset: 4, fields: {} }] }, '/registers/0/fields is no list.'],
    [map({ low: undefined }), '/registers/0/fields/0 has no low.'],
    [map({ high: 3.5 }), '/registers/0/fields/0/high is no whole number.'],
    [map({ quantity: 7 }), '/registers/0/fields/0/quantity is no text.'],
  ])('refuses %j', (value, sentence) => {
    expect(asRegisterMap(value)).toBe(sentence);
  });
});
