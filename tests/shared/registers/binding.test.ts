import { describe, expect, it } from 'vitest';
import type { Field, RegisterMap } from '../../../shared/model/register-map';
import { bindingFindings, registerValues } from '../../../shared/registers/binding';
import { quantitiesOf } from '../../../shared/registers/quantities';
import { design, plan, target } from '../files/fixture';
import { written } from '../files/written';

const quantities = quantitiesOf({ plan, design });
const one = (...fields: Field[]): RegisterMap => ({ registers: [{ name: 'R', offset: 0, fields }] });
const field = (high: number, low: number, more: Partial<Field>): Field => ({ name: 'f', high, low, ...more });
const wordOf = (map: RegisterMap) => registerValues(map, quantities)[0]?.value;
const faults = (map: RegisterMap) => bindingFindings(map, quantities).filter(({ slug }) => slug === 'register.range');

describe('registerValues', () => {
  it('gives the words worked out by hand for every register of the board', () => {
    const values = registerValues(target.registerMap, quantities);
    expect(values.map(({ register, value }) => [register.name, register.offset, value])).toEqual(written);
  });

  it('keeps reserved bits and unbound fields at their reset values', () => {
    const fields = [field(7, 4, { reset: 9 }), field(3, 0, { quantity: 'carrier.order' })];
    expect(wordOf({ registers: [{ name: 'R', offset: 0, reserved: 0xab00cd00, fields }] })).toBe(0xab00cd92);
  });

  it('keeps a field at its reset value when the plan lacks the quantity', () => {
    const fields = [field(7, 0, { quantity: 'carrier.coarse.untilSymbols', reset: 0x5a })];
    expect(wordOf(one(...fields))).toBe(0x5a);
  });

  it('writes constants, of either sign', () => {
    const constant = field(7, 4, { constant: -3, coding: 'signed', reset: 1 });
    expect(wordOf(one(constant, field(3, 0, { constant: 6, reset: 1 })))).toBe(0xd6);
  });

  it('writes 0 symbols for a stage that does not end by count', () => {
    expect(wordOf(one(field(31, 0, { quantity: 'carrier.track.untilSymbols', reset: 7 })))).toBe(0);
  });

  it('writes nothing into a field that a form has not placed yet', () => {
    expect(wordOf(one(field(3, 9, { constant: 1 }), field(40, 0, { constant: 1 }), field(1, 0, { constant: 2 })))).toBe(
      2,
    );
  });

  it('takes the codes of the hardware where they differ', () => {
    const codes = { floor: 0, nearest: 3, convergent: 1 };
    expect(wordOf(one(field(1, 0, { quantity: 'carrier.rounding', codes })))).toBe(1);
  });
});

describe('bindingFindings', () => {
  it('finds nothing on the board that is wide enough', () => {
    expect(bindingFindings(target.registerMap, quantities)).toEqual([]);
  });

  // −2047 takes 12 bits in two's complement, 1023 takes 11.
  it('names a word that does not fit, and the plan field that made it', () => {
    const narrow = field(10, 0, { quantity: 'carrier.track.integral.mantissa', coding: 'signed' });
    expect(faults(one(narrow))).toMatchObject([
      {
        severity: 'fail',
        reason: 'carrier.track.integral.mantissa is −2047 and goes into R.f; it holds −1024 to 1023.',
        fields: ['/carrier/arithmetic/mantissaBits'],
      },
    ]);
    expect(faults(one({ ...narrow, high: 11 }))).toEqual([]);
  });

  it('refuses a negative word in an unsigned field', () => {
    expect(faults(one(field(31, 0, { quantity: 'carrier.acquire.integral.mantissa' })))).toHaveLength(1);
  });

  it('wants the upper part of a quantity that spans two registers', () => {
    const low = field(31, 0, { quantity: 'carrier.integratorLimit' });
    const high: Field = { ...field(1, 0, { quantity: 'carrier.integratorLimit', quantityLow: 32 }), name: 'g' };
    const both: RegisterMap = { registers: [...one(low).registers, { name: 'S', offset: 4, fields: [high] }] };
    expect(faults(one(low))).toHaveLength(1);
    expect(faults(both)).toEqual([]);
    // The upper part alone loses the bits below.
    expect(faults({ registers: [{ name: 'S', offset: 4, fields: [high] }] })).toHaveLength(1);
    // 9995560252 >> 32 = 2 needs two bits.
    expect(
      faults({ registers: [...one(low).registers, { name: 'S', offset: 4, fields: [{ ...high, high: 0 }] }] }),
    ).toHaveLength(1);
  });

  it('says when the table of codes lacks the choice', () => {
    expect(faults(one(field(1, 0, { quantity: 'carrier.rounding', codes: { floor: 0 } })))).toHaveLength(1);
  });

  it('cautions about words that no register holds', () => {
    const map = one(field(0, 0, { constant: 1 }));
    // Two loops of two stages, four gain words each, the frequency word, the carrier limit, the nominal step.
    expect(bindingFindings(map, quantities)).toMatchObject([
      { slug: 'register.unbound', severity: 'caution', title: '19 words have no register' },
    ]);
  });

  it('says nothing of a map that is still empty', () => {
    expect(bindingFindings({ registers: [] }, quantities)).toEqual([]);
  });
});
