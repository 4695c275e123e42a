import type { RegisterMap } from '../model/register-map';

type Node = Record<string, unknown>;

const isNode = (value: unknown): value is Node => typeof value === 'object' && value !== null && !Array.isArray(value);

/** Keys of a node that must hold a value of one type, absent ones aside. */
function wrongKey(node: Node, keys: Record<string, 'string' | 'integer'>): string | undefined {
  return Object.entries(keys).find(([key, type]) => {
    const value = node[key];
    return value !== undefined && (type === 'integer' ? !Number.isSafeInteger(value) : typeof value !== type);
  })?.[0];
}

const registerKeys = {
  name: 'string',
  offset: 'integer',
  access: 'string',
  note: 'string',
  reserved: 'integer',
} as const;
const fieldKeys = {
  name: 'string',
  high: 'integer',
  low: 'integer',
  quantity: 'string',
  quantityLow: 'integer',
  constant: 'integer',
  coding: 'string',
  reset: 'integer',
} as const;

function nodeFault(value: unknown, at: string, keys: Record<string, 'string' | 'integer'>, needed: string[]) {
  if (!isNode(value)) return `${at} is no mapping of keys to values.`;
  const missing = needed.find((key) => value[key] === undefined);
  if (missing) return `${at} has no ${missing}.`;
  const wrong = wrongKey(value, keys);
  return wrong && `${at}/${wrong} is no ${keys[wrong] === 'integer' ? 'whole number' : 'text'}.`;
}

function registerFault(value: unknown, at: string): string | undefined {
  const fault = nodeFault(value, at, registerKeys, ['name', 'offset', 'fields']);
  if (fault) return fault;
  const { fields } = value as Node;
  if (!Array.isArray(fields)) return `${at}/fields is no list.`;
  return firstFault(fields, (field, index) =>
    nodeFault(field, `${at}/fields/${index}`, fieldKeys, ['name', 'high', 'low']),
  );
}

function firstFault(items: unknown[], check: (item: unknown, index: number) => string | undefined): string | undefined {
  for (const [index, item] of items.entries()) {
    const fault = check(item, index);
    if (fault) return fault;
  }
  return undefined;
}

/**
 * Whether a value read from a file can be shown as a register map: what a form needs, no more. The schema decides
 * when it is saved.
 *
 * @returns the map, or one sentence that names the place of the first fault
 */
export function asRegisterMap(value: unknown): RegisterMap | string {
  const map = isNode(value) && isNode(value.registerMap) ? value.registerMap : value;
  if (!isNode(map) || !Array.isArray(map.registers)) return 'The file has no list of registers.';
  if (map.wordBits !== undefined && ![8, 16, 32].includes(map.wordBits as number)) return '/wordBits is 8, 16 or 32.';
  const fault = firstFault(map.registers, (register, index) => registerFault(register, `/registers/${index}`));
  return fault ?? (map as unknown as RegisterMap);
}
