/**
 * A number or a choice outside the range of a formula. `parameter` is a JSON pointer into the plan when the
 * fault lies in a plan (`/carrier/stages/0/damping`), otherwise the name of the function's own field.
 */
export class ParameterError extends Error {
  override readonly name = 'ParameterError';

  constructor(
    readonly parameter: string,
    message: string,
  ) {
    super(message);
  }
}

/** Throws a ParameterError naming the first field that is not a finite number above 0. */
export function requirePositive(fields: Record<string, number>): void {
  for (const [parameter, value] of Object.entries(fields)) {
    if (!(Number.isFinite(value) && value > 0)) {
      throw new ParameterError(parameter, `${parameter} must be a finite number above 0`);
    }
  }
}
