import type { Fault } from './errors';

/** No description that people write is nested deeper. */
const deepest = 32;

// A lone surrogate has no UTF-8: the database would store another character, and the digest would be of something else.
const unstorable = (text: string): string | undefined => {
  if (text.includes('\u0000')) return 'must not hold the character U+0000';
  return /\p{Surrogate}/u.test(text) ? 'holds half of a character' : undefined;
};

const escaped = (key: string): string => key.replace(/~/g, '~0').replace(/\//g, '~1');

/** The first thing in a parsed body that could not be stored as it was sent; undefined when there is none. */
export function storageFault(value: unknown, pointer = '', depth = 0): Fault | undefined {
  if (depth > deepest) return { pointer, detail: `must not be nested deeper than ${deepest} levels` };
  if (typeof value === 'string') {
    const detail = unstorable(value);
    return detail ? { pointer, detail } : undefined;
  }
  if (typeof value !== 'object' || value === null) return undefined;
  for (const [key, inner] of Object.entries(value)) {
    const keyFault = unstorable(key);
    if (keyFault) return { pointer, detail: `has a key that ${keyFault}` };
    const fault = storageFault(inner, `${pointer}/${escaped(key)}`, depth + 1);
    if (fault) return fault;
  }
  return undefined;
}
