import { planFields, type PlanField } from '../../shared/plan/fields';
import { parseQuantity } from '../../shared/quantities/parse';
import { fieldUnits, type Unit } from '../../shared/quantities/units';
import { invalid, type Fault } from '../errors';

/** What was made of a quantity that was written with its unit. */
export interface Understood {
  /** JSON pointer into the plan. */
  pointer: string;
  written: string;
  /** How it was understood, in the unit of the field. */
  text: string;
}

type Quantity = PlanField & { unit: Exclude<Unit, ''> };

const isQuantity = (field: PlanField): field is Quantity => field.unit !== '' && field.unit in fieldUnits;

interface Place {
  pointer: string;
  holder: Record<string, unknown>;
  key: string;
}

const isHolder = (value: unknown): value is Record<string, unknown> => typeof value === 'object' && value !== null;

/** Every place of a tree that a pattern with `*` for the index of a stage leads to. */
function placesOf(pattern: string, root: Record<string, unknown>): Place[] {
  const keys = pattern.split('/').slice(1);
  let holders = [{ pointer: '', value: root as unknown }];
  for (const key of keys.slice(0, -1)) {
    holders = holders.flatMap(({ pointer, value }) => {
      if (!isHolder(value)) return [];
      const inner = key === '*' ? Object.keys(value) : [key];
      return inner.map((name) => ({ pointer: `${pointer}/${name}`, value: value[name] }));
    });
  }
  const key = keys.at(-1)!;
  return holders.flatMap(({ pointer, value }) =>
    isHolder(value) && Object.hasOwn(value, key) ? [{ pointer: `${pointer}/${key}`, holder: value, key }] : [],
  );
}

/**
 * Replaces quantities that are written as text, `1.2 MBd` or `±20 ppm`, by their numbers, in place.
 *
 * @param plan a description that was not checked yet
 * @returns what was understood, in the order of the sheet
 * @throws {AppError} invalid, for each text that is no quantity of its field or could be two
 */
export function readQuantities(plan: Record<string, unknown>): Understood[] {
  const understood: Understood[] = [];
  const faults: Fault[] = [];
  for (const field of planFields.filter(isQuantity)) {
    for (const { pointer, holder, key } of placesOf(field.pointer, plan)) {
      const written = holder[key];
      if (typeof written !== 'string') continue;
      const reading = parseQuantity(written, { unit: field.unit, symmetric: field.symmetric ?? false });
      if (reading.kind === 'value') {
        holder[key] = reading.value;
        understood.push({ pointer, written, text: reading.text });
      } else if (reading.kind === 'refused') faults.push({ pointer, detail: reading.reason });
      else if (reading.kind === 'doubt') faults.push({ pointer, detail: reading.question });
    }
  }
  if (faults.length > 0) throw invalid(faults);
  return understood;
}
