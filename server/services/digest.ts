import { createHash } from 'node:crypto';
import canonicalize from 'canonicalize';

/** SHA-256 of a text in UTF-8, hex. */
export const sha256 = (text: string): string => createHash('sha256').update(text, 'utf8').digest('hex');

/** The one way to write a JSON value: RFC 8785. */
export function canonicalJson(value: object): string {
  const text = canonicalize(value);
  if (text === undefined) throw new Error('the value has no JSON');
  return text;
}

/** SHA-256 over the canonical JSON of a value, hex. */
export const digestOf = (value: object): string => sha256(canonicalJson(value));
