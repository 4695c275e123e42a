import { Ajv2020 } from 'ajv/dist/2020.js';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import designSchema from '../../schemas/design.schema.json';
import planSchema from '../../schemas/plan.schema.json';
import wordsSchema from '../../schemas/words.schema.json';
import { workOut } from '../../shared/design';
import { ParameterError } from '../../shared/parameter-error';
import { fieldOf } from '../../shared/plan/fields';
import { anyPlan } from './any-plan';
import type { SchemaNode } from './any-plan';

const seed = 20261201;
const validDesign = new Ajv2020({ strict: false }).addSchema([planSchema, wordsSchema]).compile(designSchema);
const digest = '0'.repeat(64);

/** The first number in a design that is not finite. */
function notFinite(value: unknown, path = ''): string | undefined {
  if (typeof value === 'number') return Number.isFinite(value) ? undefined : path;
  if (typeof value !== 'object' || value === null) return undefined;
  for (const [key, inner] of Object.entries(value)) {
    const found = notFinite(inner, `${path}/${key}`);
    if (found) return found;
  }
  return undefined;
}

/** Pointers of every value that a schema can hold, `*` for an index. */
function pointersOf(node: SchemaNode, pointer = ''): string[] {
  const target = node.$ref
    ? (planSchema.$defs as Record<string, SchemaNode>)[node.$ref.slice('#/$defs/'.length)]!
    : node;
  const children = [
    ...Object.entries(target.properties ?? {}).map(([key, child]): [string, SchemaNode] => [key, child]),
    ...(target.items ? [['*', target.items] as [string, SchemaNode]] : []),
    ...(target.prefixItems ?? []).map((child): [string, SchemaNode] => ['*', child]),
  ];
  const alternatives = (target.anyOf ?? []).flatMap((each) => pointersOf(each, pointer));
  return [pointer, ...children.flatMap(([key, child]) => pointersOf(child, `${pointer}/${key}`)), ...alternatives];
}

/** The same of a value. */
function keysIn(value: unknown, pointer = ''): string[] {
  if (typeof value !== 'object' || value === null) return [pointer];
  const at = (key: string) => `${pointer}/${Array.isArray(value) ? '*' : key}`;
  return [pointer, ...Object.entries(value).flatMap(([key, inner]) => keysIn(inner, at(key)))];
}

describe('any plan that the schema accepts', () => {
  it('has every key of the schema', () => {
    const seen = new Set(fc.sample(anyPlan, { numRuns: 200, seed }).flatMap((plan) => keysIn(plan)));
    expect(pointersOf(planSchema as unknown as SchemaNode).filter((pointer) => !seen.has(pointer))).toEqual([]);
  });

  it('gives a design of finite numbers in the shape of its schema, or points at a field that it cannot be worked out for', () => {
    let workedOut = 0;
    fc.assert(
      fc.property(anyPlan, (plan) => {
        try {
          const design = { ...workOut(plan), digest };
          expect(notFinite(design)).toBeUndefined();
          expect(validDesign(design), JSON.stringify(validDesign.errors)).toBe(true);
          workedOut += 1;
        } catch (error) {
          if (!(error instanceof ParameterError)) throw error;
          expect(fieldOf(error.parameter), `${error.parameter}: ${error.message}`).toBeDefined();
        }
      }),
      { numRuns: 400, seed },
    );
    expect(workedOut).toBeGreaterThan(20);
  }, 60_000);
});
