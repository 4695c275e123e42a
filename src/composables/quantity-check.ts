import { quantityText, type QuantityStyle } from '../../shared/quantities/format';
import { parseQuantity, type FieldOfQuantity, type Reading } from '../../shared/quantities/parse';
import type { Unit } from '../../shared/quantities/units';

export interface Bounds {
  label: string;
  unit: Unit;
  symmetric?: boolean | undefined;
  min?: number | undefined;
  max?: number | undefined;
  optional?: boolean | undefined;
}

export interface Checked {
  reading: Reading;
  /** One sentence; undefined when the text stands for a permitted value. */
  fault: string | undefined;
}

/** Reads a text and says in one sentence what is wrong with it: the permitted range and, where known, the likely intent. */
export function checkQuantity(text: string, field: FieldOfQuantity, bounds: Bounds): Checked {
  const reading = parseQuantity(text, field);
  return { reading, fault: faultOf(reading, bounds) };
}

function faultOf(reading: Reading, bounds: Bounds): string | undefined {
  if (reading.kind === 'empty') return bounds.optional ? undefined : `${bounds.label} needs a value.`;
  if (reading.kind === 'doubt') return `${reading.question}.`;
  if (reading.kind === 'refused') return `${reading.reason}.`;
  return outside(reading.value, bounds) ? rangeSentence(reading.value, bounds) : undefined;
}

const outside = (value: number, { min = -Infinity, max = Infinity }: Bounds): boolean => value < min || value > max;

function rangeSentence(value: number, bounds: Bounds): string {
  const { label, min, max } = bounds;
  const say = (limit: number) => quantityText(limit, { unit: bounds.unit });
  const range =
    min === undefined
      ? `is at most ${say(max!)}`
      : max === undefined
        ? `is at least ${say(min)}`
        : `lies between ${say(min)} and ${say(max)}`;
  const meant = likelyIntent(value, bounds);
  return `${label} ${range}.${meant === undefined ? '' : ` Did you mean ${quantityText(meant, styleOf(bounds))}?`}`;
}

/** A slip of a prefix or of a percent sign that would bring the value into a range with two ends. */
function likelyIntent(value: number, bounds: Bounds): number | undefined {
  if (bounds.min === undefined || bounds.max === undefined) return undefined;
  // 35 in a ratio is 35 %; 1.35 is a slip of another kind, and which one cannot be known.
  const slips = bounds.unit !== '' ? [1e-3, 1e3, 1e-6, 1e6] : value >= 5 ? [1e-2] : [];
  const scaled = bounds.unit === '' || ['Hz', 'Bd', 'Hz/s'].includes(bounds.unit);
  return scaled ? slips.map((slip) => value * slip).find((meant) => meant !== 0 && !outside(meant, bounds)) : undefined;
}

const styleOf = ({ unit, symmetric }: Bounds): QuantityStyle => ({ unit, symmetric, significant: 6 });
