/** A moment as the API writes it. */
export const iso = (date: Date): string => date.toISOString();

export const isoOrNull = (date: Date | null): string | null => date && date.toISOString();

/** Reads a column that holds JSON: some versions of the driver parse it, some hand over the text. */
export const parsed = <T>(column: unknown): T => (typeof column === 'string' ? JSON.parse(column) : column) as T;

/** Puts `%` and `_` into a LIKE pattern as what they are. */
export const likeText = (text: string): string => `%${text.replace(/[\\%_]/g, '\\$&')}%`;
