import type { Field, Register, RegisterMap } from '../model/register-map';

/** Bits of a field. */
export const fieldWidth = ({ high, low }: Pick<Field, 'high' | 'low'>): number => high - low + 1;

/** A bit range as people write it: `[16:8]`, `[3]`. */
export const rangeText = ({ high, low }: Pick<Field, 'high' | 'low'>): string =>
  high === low ? `[${high}]` : `[${high}:${low}]`;

/** Ones in the bits of a field, in their place; at most 32 bits, so a double holds it. */
export const fieldMask = ({ high, low }: Pick<Field, 'high' | 'low'>): number => 2 ** (high + 1) - 2 ** low;

/** Least and largest value of a field in its coding. */
export function fieldRange(field: Field): { least: bigint; most: bigint } {
  const width = BigInt(fieldWidth(field));
  if (field.coding === 'signed') return { least: -(1n << (width - 1n)), most: (1n << (width - 1n)) - 1n };
  return { least: 0n, most: (1n << width) - 1n };
}

export function fitsField(value: bigint, field: Field): boolean {
  const { least, most } = fieldRange(field);
  return value >= least && value <= most;
}

/** The bits of a value as they stand in a field, before they are moved to their place. */
export const rawBits = (value: bigint, field: Field): number => Number(BigInt.asUintN(fieldWidth(field), value));

/** A word with the bits of a field replaced. Arithmetic instead of 32-bit operators, whose results are signed. */
export function withField(word: number, field: Field, raw: number): number {
  const below = word % 2 ** field.low;
  const above = Math.floor(word / 2 ** (field.high + 1)) * 2 ** (field.high + 1);
  return above + raw * 2 ** field.low + below;
}

/** Whether a field has its bits in a register of 32 bits; one under edit may not. */
export const isPlaced = ({ high, low }: Pick<Field, 'high' | 'low'>): boolean =>
  Number.isInteger(high) && Number.isInteger(low) && low >= 0 && low <= high && high < 32;

/** Value of a register after reset: its fields' reset values, and the reserved bits between them. */
export const resetWord = ({ reserved, fields }: Register): number =>
  fields
    .filter(isPlaced)
    .reduce((word, field) => withField(word, field, rawBits(BigInt(field.reset ?? 0), field)), reserved ?? 0);

export const wordBitsOf = ({ wordBits }: RegisterMap): number => wordBits ?? 32;

/** A word in hexadecimal with all its digits: `0x0000004F`. */
export const hexText = (word: number | bigint, bits: number): string =>
  `0x${word
    .toString(16)
    .toUpperCase()
    .padStart(Math.ceil(bits / 4), '0')}`;

/** An integer as a sentence shows it, with a real minus sign. */
export const integerText = (value: bigint | number): string => String(value).replace('-', '−');
