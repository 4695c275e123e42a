import { fieldUnits, prefixes, type Unit } from './units';

export interface NumberStyle {
  /** Digits behind the point, exactly. */
  decimals?: number | undefined;
  /** Significant digits; with `exponent` they are always all shown. */
  significant?: number | undefined;
  /** Writes 1.1935e−2. */
  exponent?: boolean | undefined;
  /** Writes + before a positive number. */
  sign?: boolean | undefined;
  /** Fewest digits before the point from which thousands are parted; default 4. */
  groupFrom?: number | undefined;
}

const minus = '\u2212';
const gap = '\u202f';

/**
 * A number as the sheet writes it: U+2212 for minus, U+202F between thousands, never −0. Without a style it is the
 * shortest text that reads back as the same number.
 */
export function numberText(value: number, style: NumberStyle = {}): string {
  const digits = digitsText(Math.abs(value), style);
  const negative = value < 0 && /[1-9]/.test(digits);
  const sign = negative ? minus : style.sign && value > 0 ? '+' : '';
  const [mantissa = '', exponent] = digits.split('e');
  const text = sign + groupThousands(mantissa, style.groupFrom ?? 4);
  return exponent === undefined ? text : `${text}e${exponent.replace('+', '').replace('-', minus)}`;
}

function digitsText(magnitude: number, { decimals, significant, exponent }: NumberStyle): string {
  if (exponent) return magnitude.toExponential(significant === undefined ? undefined : significant - 1);
  if (decimals !== undefined) return magnitude.toFixed(decimals);
  if (significant !== undefined) return shortestText(Number(magnitude.toPrecision(significant)));
  return shortestText(magnitude);
}

/** Like String(), but without its exponent between 1e-7 and 1e21. */
function shortestText(magnitude: number): string {
  const text = String(magnitude);
  const [mantissa = '', power] = text.split('e-');
  if (power === undefined || Number(power) > 15) return text;
  return magnitude.toFixed(Number(power) + (mantissa.split('.')[1]?.length ?? 0));
}

function groupThousands(mantissa: string, from: number): string {
  const [whole = '', fraction] = mantissa.split('.');
  const parted = whole.length < from ? whole : whole.replace(/\B(?=(\d{3})+$)/g, gap);
  return fraction === undefined ? parted : `${parted}.${fraction}`;
}

export interface QuantityStyle extends NumberStyle {
  unit: Unit;
  symmetric?: boolean | undefined;
  /** Fewest digits behind the point. */
  least?: number | undefined;
}

export interface QuantityParts {
  number: string;
  /** With its prefix: MBd. */
  unit: string;
  /** Power of ten of that unit against the one without a prefix; undefined for units that take none. */
  exponent: number | undefined;
}

/**
 * A quantity in the prefix that leaves one to three digits before the point: 27500000 Bd is 27.5 MBd.
 *
 * @param value in the unit of the field (a fraction when the unit is %)
 */
export function formatQuantity(value: number, style: QuantityStyle): QuantityParts {
  const { bare, held, prefixed } = fieldUnits[style.unit];
  const [prefix, exponent] = prefixed ? prefixFor(value) : ['', undefined];
  const shown = moveDecimals(value, held - (exponent ?? bare));
  const number = `${style.symmetric ? '±' : ''}${withLeast(shown, style)}`;
  return { number, unit: prefix + style.unit, exponent };
}

/** One unit for several quantities, so that they can be compared at a glance: the one that suits the largest. */
export function commonUnit(values: readonly number[], unit: Unit): { unit: string; exponent: number } {
  const [prefix, exponent] = prefixFor(Math.max(0, ...values.map(Math.abs)));
  return { unit: prefix + unit, exponent };
}

/** Number and unit in one text: `±77.5 kHz`, `45°`, `3.0° rms`. */
export function quantityText(value: number, style: QuantityStyle): string {
  const { number, unit } = formatQuantity(value, style);
  if (unit === '') return number;
  return unit.startsWith('°') ? number + unit : `${number} ${unit}`;
}

function withLeast(value: number, style: QuantityStyle): string {
  const text = numberText(value, style);
  const digits = text.split('.')[1]?.length ?? 0;
  return style.least !== undefined && digits < style.least && !text.includes('e')
    ? numberText(value, { ...style, decimals: style.least })
    : text;
}

function prefixFor(value: number): [string, number] {
  const magnitude = Math.abs(value);
  if (magnitude === 0 || !Number.isFinite(magnitude)) return ['', 0];
  const wanted = Math.min(12, Math.max(-12, 3 * Math.floor(Math.log10(magnitude) / 3 + 1e-12)));
  const prefix = Object.keys(prefixes).find((letter) => prefixes[letter] === wanted);
  return [prefix ?? '', prefix === undefined ? 0 : wanted];
}

/** value × 10^exponent by moving the point of its shortest text, so that 12.3 m stays 12.3. */
export function moveDecimals(value: number, exponent: number): number {
  const [mantissa = '', power = '0'] = String(value).split('e');
  return Number(`${mantissa}e${Number(power) + exponent}`);
}

/** The plain ASCII of what a sheet shows: for the clipboard and for files. */
export function plainText(text: string): string {
  return text
    .replace(/\u2212/g, '-')
    .replace(/[\u202f\u2009]/g, '')
    .replace(/\u00a0/g, ' ');
}
