// Generated from schemas/problem.schema.json; do not edit.

/**
 * Problem details, RFC 9457.
 */
export interface Problem {
  /**
   * /problems/ and the kind.
   */
  type: string;
  /**
   * One sentence.
   */
  title: string;
  /**
   * HTTP status.
   */
  status: number;
  /**
   * One for each fault.
   */
  faults: Fault[];
  /**
   * Only in stale: what is stored now.
   */
  current?: {
    [k: string]: unknown;
  };
}

/**
 * One fault.
 */
export interface Fault {
  /**
   * JSON pointer to the value at fault.
   */
  pointer: string;
  /**
   * What is wrong with it.
   */
  detail: string;
}
