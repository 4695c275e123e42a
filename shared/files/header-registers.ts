import { fieldMask, fieldWidth, rangeText, resetWord, wordBitsOf } from '../registers/bits';
import type { FieldValue, RegisterValue } from '../registers/binding';
import { fieldName, registerName, type FieldMacro, type RegisterMacro } from '../registers/c-names';
import { cText } from './c-text';
import { decimalConstant, defineBlock, hexConstant } from './c-constant';
import type { FileInput } from './file-input';

const access = { 'read-write': 'read and write', 'write-only': 'write only', 'read-only': 'read only' } as const;

const written = ({ register }: RegisterValue): boolean => register.access !== 'read-only';

/** Registers of the write table, in write order. */
export const writtenRegisters = (values: readonly RegisterValue[]): RegisterValue[] => values.filter(written);

function sourceText({ field, value, quantity }: FieldValue): string {
  if (quantity) {
    const part = field.quantityLow === undefined ? '' : ` from bit ${field.quantityLow}`;
    const meaning = quantity.meaning === '' ? '' : `, ${quantity.meaning}`;
    return `${quantity.path}${part} = ${quantity.value}${meaning}`;
  }
  if (field.constant !== undefined) return `constant ${value}`;
  return field.quantity === undefined ? 'kept at its reset value' : `${field.quantity}: not in this plan, reset value`;
}

function fieldLines(prefix: string, { register }: RegisterValue, entry: FieldValue): string[] {
  const { field, raw } = entry;
  const named = (macro: FieldMacro, value: string) => ({ name: prefix + fieldName(register, field, macro), value });
  return [
    `/* ${field.name} ${rangeText(field)} ${field.coding ?? 'unsigned'}: ${cText(sourceText(entry))} */`,
    ...defineBlock([
      named('SHIFT', decimalConstant(BigInt(field.low), false)),
      named('WIDTH', decimalConstant(BigInt(fieldWidth(field)), false)),
      named('MASK', hexConstant(fieldMask(field))),
      named('VALUE', hexConstant(raw, fieldWidth(field))),
    ]),
  ];
}

function registerLines({ target }: FileInput, entry: RegisterValue): string[] {
  const { register, value, fields } = entry;
  const bits = wordBitsOf(target.registerMap);
  const named = (macro: RegisterMacro, text: string) => ({
    name: target.cPrefix + registerName(register, macro),
    value: text,
  });
  const note = register.note === undefined ? '' : ` ${register.note}`;
  return [
    `/* ${register.name}: ${cText(`${access[register.access ?? 'read-write']}.${note}`)} */`,
    ...defineBlock([
      named('OFFSET', hexConstant(register.offset)),
      named('ADDR', hexConstant(BigInt(target.baseAddress) + BigInt(register.offset))),
      named('RESET', hexConstant(resetWord(register), bits)),
      ...(written(entry) ? [named('VALUE', hexConstant(value, bits))] : []),
    ]),
    ...fields.flatMap((field) => fieldLines(target.cPrefix, entry, field)),
    '',
  ];
}

const faultLine = ({ register }: RegisterValue, { field, quantity, fault }: FieldValue): string[] =>
  fault === undefined ? [] : [`#error ${register.name}.${field.name} cannot hold ${quantity?.path}`];

/** A word that its field cannot hold must stop the build: the bits below would be another word. */
export function faults(values: readonly RegisterValue[]): string[] {
  const lines = writtenRegisters(values).flatMap((entry) => entry.fields.flatMap((field) => faultLine(entry, field)));
  return lines.length === 0 ? [] : [...lines, ''];
}

/** Addresses, fields and values of every register. */
export function registers(input: FileInput, values: readonly RegisterValue[]): string[] {
  const { cPrefix, baseAddress, registerMap } = input.target;
  const bits = wordBitsOf(registerMap);
  return [
    `/* Registers of ${bits} bits, ${registerMap.byteOrder ?? 'little'} end first. VALUE of a field stands before its shift. */`,
    ...defineBlock([
      { name: `${cPrefix}BASE_ADDRESS`, value: hexConstant(BigInt(baseAddress)) },
      { name: `${cPrefix}REGISTER_BITS`, value: decimalConstant(BigInt(bits), false) },
    ]),
    '',
    ...values.flatMap((entry) => registerLines(input, entry)),
  ];
}
