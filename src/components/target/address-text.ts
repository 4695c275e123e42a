/** An address in groups of four digits, as people read it: `0x4001 0000`. */
export function addressText(address: string): string {
  const digits = address.replace(/^0x/i, '').toUpperCase();
  const groups = digits.match(/.{1,4}(?=(?:.{4})*$)/g) ?? [];
  return `0x${groups.join('\u202f')}`;
}
