import { quantityText } from './format';
import { readNumeral } from './numeral';
import { fieldUnits, readUnit, type Dimension, type TypedUnit, type Unit } from './units';

/** A frequency or a rate that ratios of the field refer to: the carrier for ppm, the symbol rate for BnT. */
export interface Reference {
  /** Hz or Bd, above 0. */
  value: number;
  unit: 'Hz' | 'Bd';
}

export interface FieldOfQuantity {
  unit: Unit;
  /** Power of ten of the unit on the screen: 6 while the field shows MBd. A number typed alone is in that unit. */
  shownExponent?: number | undefined;
  reference?: Reference | undefined;
  /** The field holds both signs at once (±): the value is the magnitude. */
  symmetric?: boolean | undefined;
  integer?: boolean | undefined;
  /** Fewest digits behind the point in what is said to be understood. */
  least?: number | undefined;
}

export type Reading =
  | { kind: 'empty' }
  /** `value` in the field's unit; `text` says what was understood, with its unit. */
  | { kind: 'value'; value: number; text: string }
  /** Two readings: the person decides. */
  | { kind: 'doubt'; question: string }
  | { kind: 'refused'; reason: string };

const shape = /^(±|\+\/-|\+-)?\s*([+-]?)\s*(\d[\d., ]*|[.,]\d+)(?:e([+-]?\d+))?\s*(\D.*)?$/i;

/**
 * Reads a quantity as people type it: `27.5 MBd`, `27500 k`, `±20 ppm`, `20 kHz` in a ppm field that knows its
 * reference, decimal comma or point, U+2212 or ASCII minus. Powers of ten are moved in the decimal text, so `20 ppm`
 * is 20 to the last bit. Nothing is guessed: two readings come back as a question, a wrong unit as a refusal.
 *
 * @param text what stands in the field
 * @param field unit, sign and reference of the field
 * @example parseQuantity('27500 k', { unit: 'Bd' }) // => { kind: 'value', value: 27.5e6, text: '27.5 MBd' }
 */
export function parseQuantity(text: string, field: FieldOfQuantity): Reading {
  const typed = tidy(text);
  if (typed === '') return { kind: 'empty' };
  const [, both, sign = '', digits = '', power = '0', unitText = ''] = shape.exec(typed) ?? [];
  if (digits === '') return refused(`“${text.trim()}” is not a number`);
  if (both && !field.symmetric) return refused('This field holds one value, not both signs');
  if (field.symmetric && sign === '-') return refused('Both signs are meant: type the magnitude');
  const numeral = readNumeral(digits);
  if (numeral.kind === 'doubt') return numeral;
  if (numeral.kind === 'unreadable') return refused(`“${digits.trim()}” does not read as one number`);
  return inUnit(`${sign === '-' ? '-' : ''}${numeral.digits}`, Number(power), unitText.trim(), field);
}

const tidy = (text: string): string =>
  text
    .replace(/[\u2212\u2013]/g, '-')
    .replace(/[\u00a0\u2009\u202f]/g, ' ')
    .trim();

function inUnit(digits: string, power: number, unitText: string, field: FieldOfQuantity): Reading {
  const unit = unitText === '' ? bareUnit(field) : readUnit(unitText);
  if (unit.kind === 'doubt') return unit;
  if (unit.kind === 'unknown') return refused(`“${unitText}” is not a unit that this field knows`);
  const converted = convert(digits, power, unit, field);
  if (typeof converted === 'string') return refused(`${unitText} ${converted}`);
  return understood(converted, field);
}

function bareUnit({ unit, shownExponent }: FieldOfQuantity): TypedUnit {
  const { dimension, bare } = fieldUnits[unit];
  return { kind: 'unit', dimension, exponent: shownExponent ?? bare, factor: 1 };
}

interface Converted {
  value: number;
  /** Set when a reference was used: the sentence then names it. */
  by?: Reference | undefined;
  /** Digits worth saying of a value that a conversion leaves with many; all of it is held. */
  significant?: number;
}

type Known = Exclude<TypedUnit, { kind: 'doubt' | 'unknown' }>;

function convert(digits: string, power: number, typed: Known, field: FieldOfQuantity): Converted | string {
  const own = fieldUnits[field.unit];
  if (typed.kind === 'prefix') return { value: shift(digits, power + typed.exponent + own.bare - own.held) };
  const base = shift(digits, power + typed.exponent) * typed.factor;
  if (typed.dimension === own.dimension) {
    if (typed.factor !== 1) return { value: base, significant: 5 };
    return { value: shift(digits, power + typed.exponent - own.held) };
  }
  return convertByReference(base, typed.dimension, field);
}

function convertByReference(base: number, typed: Dimension, field: FieldOfQuantity): Converted | string {
  const { dimension, held } = fieldUnits[field.unit];
  const takes = `is ${typed === 'angle' ? 'an' : 'a'} ${typed}; this field takes ${field.unit === '' ? 'a plain number' : field.unit}`;
  const { reference } = field;
  if (!reference || !(reference.value > 0)) return takes;
  const rateLike: readonly Dimension[] = ['frequency', 'symbol rate'];
  // A baud is a share of a symbol rate, but neither of a carrier nor a bandwidth.
  const share = typed === 'frequency' || (typed === 'symbol rate' && reference.unit === 'Bd' && field.unit === 'ppm');
  if (dimension === 'ratio' && share) {
    return { value: (base / reference.value) * 10 ** -held, by: reference, significant: 5 };
  }
  if (rateLike.includes(dimension) && typed === 'ratio')
    return { value: base * reference.value, by: reference, significant: 5 };
  if (dimension === 'number of symbols' && typed === 'time')
    return { value: base * reference.value, by: reference, significant: 5 };
  return takes;
}

function understood({ value, by, significant }: Converted, field: FieldOfQuantity): Reading {
  if (!Number.isFinite(value)) return refused('That number is out of every range');
  if (field.integer && !Number.isInteger(value)) return refused('This field takes a whole number');
  const clean = value === 0 ? 0 : value;
  const text = quantityText(clean, { unit: field.unit, symmetric: field.symmetric, least: field.least, significant });
  return { kind: 'value', value: clean, text: by ? `${text} of ${quantityText(by.value, { unit: by.unit })}` : text };
}

/** digits × 10^exponent, rounded once by Number() instead of by every product on the way. */
const shift = (digits: string, exponent: number): number => Number(`${digits}e${exponent}`);

const refused = (reason: string): Reading => ({ kind: 'refused', reason });
