import type { Finding } from '../model/design';
import type { Field, Register } from '../model/register-map';
import { fieldRange, fieldWidth, fitsField, integerText, rangeText } from './bits';
import { mapFinding } from './map-finding';
import { quantityAt } from './quantities';

/** A field with where it stands. */
export interface PlacedField {
  field: Field;
  register: Register;
  /** JSON pointer of the field in the map. */
  pointer: string;
}

const nameOf = ({ register, field }: PlacedField): string => `${register.name}.${field.name}`;

/** Bits outside the register, or the two ends swapped. Other checks of such a field would mislead. */
export function rangeFault(placed: PlacedField, wordBits: number): Finding[] {
  const { field, pointer } = placed;
  const whole = [field.high, field.low].every((bit) => Number.isInteger(bit) && bit >= 0 && bit < wordBits);
  if (whole && field.high >= field.low) return [];
  const swapped = whole && field.high < field.low;
  return [
    mapFinding({
      slug: 'map.range',
      title: swapped ? 'Its high bit is below its low bit' : 'Its bits lie outside the register',
      reason: `${nameOf(placed)} is [${integerText(field.high)}:${integerText(field.low)}]; a register has bits ${wordBits - 1} to 0.`,
      fields: [`${pointer}/high`, `${pointer}/low`],
    }),
  ];
}

function valueFault(placed: PlacedField, key: 'constant' | 'reset'): Finding[] {
  const { field, pointer } = placed;
  const value = field[key];
  if (value === undefined || (Number.isInteger(value) && fitsField(BigInt(value), field))) return [];
  const { least, most } = fieldRange(field);
  return [
    mapFinding({
      slug: `map.${key}`,
      title: `Its ${key === 'reset' ? 'reset value' : 'constant'} does not fit`,
      reason: `${nameOf(placed)} takes ${integerText(least)} to ${integerText(most)} in ${fieldWidth(field)} bits ${field.coding ?? 'unsigned'}, not ${integerText(value)}.`,
      fields: [`${pointer}/${key}`],
    }),
  ];
}

function quantityFault(placed: PlacedField): Finding[] {
  const { field, pointer } = placed;
  if (field.quantity === undefined || quantityAt(field.quantity)) return [];
  return [
    mapFinding({
      slug: 'map.quantity',
      title: 'It is bound to no known quantity',
      reason: `No plan gives ${field.quantity}, which ${nameOf(placed)} would hold.`,
      fields: [`${pointer}/quantity`],
    }),
  ];
}

function codesFault(placed: PlacedField): Finding[] {
  const { field, pointer } = placed;
  const choices = quantityAt(field.quantity ?? '')?.choices ?? [];
  const { most } = fieldRange(field);
  const wrong = Object.entries(field.codes ?? {}).find(
    ([choice, code]) => !choices.includes(choice) || BigInt(code) > most,
  );
  if (!wrong) return [];
  const [choice, code] = wrong;
  return [
    mapFinding({
      slug: 'map.codes',
      title: 'Its table of codes is wrong',
      reason: choices.includes(choice)
        ? `${nameOf(placed)} holds 0 to ${most}, not ${code} for ${choice}.`
        : `${field.quantity} has no choice named ${choice}.`,
      fields: [`${pointer}/codes`],
    }),
  ];
}

/** An enumerated quantity and a mantissa want different codings: a sign that the field cannot hold is lost. */
function signFault(placed: PlacedField): Finding[] {
  const { field, pointer } = placed;
  const quantity = quantityAt(field.quantity ?? '');
  if (!quantity?.signed || field.coding === 'signed' || (field.quantityLow ?? 0) > 0) return [];
  return [
    mapFinding({
      slug: 'map.sign',
      severity: 'caution',
      title: 'The field holds no sign',
      reason: `${field.quantity} can be negative; ${nameOf(placed)} ${rangeText(field)} is unsigned and holds 0 and above only.`,
      remedy: 'Code it as signed.',
      change: { pointer: `${pointer}/coding`, value: 'signed', label: `Make ${field.name} signed` },
      fields: [`${pointer}/coding`],
    }),
  ];
}

/** Checks of one field whose bits are in order. */
export const fieldFindings = (placed: PlacedField): Finding[] => [
  ...valueFault(placed, 'constant'),
  ...valueFault(placed, 'reset'),
  ...quantityFault(placed),
  ...codesFault(placed),
  ...signFault(placed),
];
