import type { ErrorObject } from 'ajv';
import type { Fault } from './errors';

/** A form shows one fault at a field, and nobody reads more than this many. */
const most = 50;

const escaped = (key: string): string => key.replace(/~/g, '~0').replace(/\//g, '~1');

const listed = (values: unknown[]): string => values.map((value) => String(value)).join(', ');

type Sentence = (params: Record<string, unknown>) => string;

const sentences: Record<string, Sentence> = {
  required: () => 'is missing',
  additionalProperties: () => 'is not a key of this description',
  type: ({ type }) => `must be ${([] as unknown[]).concat(type).map(String).join(' or ')}`,
  enum: ({ allowedValues }) => `must be one of ${listed(allowedValues as unknown[])}`,
  const: ({ allowedValue }) => `must be ${String(allowedValue)}`,
  minimum: ({ limit }) => `must be at least ${String(limit)}`,
  maximum: ({ limit }) => `must be at most ${String(limit)}`,
  exclusiveMinimum: ({ limit }) => `must be above ${String(limit)}`,
  exclusiveMaximum: ({ limit }) => `must be below ${String(limit)}`,
  minLength: ({ limit }) => (limit === 1 ? 'must not be empty' : `must have at least ${String(limit)} characters`),
  maxLength: ({ limit }) => `must have at most ${String(limit)} characters`,
  minItems: ({ limit }) => `must have at least ${String(limit)} entries`,
  maxItems: ({ limit }) => `must have at most ${String(limit)} entries`,
  uniqueItems: () => 'must not hold the same value twice',
  minProperties: () => 'must have at least one key',
  maxProperties: ({ limit }) => `must have at most ${String(limit)} keys`,
  pattern: () => 'is not written as it must be',
  propertyNames: () => 'has a key that is not allowed',
  anyOf: () => 'does not have one of the allowed forms',
  oneOf: () => 'does not have one of the allowed forms',
};

function pointerOf({ instancePath, params }: ErrorObject): string {
  const key = (params.missingProperty ?? params.additionalProperty) as string | undefined;
  return key === undefined ? instancePath : `${instancePath}/${escaped(key)}`;
}

const detailOf = ({ keyword, params, message }: ErrorObject): string =>
  sentences[keyword]?.(params) ?? message ?? 'cannot be accepted';

/** What the alternatives of an anyOf say one by one confuses; what the whole says comes after them and stays. */
const withoutAlternatives = (errors: readonly ErrorObject[]): ErrorObject[] =>
  errors.filter(({ schemaPath, keyword }) => keyword !== 'if' && !/\/(anyOf|oneOf)\/\d+\//.test(schemaPath));

/**
 * The faults that a check found, one for each place.
 *
 * @param errors of Ajv, with allErrors
 * @param within name of a key of the body that pointers begin below: faults of a plan point into the plan
 */
export function schemaFaults(errors: readonly ErrorObject[], within?: string): Fault[] {
  const byPointer = new Map<string, Fault>();
  for (const error of withoutAlternatives(errors)) {
    const whole = pointerOf(error);
    const pointer = within && whole.startsWith(`/${within}/`) ? whole.slice(within.length + 1) : whole;
    if (byPointer.size < most && !byPointer.has(pointer)) byPointer.set(pointer, { pointer, detail: detailOf(error) });
  }
  return [...byPointer.values()];
}
