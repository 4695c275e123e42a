import { AppError, conflict, invalid } from './errors';

interface DatabaseError {
  code: string;
  errno: number;
  sqlState: string;
  sqlMessage: string;
}

const isDatabaseError = (error: unknown): error is DatabaseError =>
  error instanceof Error && 'sqlState' in error && 'code' in error;

/** The database's own name of an error (`ER_DUP_ENTRY`), undefined when the error is not one of the database. */
export const databaseCode = (error: unknown): string | undefined => (isDatabaseError(error) ? error.code : undefined);

const titles: Record<string, string> = {
  ER_DUP_ENTRY: 'Something with this name exists already.',
  ER_ROW_IS_REFERENCED_2: 'Something else still refers to this.',
  ER_NO_REFERENCED_ROW_2: 'Something that this refers to does not exist any more.',
  ER_LOCK_DEADLOCK: 'Somebody else changed the same thing at this moment. Try again.',
  ER_LOCK_WAIT_TIMEOUT: 'Somebody else is changing the same thing. Try again.',
};

const unfit = new Set([
  'ER_DATA_TOO_LONG',
  'ER_WARN_DATA_OUT_OF_RANGE',
  'ER_TRUNCATED_WRONG_VALUE_FOR_FIELD',
  'ER_TRUNCATED_WRONG_VALUE',
]);

/** A failed CHECK, ER_CONSTRAINT_FAILED of MariaDB; the driver calls the number by what it is in MySQL. */
const constraintFailed = 4025;

/** A refusal by the database that the caller can act on; undefined for everything else, which is a defect. */
export function asDatabaseRefusal(error: unknown): AppError | undefined {
  if (!isDatabaseError(error)) return undefined;
  // Triggers guard what may never change; their sentence is written for people.
  if (error.sqlState === '45000') return conflict(error.sqlMessage, error);
  if (unfit.has(error.code) || error.errno === constraintFailed)
    return invalid([{ pointer: '', detail: 'does not fit what can be stored' }], error);
  const title = titles[error.code];
  return title ? conflict(title, error) : undefined;
}
