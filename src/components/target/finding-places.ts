import type { Finding } from '../../../shared/model/design';

/** Place of the register that a finding of the map begins with; undefined for the map as a whole. */
export function registerOf({ fields }: Finding): number | undefined {
  const index = /^\/registers\/(\d+)/.exec(fields[0] ?? '')?.[1];
  return index === undefined ? undefined : Number(index);
}

const concerns = (finding: Finding, pointer: string): boolean =>
  finding.fields.some((field) => field === pointer || field.startsWith(`${pointer}/`));

/** The worst state that any finding gives a register; undefined where none concerns it. */
export function worstAt(findings: readonly Finding[], index: number): 'fail' | 'caution' | undefined {
  const states = findings.filter((each) => concerns(each, `/registers/${index}`)).map(({ severity }) => severity);
  if (states.includes('fail')) return 'fail';
  return states.includes('caution') ? 'caution' : undefined;
}

/** Whether a failing finding names the value at a pointer. */
export const failsAt = (findings: readonly Finding[], pointer: string): boolean =>
  findings.some(({ severity, fields }) => severity === 'fail' && fields.includes(pointer));
