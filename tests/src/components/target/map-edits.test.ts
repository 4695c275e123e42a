import { describe, expect, it } from 'vitest';
import type { Field, Register, RegisterMap } from '../../../../shared/model/register-map';
import { mapFindings } from '../../../../shared/registers/map';
import { registerOf, worstAt } from '../../../../src/components/target/finding-places';
import * as edits from '../../../../src/components/target/map-edits';
import {
  bindingOf,
  boundText,
  choiceOf,
  quantityChoices,
  stagesOf,
} from '../../../../src/components/target/quantity-choices';

const field = (name: string, high: number, low: number, more: Partial<Field> = {}): Field => ({
  name,
  high,
  low,
  ...more,
});
const map = (...fields: Field[]): RegisterMap => ({ registers: [{ name: 'REG_1', offset: 8, fields }] });
const first = ({ registers }: RegisterMap): Register => registers[0]!;

describe('edits of a map', () => {
  it('put a new register behind the last, under a name of its own', () => {
    const grown = edits.withNewRegister(edits.withNewRegister(map()));
    expect(grown.registers.map(({ name, offset }) => [name, offset])).toEqual([
      ['REG_1', 8],
      ['REG_2', 12],
      ['REG_3', 16],
    ]);
    expect(edits.withNewRegister({ wordBits: 8, registers: [] }).registers[0]).toMatchObject({
      name: 'REG_1',
      offset: 0,
    });
    expect(mapFindings(grown)).toEqual([]);
  });

  it('put a new field into the highest free bits, until the register is full', () => {
    let grown = map(field('a', 31, 24), field('b', 15, 8));
    const places: string[] = [];
    for (let count = 0; count < 3; count += 1) {
      grown = edits.withNewField(grown, 0);
      const { high, low, name } = first(grown).fields.at(-1)!;
      places.push(`${name} ${high}:${low}`);
    }
    expect(places).toEqual(['field_1 23:16', 'field_2 7:0', 'field_2 7:0']);
    expect(edits.freeBits(first(grown), 32)).toBeUndefined();
  });

  it('move, change and take out, and leave the map before as it was', () => {
    const before: RegisterMap = {
      registers: ['A', 'B', 'C'].map((name, at) => ({ name, offset: 4 * at, fields: [] })),
    };
    const names = ({ registers }: RegisterMap) => registers.map(({ name }) => name).join('');
    expect(names(edits.withMoved(before, 0, 1))).toBe('BAC');
    expect(names(edits.withMoved(before, 2, -1))).toBe('ACB');
    expect(names(edits.withoutRegister(before, 1))).toBe('AC');
    expect(names(edits.withRegister(before, 1, { name: 'X' }))).toBe('AXC');
    expect(names(before)).toBe('ABC');
  });

  it('take a key of a field away when it is set to nothing', () => {
    const bound = map(field('a', 3, 0, { constant: 2 }));
    expect(first(edits.withField(bound, 0, 0, bindingOf('carrier.track.integral.shift'))).fields[0]).toStrictEqual(
      field('a', 3, 0, { quantity: 'carrier.track.integral.shift', coding: 'signed' }),
    );
  });
});

describe('choices of a binding', () => {
  it('list the stages that the map binds besides the usual two', () => {
    const own = map(field('a', 3, 0, { quantity: 'clock.coarse.untilSymbols' }));
    expect(stagesOf(own, ['fine'])).toEqual(['acquire', 'track', 'coarse', 'fine']);
    const labels = quantityChoices(['acquire', 'track']).map(({ label }) => label);
    expect(labels).toEqual([
      'carrier, acquire',
      'carrier, track',
      'carrier',
      'clock, acquire',
      'clock, track',
      'clock',
    ]);
  });

  it('say what a field holds', () => {
    const texts = [
      {},
      { constant: -1 },
      { quantity: 'carrier.nco.fcw', quantityLow: 32 },
      { quantity: 'carrier.delay' },
    ].map((more) => boundText(field('a', 3, 0, more)));
    expect(texts).toEqual(['nothing, kept at reset', 'constant −1', 'carrier.nco.fcw from bit 32', 'carrier.delay']);
    expect(choiceOf(field('a', 3, 0, { constant: 0 }))).toBe('constant');
  });
});

describe('places of a finding', () => {
  it('lead from a finding to its register, with the worst state', () => {
    const registers = [...map(field('a', 8, 4), field('b', 4, 0)).registers, { name: 'TWO', offset: 12, fields: [] }];
    const findings = mapFindings({ registers });
    expect(findings.map(registerOf)).toEqual([0]);
    expect([worstAt(findings, 0), worstAt(findings, 1)]).toEqual(['fail', undefined]);
  });
});
