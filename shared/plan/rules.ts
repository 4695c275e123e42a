import planSchema from '../../schemas/plan.schema.json';
import { keysOf } from './pointer';

/** What the schema says of one value of a plan. */
export interface Rule {
  type?: string;
  enum?: readonly (string | number)[];
  default?: unknown;
  minimum?: number;
  maximum?: number;
  exclusiveMinimum?: number;
  minItems?: number;
  maxItems?: number;
  pattern?: string;
  maxLength?: number;
}

interface SchemaNode extends Rule {
  $ref?: string;
  properties?: Record<string, SchemaNode>;
  items?: SchemaNode | false;
  anyOf?: SchemaNode[];
}

const definitions = planSchema.$defs as unknown as Record<string, SchemaNode>;

const resolved = (node: SchemaNode): SchemaNode =>
  node.$ref === undefined ? node : (definitions[node.$ref.replace('#/$defs/', '')] ?? {});

function childOf(node: SchemaNode, key: string): SchemaNode | undefined {
  const { properties, items } = resolved(node);
  const child = properties?.[key] ?? (items && /^(\d+|\*)$/.test(key) ? items : undefined);
  return child && resolved(child);
}

/** The schema's rule for the value at a pointer into a plan; undefined where a plan holds none. */
export function ruleAt(pointer: string): Rule | undefined {
  return keysOf(pointer).reduce<SchemaNode | undefined>(
    (node, key) => (node ? childOf(node, key) : undefined),
    planSchema as unknown as SchemaNode,
  );
}

/** The defaults of an object of the schema, nested ones included: what an empty form shows. */
export function defaultsAt(pointer: string): Record<string, unknown> {
  const node: SchemaNode | undefined = ruleAt(pointer);
  const entries = Object.entries(node?.properties ?? {}).map(([key, child]): [string, unknown] => [
    key,
    resolved(child).properties ? defaultsAt(`${pointer}/${key}`) : resolved(child).default,
  ]);
  return Object.fromEntries(entries.filter(([, value]) => value !== undefined));
}
