import { toStored } from '../fixed-point/format';
import type { ConfigField, ConfigQuantity, ConfigRegister } from '../model/config';
import { hexText, resetWord, wordBitsOf } from '../registers/bits';
import type { FieldValue, RegisterValue } from '../registers/binding';
import type { QuantityValue } from '../registers/quantities';
import type { TargetSnapshot } from './file-input';

const addressText = (address: bigint): string => hexText(address, address > 0xffffffffn ? 64 : 32);

const fieldOf = ({ field, value, fault }: FieldValue): ConfigField => ({
  name: field.name,
  high: field.high,
  low: field.low,
  coding: field.coding ?? 'unsigned',
  value: Number(value),
  ...(field.quantity !== undefined && { quantity: field.quantity }),
  ...(field.quantityLow !== undefined && { quantityLow: field.quantityLow }),
  ...(fault !== undefined && { fault }),
});

/** One register with its address, and the value that is written where it can be written. */
export function configRegister(entry: RegisterValue, { baseAddress, registerMap }: TargetSnapshot): ConfigRegister {
  const { register, value, fields } = entry;
  const bits = wordBitsOf(registerMap);
  const access = register.access ?? 'read-write';
  return {
    name: register.name,
    offset: hexText(register.offset, 32),
    address: addressText(BigInt(baseAddress) + BigInt(register.offset)),
    access,
    reset: hexText(resetWord(register), bits),
    ...(access !== 'read-only' && { value: hexText(value, bits) }),
    fields: fields.map(fieldOf),
  };
}

export const configQuantity = ({ path, value, widthBits, signed, label, meaning }: QuantityValue): ConfigQuantity => ({
  path,
  value: toStored(value),
  widthBits,
  signed,
  meaning: meaning === '' ? label : `${label}: ${meaning}`,
});
