import type { FieldValue } from '../../../shared/registers/binding';
import { fieldWidth, hexText } from '../../../shared/registers/map';

/** What a plan writes into a field: a choice by its name, a wide word in hexadecimal, the rest in decimal. */
export function fieldValueText(value: FieldValue | undefined): string {
  if (!value) return '';
  if (value.fault !== undefined) return 'does not fit';
  if (value.quantity?.choice) return value.quantity.choice;
  const width = fieldWidth(value.field);
  return width > 16 && value.field.coding !== 'signed'
    ? hexText(value.raw, width)
    : String(value.value).replace('-', '−');
}
