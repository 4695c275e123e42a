import { hexText } from '../registers/bits';

/** Unsigned constant in hexadecimal: `UINT32_C(0x0000004F)`, beyond 32 bits `UINT64_C(…)`. */
export function hexConstant(value: number | bigint, digitsOfBits = 32): string {
  const wide = BigInt(value) > 0xffffffffn;
  return wide ? `UINT64_C(${hexText(value, 64)})` : `UINT32_C(${hexText(value, digitsOfBits)})`;
}

const suffix = (magnitude: bigint, signed: boolean): string => {
  const wide = signed ? magnitude > 0x7fffffffn : magnitude > 0xffffffffn;
  return `${signed ? 'INT' : 'UINT'}${wide ? 64 : 32}_C`;
};

/**
 * Decimal constant of up to 64 bits. The sign stands outside the macro, and the least value of a type is one below
 * a constant that the type holds: C has no negative literals.
 */
export function decimalConstant(value: bigint, signed: boolean): string {
  if (value >= 0n) return `${suffix(value, signed)}(${value})`;
  const above = -value - 1n;
  const macro = suffix(above, true);
  const isLeast = above === 0x7fffffffn || above === 0x7fffffffffffffffn;
  return isLeast ? `(-${macro}(${above}) - 1)` : `(-${macro}(${-value}))`;
}

/** One `#define` line; names of a block are padded to one width. */
export const define = (name: string, value: string, comment = ''): string =>
  `#define ${name} ${value}${comment === '' ? '' : ` /* ${comment} */`}`;

/** `#define` lines with their values in one column. */
export function defineBlock(entries: readonly { name: string; value: string; comment?: string }[]): string[] {
  const width = Math.max(0, ...entries.map(({ name }) => name.length));
  return entries.map(({ name, value, comment }) => define(name.padEnd(width), value, comment));
}
