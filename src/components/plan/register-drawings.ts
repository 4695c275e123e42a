import type { Design } from '../../../shared/model/design';
import type { RegisterMap } from '../../../shared/model/register-map';
import { registerValues, type RegisterValue } from '../../../shared/registers/binding';
import { hexText, wordBitsOf } from '../../../shared/registers/map';
import { quantitiesOf } from '../../../shared/registers/quantities';
import { fieldValueText } from '../target/field-value-text';

/** A register as KsRegister draws it. */
export interface RegisterDrawing {
  name: string;
  address: string;
  value: string;
  /** The word of the revision, where it differs. */
  was: string | undefined;
  width: number;
  /** `selected`: the draft writes something else into the field than the revision did. */
  fields: { name: string; high: number; low: number; value: string; selected: boolean }[];
  /** Holds gain words of the stage in use, which people compare first. */
  gains: boolean;
}

export interface RegisterSource {
  map: RegisterMap;
  /** Hexadecimal, `0x…`. */
  baseAddress: string;
  design: Design;
  /** The design of the revision that the draft starts from. */
  before: Design | undefined;
}

/** What a design writes into the registers of a map, register by register, beside what the revision wrote. */
export function registerDrawings({ map, baseAddress, design, before }: RegisterSource): RegisterDrawing[] {
  const old = new Map(before && valuesOf(map, before).map((value) => [value.register.name, value]));
  const bits = wordBitsOf(map);
  const inUse = stageInUse(design);
  return valuesOf(map, design).map((value) => ({
    ...drawing(value, old.get(value.register.name), baseAddress, bits),
    gains: value.fields.some(({ quantity }) => quantity?.path.startsWith(`${inUse}.`)),
  }));
}

/** Words of a design by register name, in the order of the map. */
export const wordsOf = (map: RegisterMap, design: Design): ReadonlyMap<string, string> =>
  new Map(valuesOf(map, design).map(({ register, value }) => [register.name, hexText(value, wordBitsOf(map))]));

const valuesOf = (map: RegisterMap, design: Design): RegisterValue[] =>
  registerValues(map, quantitiesOf({ plan: design.plan, design }));

/** Path of the last stage of the carrier loop, of the clock loop in a plan without one. */
function stageInUse({ carrier, clock }: Design): string {
  const stages = (carrier ?? clock)?.stages ?? [];
  return `${carrier ? 'carrier' : 'clock'}.${stages.at(-1)?.name}`;
}

type Drawing = Omit<RegisterDrawing, 'gains'>;

function drawing(now: RegisterValue, old: RegisterValue | undefined, base: string, width: number): Drawing {
  const { register, value, fields } = now;
  return {
    name: register.name,
    address: hexText(BigInt(base) + BigInt(register.offset), 32),
    value: hexText(value, width),
    was: old && old.value !== value ? hexText(old.value, width) : undefined,
    width,
    fields: fields.map((field, index) => ({
      ...{ name: field.field.name, high: field.field.high, low: field.field.low, value: fieldValueText(field) },
      selected: old !== undefined && old.fields[index]?.raw !== field.raw,
    })),
  };
}
