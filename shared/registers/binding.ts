import type { Finding } from '../model/design';
import type { Field, Register, RegisterMap } from '../model/register-map';
import { fieldRange, fieldWidth, fitsField, integerText, isPlaced, rawBits, withField } from './bits';
import { bySeverity, mapFinding } from './map-finding';
import type { QuantityValue } from './quantities';

/** What a plan writes into one field. */
export interface FieldValue {
  field: Field;
  /** Value in the coding of the field. */
  value: bigint;
  /** The bits that are written. */
  raw: number;
  /** The quantity that the field is bound to, where the plan gives it. */
  quantity?: QuantityValue;
  /** Why the field cannot hold the value; the bits written are then wrong. */
  fault?: string;
}

/** What a plan writes into one register. */
export interface RegisterValue {
  register: Register;
  /** Unsigned word, reserved bits at their reset value. */
  value: number;
  fields: FieldValue[];
}

type Values = ReadonlyMap<string, QuantityValue>;

const lowOf = (field: Field): number => field.quantityLow ?? 0;

/** Fields of the whole map that hold a part of a quantity, by its path. */
type Parts = ReadonlyMap<string, readonly Field[]>;

function partsOf(map: RegisterMap): Parts {
  const parts = new Map<string, Field[]>();
  for (const field of map.registers.flatMap(({ fields }) => fields)) {
    if (field.quantity === undefined || !isPlaced(field)) continue;
    const known = parts.get(field.quantity);
    if (known) known.push(field);
    else parts.set(field.quantity, [field]);
  }
  return parts;
}

/** Where a quantity is split over fields, only the part with the highest bits must hold its sign and its end. */
function fitFault(value: bigint, field: Field, parts: readonly Field[]): string | undefined {
  const low = lowOf(field);
  const top = low + fieldWidth(field);
  const held = value >> BigInt(low);
  const lost = BigInt.asUintN(low, value) !== 0n && !parts.some((part) => lowOf(part) + fieldWidth(part) === low);
  if (lost) return `no field holds the ${low} bits below`;
  if (fitsField(held, field) || parts.some((part) => lowOf(part) === top)) return undefined;
  const { least, most } = fieldRange(field);
  return `it holds ${integerText(least)} to ${integerText(most)}`;
}

/** Integer of an enumerated quantity in the hardware's own table, where the field has one. */
function codeOf(field: Field, quantity: QuantityValue): bigint | undefined {
  if (field.codes === undefined || quantity.choice === undefined) return quantity.value;
  const code = field.codes[quantity.choice];
  return code === undefined ? undefined : BigInt(code);
}

function boundValue(parts: Parts, field: Field, quantity: QuantityValue): FieldValue {
  const code = codeOf(field, quantity);
  if (code === undefined)
    return { ...keptValue(field), quantity, fault: `its table of codes lacks ${quantity.choice}` };
  const fault = fitFault(code, field, parts.get(quantity.path) ?? []);
  const raw = rawBits(code >> BigInt(lowOf(field)), field);
  // A lower part has no sign of its own: its bits are shown as they stand.
  const value = fitsField(code >> BigInt(lowOf(field)), field) ? code >> BigInt(lowOf(field)) : BigInt(raw);
  return { field, value, raw, quantity, ...(fault !== undefined && { fault }) };
}

function keptValue(field: Field): FieldValue {
  const value = BigInt(field.constant ?? field.reset ?? 0);
  return { field, value, raw: rawBits(value, field) };
}

function fieldValue(parts: Parts, field: Field, values: Values): FieldValue {
  if (!isPlaced(field)) return { field, value: 0n, raw: 0 };
  const quantity = field.quantity === undefined ? undefined : values.get(field.quantity);
  return quantity ? boundValue(parts, field, quantity) : keptValue(field);
}

/**
 * What the words of a plan write into every register of a map, in the order of the map. A field that the plan gives
 * no value for, and every reserved bit, holds its reset value.
 *
 * @param map register map; a field without its bits, as a form may hold it, writes nothing
 * @param quantities what {@link quantitiesOf} gives for the plan
 */
export function registerValues(map: RegisterMap, quantities: readonly QuantityValue[]): RegisterValue[] {
  const values: Values = new Map(quantities.map((quantity) => [quantity.path, quantity]));
  const parts = partsOf(map);
  return map.registers.map((register) => {
    const fields = register.fields.map((field) => fieldValue(parts, field, values));
    const value = fields
      .filter(({ field }) => isPlaced(field))
      .reduce((word, { field, raw }) => withField(word, field, raw), register.reserved ?? 0);
    return { register, value, fields };
  });
}

function rangeFinding(register: Register, { field, quantity, fault }: FieldValue): Finding[] {
  if (!quantity || fault === undefined) return [];
  return [
    mapFinding({
      slug: 'register.range',
      title: 'A word does not fit its field',
      reason: `${quantity.path} is ${quantity.choice ?? integerText(quantity.value)} and goes into ${register.name}.${field.name}; ${fault}.`,
      remedy: 'Widen the field in the map of the target, or make the word smaller in the plan.',
      fields: [quantity.planPointer],
    }),
  ];
}

function unboundFinding(map: RegisterMap, quantities: readonly QuantityValue[]): Finding[] {
  const parts = partsOf(map);
  const missing = quantities.filter(({ required, path }) => required && !parts.has(path));
  if (map.registers.length === 0 || missing.length === 0) return [];
  const more = missing.length > 1 ? ` and ${missing.length - 1} more` : '';
  return [
    mapFinding({
      slug: 'register.unbound',
      severity: 'caution',
      title: missing.length === 1 ? 'A word has no register' : `${missing.length} words have no register`,
      reason: `No field of the target holds ${missing[0]?.path}${more}: the write table leaves ${more ? 'them' : 'it'} to the firmware.`,
      remedy: 'Bind them in the map of the target.',
      fields: missing.slice(0, 1).map(({ planPointer }) => planPointer),
    }),
  ];
}

/**
 * What is wrong with writing a plan through a map: words that do not fit, words that no register holds. `fields` are
 * JSON pointers into the plan.
 */
export function bindingFindings(map: RegisterMap, quantities: readonly QuantityValue[]): Finding[] {
  const written = registerValues(map, quantities).filter(({ register }) => register.access !== 'read-only');
  return bySeverity([
    ...written.flatMap(({ register, fields }) => fields.flatMap((field) => rangeFinding(register, field))),
    ...unboundFinding(map, quantities),
  ]);
}
