import { describe, expect, it } from 'vitest';
import { corvidC1Target } from '../../../seeds/corvid-c1-map';
import { corvidC2Target } from '../../../seeds/corvid-c2-map';
import type { Field, Register, RegisterMap } from '../../../shared/model/register-map';
import { mapFindings, usedBits } from '../../../shared/registers/map';

const field = (name: string, high: number, low: number, more: Partial<Field> = {}): Field => ({
  name,
  high,
  low,
  ...more,
});
const register = (name: string, offset: number, fields: Field[], more: Partial<Register> = {}): Register => ({
  name,
  offset,
  fields,
  ...more,
});
const map = (...registers: Register[]): RegisterMap => ({ registers });
const slugs = (registerMap: RegisterMap): string[] => mapFindings(registerMap).map(({ slug }) => slug);

describe('mapFindings', () => {
  it('finds nothing in the maps of the demo boards', () => {
    expect(mapFindings(corvidC2Target.registerMap)).toEqual([]);
    expect(mapFindings(corvidC1Target.registerMap)).toEqual([]);
  });

  it('names the bit that two fields claim, and the edit that ends it', () => {
    const [finding] = mapFindings(map(register('LOCK_DET', 0x30, [field('average', 16, 8), field('threshold', 8, 0)])));
    expect(finding).toMatchObject({
      slug: 'map.overlap',
      severity: 'fail',
      title: 'Two fields claim bit 8',
      reason: 'LOCK_DET: average is [16:8], threshold is [8:0]. The header would write one over the other.',
      change: { pointer: '/registers/0/fields/1/high', value: 7, label: 'Make threshold [7:0]' },
    });
  });

  it('counts the bits of a wider overlap and offers no edit where a field would vanish', () => {
    const [finding] = mapFindings(map(register('R', 0, [field('a', 9, 4), field('b', 12, 4)])));
    expect(finding?.title).toBe('Two fields claim bits 4 to 9');
    expect(finding?.change).toBeNull();
  });

  it('lets fields touch without overlapping', () => {
    expect(slugs(map(register('R', 0, [field('a', 31, 16), field('b', 15, 0)])))).toEqual([]);
  });

  it.each([
    ['bits above the register', register('R', 0, [field('a', 32, 0)])],
    ['bits below it', register('R', 0, [field('a', 3, -1)])],
    ['ends swapped', register('R', 0, [field('a', 3, 4)])],
    ['an end that is no whole number', register('R', 0, [field('a', 3.5, 0)])],
  ])('refuses %s', (_, wrong) => {
    expect(slugs(map(wrong))).toEqual(['map.range']);
  });

  it('holds a field to the width of the register', () => {
    const narrow = map(register('R', 0, [field('a', 15, 0)]));
    expect(slugs({ ...narrow, wordBits: 16 })).toEqual([]);
    expect(slugs({ ...narrow, wordBits: 8 })).toEqual(['map.range']);
  });

  it.each(['', '2FAST', '_Bad', 'a b', 'naïve', 'a-b', 'x'.repeat(41)])('refuses the name “%s”', (name) => {
    expect(slugs(map(register(name, 0, [])))).toEqual(['map.identifier']);
    expect(slugs(map(register('R', 0, [field(name, 0, 0)])))).toEqual(['map.identifier']);
  });

  it('refuses names that differ in case only: their macros are one', () => {
    expect(slugs(map(register('CAR', 0, []), register('car', 4, [])))).toEqual(['map.duplicate-name']);
    expect(slugs(map(register('R', 0, [field('a', 0, 0), field('A', 1, 1)])))).toEqual(['map.duplicate-name']);
  });

  it('refuses names that run together to one macro', () => {
    const clash = map(register('A', 0, [field('B_C', 0, 0)]), register('A_B', 4, [field('C', 0, 0)]));
    expect(mapFindings(clash)).toMatchObject([
      { slug: 'map.macro', fields: ['/registers/1/fields/0/name', '/registers/0/fields/0/name'] },
    ]);
    expect(slugs(map(register('A', 0, [field('OFFSET', 0, 0)]), register('A_OFFSET', 4, [])))).toEqual(['map.macro']);
    expect(slugs(map(register('WORD_CARRIER', 0, [])))).toEqual(['map.macro']);
  });

  it('wants offsets aligned and apart', () => {
    expect(slugs(map(register('A', 2, [])))).toEqual(['map.offset']);
    expect(slugs({ ...map(register('A', 2, [])), wordBits: 16 })).toEqual([]);
    expect(slugs(map(register('A', 8, []), register('B', 8, [])))).toEqual(['map.offset']);
  });

  it('wants the base address aligned, and the last register within 64 bits', () => {
    const at = (offset: number) => map(register('A', offset, []));
    const slugsAt = (base: string, offset: number) => mapFindings(at(offset), base).map(({ slug }) => slug);
    expect(slugsAt('0x40010000', 0x4000)).toEqual([]);
    expect(slugsAt('0x40010002', 0x4000)).toEqual(['map.address']);
    expect(slugsAt('0xFFFFFFFFFFFFFFF8', 4)).toEqual([]);
    expect(slugsAt('0xFFFFFFFFFFFFFFF8', 8)).toEqual(['map.address']);
  });

  it.each([
    ['map.constant', field('a', 3, 0, { constant: 16 })],
    ['map.constant', field('a', 3, 0, { constant: -1 })],
    ['map.reset', field('a', 3, 0, { coding: 'signed', reset: 8 })],
    ['map.quantity', field('a', 3, 0, { quantity: 'carrier.nco.fcv' })],
    ['map.codes', field('a', 1, 0, { quantity: 'carrier.rounding', codes: { nearest: 4 } })],
    ['map.codes', field('a', 1, 0, { quantity: 'carrier.rounding', codes: { up: 1 } })],
    ['map.sign', field('a', 15, 0, { quantity: 'carrier.errorFullScaleLog2' })],
  ])('says %s', (slug, wrong) => {
    expect(slugs(map(register('R', 0, [wrong])))).toEqual([slug]);
  });

  it('says which gain words a stage lacks once it has one', () => {
    const [finding] = mapFindings(
      map(register('R', 0, [field('p', 15, 0, { quantity: 'clock.track.proportional.mantissa', coding: 'signed' })])),
    );
    expect(finding).toMatchObject({ slug: 'map.unbound', severity: 'caution', title: '3 gain words have no field' });
  });

  it('refuses reserved bits wider than the register', () => {
    expect(slugs({ ...map(register('R', 0, [], { reserved: 256 })), wordBits: 8 })).toEqual(['map.reserved']);
  });

  it('puts failing findings first', () => {
    const both = map(
      register('R', 0, [field('a', 15, 0, { quantity: 'carrier.errorFullScaleLog2' }), field('b', 0, 0)]),
    );
    expect(mapFindings(both).map(({ severity }) => severity)).toEqual(['fail', 'caution']);
  });
});

describe('usedBits', () => {
  it('counts a bit that two fields claim once', () => {
    expect(usedBits(register('R', 0, [field('a', 16, 8), field('b', 8, 0)]))).toBe(17);
  });
});
