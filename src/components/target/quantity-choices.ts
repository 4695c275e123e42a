import type { Field, RegisterMap } from '../../../shared/model/register-map';
import { quantityAt, quantityList, stageOf } from '../../../shared/registers/quantities';
import type { FieldChange } from './map-edits';

export interface ChoiceGroup {
  label: string;
  paths: string[];
}

const usual = ['acquire', 'track'];

/** Stages that a field can be bound to: the usual two, those that the map binds already, those of the plan shown. */
export function stagesOf(map: RegisterMap, planStages: readonly string[] = []): string[] {
  const bound = map.registers.flatMap(({ fields }) => fields.flatMap(({ quantity }) => stageOf(quantity ?? '') ?? []));
  return [...new Set([...usual, ...bound, ...planStages])];
}

/** Every quantity in the groups of the choice list: a loop's stages first, then the loop as a whole. */
export function quantityChoices(stages: readonly string[]): ChoiceGroup[] {
  const groups = new Map<string, string[]>();
  for (const { path } of quantityList(stages)) {
    const [loop = ''] = path.split('.');
    const stage = stageOf(path);
    const label = stage === undefined ? loop : `${loop}, ${stage}`;
    groups.set(label, [...(groups.get(label) ?? []), path]);
  }
  return [...groups].map(([label, paths]) => ({ label, paths }));
}

/** What stands in the choice list for a field that holds no quantity. */
export const boundToNothing = '';
export const boundToConstant = 'constant';

export const choiceOf = ({ quantity, constant }: Field): string =>
  quantity ?? (constant === undefined ? boundToNothing : boundToConstant);

/**
 * The edit of a field that a choice makes. The coding follows the sign of the quantity; what belonged to the old
 * binding goes.
 */
export function bindingOf(choice: string): FieldChange {
  const bare = { quantity: undefined, constant: undefined, quantityLow: undefined, codes: undefined };
  if (choice === boundToNothing) return bare;
  if (choice === boundToConstant) return { ...bare, constant: 0 };
  const coding = quantityAt(choice)?.signed ? 'signed' : 'unsigned';
  return { ...bare, quantity: choice, coding };
}

/** Quantities that can be wider than one register, so that a field may hold a part of them. */
export const canSpan = (path: string): boolean => /\.(fcw|integratorLimit|nominalStep)$/.test(path);

/** What a field holds, in words: the quantity and its lowest bit, the constant, or nothing. */
export function boundText({ quantity, quantityLow, constant }: Field): string {
  if (quantity !== undefined) return quantityLow ? `${quantity} from bit ${quantityLow}` : quantity;
  return constant === undefined ? 'nothing, kept at reset' : `constant ${String(constant).replace('-', '−')}`;
}
