/** What every row with a fixed or free text choice has in common. */
export interface ChoiceProps {
  number?: string | undefined;
  label: string;
  /** What the server says is wrong. */
  error?: string | undefined;
  note?: string | undefined;
  disabled?: boolean | undefined;
  /** Name of the last revision; set, the row compares with `was`. */
  wasName?: string | undefined;
  inputId?: string | undefined;
}

export interface Option<T> {
  value: T;
  label: string;
  disabled?: boolean | undefined;
}

/** "was saturate in r14", undefined while nothing is edited. */
export function wasSentence<T>(
  now: T | undefined,
  { was, wasName }: { was?: T | undefined; wasName?: string | undefined },
  nameOf: (value: T) => string,
): string | undefined {
  if (wasName === undefined || now === was) return undefined;
  return `was ${was === undefined || was === '' ? 'empty' : nameOf(was)} in ${wasName}`;
}
