import type { Field, Register, RegisterMap } from '../../../shared/model/register-map';
import { wordBitsOf } from '../../../shared/registers/map';

/** An edit of a field; a key set to undefined goes. */
export type FieldChange = { [Key in keyof Field]?: Field[Key] | undefined };

/** A name that is not taken yet, whatever its case: `FIELD_2`. */
function freeName(stem: string, taken: readonly string[]): string {
  const used = new Set(taken.map((name) => name.toUpperCase()));
  let number = 1;
  while (used.has(`${stem}_${number}`.toUpperCase())) number += 1;
  return `${stem}_${number}`;
}

/** A map with one more register behind the last, at the next free offset. */
export function withNewRegister(map: RegisterMap): RegisterMap {
  const bytes = wordBitsOf(map) / 8;
  const last = Math.max(-bytes, ...map.registers.map(({ offset }) => offset));
  const name = freeName(
    'REG',
    map.registers.map((register) => register.name),
  );
  return { ...map, registers: [...map.registers, { name, offset: last + bytes, fields: [] }] };
}

export const withRegister = (map: RegisterMap, index: number, change: Partial<Register>): RegisterMap => ({
  ...map,
  registers: map.registers.map((register, at) => (at === index ? { ...register, ...change } : register)),
});

export const withoutRegister = (map: RegisterMap, index: number): RegisterMap => ({
  ...map,
  registers: map.registers.filter((_, at) => at !== index),
});

/** The register one place earlier (−1) or later (1) in the order of writing. */
export function withMoved(map: RegisterMap, index: number, by: -1 | 1): RegisterMap {
  const registers = [...map.registers];
  const [moved] = registers.splice(index, 1);
  if (moved) registers.splice(index + by, 0, moved);
  return { ...map, registers };
}

/** The highest run of bits that no field claims; undefined where the register is full. */
export function freeBits({ fields }: Register, wordBits: number): { high: number; low: number } | undefined {
  const claimed = (bit: number) => fields.some(({ high, low }) => low <= bit && bit <= high);
  const bits = Array.from({ length: wordBits }, (_, bit) => bit);
  const high = bits.findLast((bit) => !claimed(bit));
  if (high === undefined) return undefined;
  const below = bits.findLast((bit) => bit < high && claimed(bit));
  return { high, low: below === undefined ? 0 : below + 1 };
}

export function withNewField(map: RegisterMap, index: number): RegisterMap {
  const register = map.registers[index];
  const place = register && freeBits(register, wordBitsOf(map));
  if (!register || !place) return map;
  const name = freeName(
    'field',
    register.fields.map((field) => field.name),
  );
  return withRegister(map, index, { fields: [...register.fields, { name, ...place }] });
}

const withFields = (map: RegisterMap, index: number, change: (fields: Field[]) => Field[]): RegisterMap =>
  withRegister(map, index, { fields: change(map.registers[index]?.fields ?? []) });

export const withField = (map: RegisterMap, index: number, at: number, change: FieldChange): RegisterMap =>
  withFields(map, index, (fields) => fields.map((field, place) => (place === at ? changed(field, change) : field)));

function changed(field: Field, change: FieldChange): Field {
  const entries = Object.entries({ ...field, ...change }).filter(([, value]) => value !== undefined);
  return Object.fromEntries(entries) as unknown as Field;
}

export const withoutField = (map: RegisterMap, index: number, at: number): RegisterMap =>
  withFields(map, index, (fields) => fields.filter((_, place) => place !== at));
