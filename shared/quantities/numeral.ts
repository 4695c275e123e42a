export type Numeral =
  { kind: 'number'; digits: string } | { kind: 'doubt'; question: string; readings: string[] } | { kind: 'unreadable' };

const grouped = (separator: string): RegExp => new RegExp(`^\\d{1,3}(${separator}\\d{3})+$`);

/**
 * Reads an unsigned numeral with a decimal comma or point and thousands parted by spaces, commas or points.
 * One comma before exactly three digits has two readings (1,234), so it is put back as a question. A single point
 * is always the decimal point: that is how every number is written on the screen.
 *
 * @returns `digits` as Number() takes them
 */
export function readNumeral(text: string): Numeral {
  const closed = closeSpaces(text.trim());
  if (closed === undefined) return { kind: 'unreadable' };
  const spaced = closed !== text.trim();
  const commas = closed.split(',').length - 1;
  const points = closed.split('.').length - 1;
  if (commas === 0) return readSeparated(closed, points, '.');
  if (points > 0) return readMixed(closed);
  if (commas === 1 && !spaced && /^[1-9]\d{0,2},\d{3}$/.test(closed)) return ask(closed);
  return readSeparated(closed, commas, ',');
}

function closeSpaces(text: string): string | undefined {
  if (!text.includes(' ')) return text;
  return /^\d{1,3}( \d{3})+([.,]\d+)?$/.test(text) ? text.replaceAll(' ', '') : undefined;
}

function readSeparated(text: string, count: number, separator: ',' | '.'): Numeral {
  if (count <= 1) return digitsOf(text.replace(separator, '.'));
  return grouped(`\\${separator}`).test(text) ? digitsOf(text.replaceAll(separator, '')) : { kind: 'unreadable' };
}

function readMixed(text: string): Numeral {
  const decimal = text.lastIndexOf(',') > text.lastIndexOf('.') ? ',' : '.';
  const group = decimal === ',' ? '.' : ',';
  const [whole = '', fraction = '', more] = text.split(decimal);
  if (more !== undefined || !grouped(`\\${group}`).test(whole)) return { kind: 'unreadable' };
  return digitsOf(`${whole.replaceAll(group, '')}.${fraction}`);
}

function ask(text: string): Numeral {
  const readings = [text.replace(',', '.'), text.replace(',', '')];
  return { kind: 'doubt', question: `${text}: ${readings[0]} or ${readings[1]}? Type one of them`, readings };
}

const digitsOf = (digits: string): Numeral =>
  /^(\d+\.?\d*|\.\d+)$/.test(digits) ? { kind: 'number', digits } : { kind: 'unreadable' };
