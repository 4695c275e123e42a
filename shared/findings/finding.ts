import { significantDown, significantUp } from '../math/significant';
import type { Finding } from '../model/design';
import { numberText, quantityText } from '../quantities/format';

export type Severity = Finding['severity'];

/** A finding with what most of them leave out. */
export type FindingParts = Pick<Finding, 'slug' | 'severity' | 'title' | 'reason' | 'fields' | 'source'> &
  Partial<Finding>;

export function finding(parts: FindingParts): Finding {
  return { value: null, limit: null, sense: null, unit: '', remedy: null, change: null, estimate: false, ...parts };
}

/** What a check says of a value within its limit: nothing is to be done. */
export const passed = (severity: Severity, sound: string, fault: string): string =>
  severity === 'pass' ? sound : fault;

/** An edit, and the sentence that names it. */
export interface Remedy {
  remedy: string;
  change: Finding['change'];
}

/** “Set 2.14 to 34 bits” as sentence and edit. */
export function setTo(no: string, pointer: string, value: string | number | boolean, text: string): Remedy {
  const label = `Set ${no} to ${text}`;
  return { remedy: `${label}.`, change: { pointer, value, label } };
}

/** The same edit, and in its sentence what is left to do after it. */
export const followedBy = ({ change }: Remedy, next: string): Remedy => ({
  remedy: `${change?.label}, then ${next}.`,
  change,
});

/** A remedy only where something is wrong. */
export const remedyUnless = (severity: Severity, make: () => Remedy | null): Partial<Remedy> =>
  severity === 'pass' ? {} : (make() ?? {});

/** A number in a sentence. */
export const say = (value: number, significant = 3): string => numberText(value, { significant });

/** A frequency in a sentence, with its prefix. */
export const sayHz = (value: number): string => quantityText(value, { unit: 'Hz', significant: 3 });

/** Largest number of two significant digits that is not above the value. */
export const twoDigitsDown = (value: number): number => significantDown(value, 2);

/** Smallest number of two significant digits that is not below the value. */
export const twoDigitsUp = (value: number): number => significantUp(value, 2);
