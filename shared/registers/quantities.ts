import type { Design } from '../model/design';
import type { Plan } from '../model/plan';
import type { CarrierWords, ClockWords } from '../model/words';
import { carrierDefinitions, clockDefinitions } from './loop-quantities';
import type { Definition, LoopName, LoopSource, Quantity, QuantityValue } from './quantity';
import { widthOf } from './quantity';
import { stageDefinitions } from './stage-quantities';

export type { LoopName, Quantity, QuantityValue } from './quantity';
export { widthOf } from './quantity';

/** The loops of a design; `digest` and findings are not needed. */
export type WorkedLoops = Pick<Design, 'carrier' | 'clock'>;

const pointerOf = (loop: LoopName, pointer: string): string =>
  pointer.startsWith('//') ? pointer.slice(1) : `/${loop}${pointer}`;

const quantityOf = (loop: LoopName, prefix: string, definition: Definition<never>): Quantity => ({
  path: `${prefix}.${definition.name}`,
  label: definition.label,
  signed: definition.signed ?? false,
  planPointer: pointerOf(loop, definition.pointer),
  ...(definition.choices && { choices: definition.choices }),
});

function valueOf<Source>(quantity: Quantity, definition: Definition<Source>, source: Source): QuantityValue {
  const read = definition.read(source);
  const choice = typeof read === 'string' ? read : undefined;
  const value = typeof read === 'string' ? BigInt(quantity.choices?.indexOf(read) ?? -1) : BigInt(read);
  // Checks of a map read neither width nor meaning.
  return {
    ...quantity,
    value,
    ...(choice !== undefined && { choice }),
    get widthBits() {
      return widthOf(value, quantity.signed);
    },
    get meaning() {
      return choice ?? definition.meaning?.(source) ?? '';
    },
    required: definition.required?.(source) ?? false,
  };
}

function stageValues(loop: LoopName, source: LoopSource): QuantityValue[] {
  return source.loop.stages.flatMap(({ name }, index) =>
    stageDefinitions.map((definition) => {
      const quantity = quantityOf(loop, `${loop}.${name}`, definition);
      const planPointer = quantity.planPointer.replace('*', String(index));
      return valueOf({ ...quantity, planPointer }, definition, { ...source, index });
    }),
  );
}

const loopValues = <W extends CarrierWords | ClockWords>(
  loop: LoopName,
  definitions: readonly Definition<LoopSource<W>>[],
  source: LoopSource<W>,
): QuantityValue[] => [
  ...stageValues(loop, source),
  ...definitions.map((definition) => valueOf(quantityOf(loop, loop, definition), definition, source)),
];

/**
 * Every quantity that the words of a plan give, carrier first, the stages of a loop before the rest, in an order
 * that depends on nothing but the plan's loops and stages.
 */
export function quantitiesOf({ plan, design }: { plan: Plan; design: WorkedLoops }): QuantityValue[] {
  const { carrier, clock } = design;
  const values: QuantityValue[] = [];
  if (carrier?.words.loop === 'carrier') {
    values.push(...loopValues('carrier', carrierDefinitions, { plan, loop: carrier, words: carrier.words }));
  }
  if (clock?.words.loop === 'clock') {
    values.push(...loopValues('clock', clockDefinitions, { plan, loop: clock, words: clock.words }));
  }
  return values;
}

const loopDefinitions = { carrier: carrierDefinitions, clock: clockDefinitions } as const;

/** Every quantity that a field can be bound to, for plans whose loops have these stages. */
export function quantityList(stages: readonly string[]): Quantity[] {
  return (['carrier', 'clock'] as const).flatMap((loop) => [
    ...stages.flatMap((stage) => stageDefinitions.map((each) => quantityOf(loop, `${loop}.${stage}`, each))),
    ...loopDefinitions[loop].map((each) => quantityOf(loop, loop, each)),
  ]);
}

const stagePattern = '[a-z][a-z0-9_]{0,30}';
const patterns = (['carrier', 'clock'] as const).map((loop) => {
  const names = (list: readonly { name: string }[]) => list.map(({ name }) => name.replace('.', '\\.')).join('|');
  return `${loop}\\.(${stagePattern}\\.(${names(stageDefinitions)})|${names(loopDefinitions[loop])})`;
});
const quantityPattern = new RegExp(`^(${patterns.join('|')})$`);

/** Whether a path addresses a quantity of some plan, whatever its stages are called. */
export const isQuantity = (path: string): boolean => quantityPattern.test(path);

/** The stage that a quantity's path names; undefined for a quantity of the loop as a whole. */
export function stageOf(path: string): string | undefined {
  const [loop, stage, ...rest] = path.split('.');
  const name = rest.join('.');
  const isStage = stageDefinitions.some((each) => each.name === name);
  return (loop === 'carrier' || loop === 'clock') && isStage ? stage : undefined;
}

/** A quantity by its path. */
export function quantityAt(path: string): Quantity | undefined {
  if (!isQuantity(path)) return undefined;
  const stage = stageOf(path);
  return quantityList(stage === undefined ? [] : [stage]).find((each) => each.path === path);
}
