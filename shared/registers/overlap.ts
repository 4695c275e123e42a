import type { Change, Finding } from '../model/design';
import { rangeText } from './bits';
import type { PlacedField } from './field-checks';
import { mapFinding } from './map-finding';

const bitsText = (high: number, low: number): string => (high === low ? `bit ${low}` : `bits ${low} to ${high}`);

/** Ends the lower field below the upper one, where it then still has a bit. */
function shorten(upper: PlacedField, lower: PlacedField): Change | undefined {
  if (upper.field.low <= lower.field.low) return undefined;
  const high = upper.field.low - 1;
  return {
    pointer: `${lower.pointer}/high`,
    value: high,
    label: `Make ${lower.field.name} ${rangeText({ high, low: lower.field.low })}`,
  };
}

function overlapOf(a: PlacedField, b: PlacedField): Finding[] {
  const high = Math.min(a.field.high, b.field.high);
  const low = Math.max(a.field.low, b.field.low);
  if (high < low) return [];
  const [upper, lower] = a.field.low >= b.field.low ? [a, b] : [b, a];
  const change = shorten(upper, lower);
  const names = [upper, lower].map(({ field }) => `${field.name} is ${rangeText(field)}`).join(', ');
  return [
    mapFinding({
      slug: 'map.overlap',
      title: `Two fields claim ${bitsText(high, low)}`,
      reason: `${upper.register.name}: ${names}. The header would write one over the other.`,
      ...(change && { remedy: `${change.label}.`, change }),
      fields: [`${lower.pointer}/high`, `${upper.pointer}/low`],
    }),
  ];
}

/** One finding for each pair of fields of a register that claim a bit together. */
export const overlaps = (fields: readonly PlacedField[]): Finding[] =>
  fields.flatMap((a, index) => fields.slice(index + 1).flatMap((b) => overlapOf(a, b)));
