/** An integer as it is typed: decimal or `0x…`, with either minus sign, digits parted by spaces or underscores. */
export function parseInteger(text: string): number | undefined {
  const plain = text.replace(/[\s_\u202f]/g, '').replace(/^[\u2212\u2013]/, '-');
  if (!/^-?(\d+|0x[0-9a-f]+)$/i.test(plain)) return undefined;
  const magnitude = Number(plain.replace('-', ''));
  const value = plain.startsWith('-') ? -magnitude : magnitude;
  return Number.isSafeInteger(value) ? value + 0 : undefined;
}

/** The same integer on the screen: hexadecimal with the digits of `hexBits`, else decimal with a real minus sign. */
export function integerText(value: number | undefined, hexBits?: number): string {
  if (value === undefined) return '';
  if (hexBits === undefined || value < 0) return String(value).replace('-', '−');
  return `0x${value
    .toString(16)
    .toUpperCase()
    .padStart(Math.ceil(hexBits / 4), '0')}`;
}

/** An input whose text is no integer, by its id; without a sentence once it can be read again. */
export interface Misread {
  id: string;
  sentence: string | undefined;
}
