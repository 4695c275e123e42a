/**
 * Units a field can be in. The value behind a field is in the unit itself, except `%`, whose value is the fraction
 * (0.01 is shown as 1 %), and `''`, which is dimensionless.
 */
export type Unit =
  | 'Hz'
  | 'Bd'
  | 'Hz/s'
  | 'ppm'
  | '%'
  | 'dB'
  | 'dBc/Hz'
  | '°'
  | '° rms'
  | 'bits'
  | 'symbol'
  | 'symbols'
  | 'updates'
  | 'samples'
  | '';

export type Dimension =
  | 'frequency'
  | 'symbol rate'
  | 'frequency drift'
  | 'ratio'
  | 'level'
  | 'noise density'
  | 'angle'
  | 'number of bits'
  | 'number of symbols'
  | 'number of updates'
  | 'number of samples'
  | 'time';

export interface UnitOfField {
  dimension: Dimension;
  /** Power of ten of the value behind the field, in the dimension's base unit. */
  held: number;
  /** Power of ten of a number typed without a unit. */
  bare: number;
  /** True when the unit takes prefixes on the screen (MBd, kHz). */
  prefixed: boolean;
}

const plain = (dimension: Dimension): UnitOfField => ({ dimension, held: 0, bare: 0, prefixed: false });
const prefixed = (dimension: Dimension): UnitOfField => ({ dimension, held: 0, bare: 0, prefixed: true });

export const fieldUnits: Record<Unit, UnitOfField> = {
  Hz: prefixed('frequency'),
  Bd: prefixed('symbol rate'),
  'Hz/s': prefixed('frequency drift'),
  ppm: { dimension: 'ratio', held: -6, bare: -6, prefixed: false },
  '%': { dimension: 'ratio', held: 0, bare: -2, prefixed: false },
  '': plain('ratio'),
  dB: plain('level'),
  'dBc/Hz': plain('noise density'),
  '°': plain('angle'),
  '° rms': plain('angle'),
  bits: plain('number of bits'),
  symbol: plain('number of symbols'),
  symbols: plain('number of symbols'),
  updates: plain('number of updates'),
  samples: plain('number of samples'),
};

/** SI prefixes that a field reads and writes, as powers of ten. */
export const prefixes: Readonly<Record<string, number>> = { p: -12, n: -9, µ: -6, m: -3, k: 3, M: 6, G: 9, T: 12 };

const prefixAlso: Readonly<Record<string, string>> = { μ: 'µ', u: 'µ', K: 'k', g: 'G' };

interface Spelling {
  dimension: Dimension;
  exponent: number;
  /** Multiplies beside the power of ten: degrees in a radian. */
  factor?: number;
  prefixed?: true;
}

const spellings: Readonly<Record<string, Spelling>> = {
  hz: { dimension: 'frequency', exponent: 0, prefixed: true },
  bd: { dimension: 'symbol rate', exponent: 0, prefixed: true },
  baud: { dimension: 'symbol rate', exponent: 0, prefixed: true },
  'sym/s': { dimension: 'symbol rate', exponent: 0, prefixed: true },
  'symbols/s': { dimension: 'symbol rate', exponent: 0, prefixed: true },
  'hz/s': { dimension: 'frequency drift', exponent: 0, prefixed: true },
  s: { dimension: 'time', exponent: 0, prefixed: true },
  ppm: { dimension: 'ratio', exponent: -6 },
  ppb: { dimension: 'ratio', exponent: -9 },
  '%': { dimension: 'ratio', exponent: -2 },
  db: { dimension: 'level', exponent: 0 },
  'dbc/hz': { dimension: 'noise density', exponent: 0 },
  dbc: { dimension: 'noise density', exponent: 0 },
  '°': { dimension: 'angle', exponent: 0 },
  deg: { dimension: 'angle', exponent: 0 },
  degree: { dimension: 'angle', exponent: 0 },
  degrees: { dimension: 'angle', exponent: 0 },
  '° rms': { dimension: 'angle', exponent: 0 },
  'deg rms': { dimension: 'angle', exponent: 0 },
  rad: { dimension: 'angle', exponent: 0, factor: 180 / Math.PI, prefixed: true },
  bit: { dimension: 'number of bits', exponent: 0 },
  bits: { dimension: 'number of bits', exponent: 0 },
  symbol: { dimension: 'number of symbols', exponent: 0 },
  symbols: { dimension: 'number of symbols', exponent: 0 },
  update: { dimension: 'number of updates', exponent: 0 },
  updates: { dimension: 'number of updates', exponent: 0 },
  sample: { dimension: 'number of samples', exponent: 0 },
  samples: { dimension: 'number of samples', exponent: 0 },
};

export type TypedUnit =
  | { kind: 'unit'; dimension: Dimension; exponent: number; factor: number }
  | { kind: 'prefix'; exponent: number }
  | { kind: 'doubt'; question: string }
  | { kind: 'unknown' };

/** Reads what stands behind a number: `MBd`, `khz`, `k`, `ppm`. Case is forgiven except where m and M differ. */
export function readUnit(text: string): TypedUnit {
  const lone = exponentOf(text);
  if (text === 'm') return { kind: 'doubt', question: 'm is milli and M is mega: type one of them with the unit' };
  if (lone !== undefined) return { kind: 'prefix', exponent: lone };
  const whole = spellings[text.toLowerCase()];
  if (whole) return unitOf(whole, 0);
  return readPrefixedUnit(text);
}

function readPrefixedUnit(text: string): TypedUnit {
  const [first = '', rest] = [text[0], text.slice(1).trim()];
  const exponent = exponentOf(first);
  const spelling = spellings[rest.toLowerCase()];
  if (exponent === undefined || !spelling?.prefixed) return { kind: 'unknown' };
  // `mhz` may stand for either; `mHz` and `MHz` are what they say.
  if (first === 'm' && /^[hb]/.test(rest)) {
    const proper = rest[0]!.toUpperCase() + rest.slice(1);
    return { kind: 'doubt', question: `${text}: M${proper} or m${proper}? Type one of them` };
  }
  return unitOf(spelling, exponent);
}

const exponentOf = (letter: string): number | undefined => prefixes[prefixAlso[letter] ?? letter];

const unitOf = (spelling: Spelling, prefix: number): TypedUnit => ({
  kind: 'unit',
  dimension: spelling.dimension,
  exponent: spelling.exponent + prefix,
  factor: spelling.factor ?? 1,
});
