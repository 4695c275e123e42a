import { load, YAMLException } from 'js-yaml';

/** Text that is neither YAML nor JSON, with the line at which reading stopped. */
export class MapTextError extends Error {
  override readonly name = 'MapTextError';

  constructor(
    message: string,
    readonly line: number | null,
    options?: ErrorOptions,
  ) {
    super(message, options);
  }
}

/**
 * Reads a register map from YAML (of which JSON is a part). Only the syntax is checked; the shape is the schema's.
 *
 * @throws {MapTextError} with the line
 */
export function parseMapText(text: string): unknown {
  try {
    // A map needs few aliases, if any; a text made to grow when it is written out again has many.
    return load(text, { maxAliases: 64 });
  } catch (error) {
    if (!(error instanceof YAMLException)) throw error;
    const line = error.mark ? error.mark.line + 1 : null;
    throw new MapTextError(line === null ? error.reason : `Line ${line}: ${error.reason}.`, line, { cause: error });
  }
}
