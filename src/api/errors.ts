export interface Fault {
  /** JSON pointer into what was sent; empty when the fault lies in no single place. */
  pointer: string;
  detail: string;
}

/** A refusal of the server (RFC 9457), or no answer at all: then `status` is 0. */
export class ApiError extends Error {
  override readonly name = 'ApiError';

  constructor(
    readonly status: number,
    readonly type: string,
    readonly title: string,
    readonly faults: readonly Fault[] = [],
    /** The whole problem: some carry more, as a refused save carries the newer version. */
    readonly problem: Readonly<Record<string, unknown>> = {},
    options?: ErrorOptions,
  ) {
    super(title, options);
  }

  /** What is wrong at this place of what was sent. */
  faultAt(pointer: string): string | undefined {
    return this.faults.find((fault) => fault.pointer === pointer)?.detail;
  }
}

/** Rebuilds the error from an answer that is not ok, whatever its body holds. */
export async function errorFrom(response: Response): Promise<ApiError> {
  const problem = await readProblem(response);
  const title = typeof problem.title === 'string' ? problem.title : `The server answered ${response.status}.`;
  const type = typeof problem.type === 'string' ? problem.type : 'about:blank';
  const faults = Array.isArray(problem.faults) ? (problem.faults as Fault[]) : [];
  return new ApiError(response.status, type, title, faults, problem);
}

/** Says what did not happen and what is kept, for a call that had no answer. */
export function noAnswer(cause: unknown, seconds: number): ApiError {
  const late = cause instanceof DOMException && cause.name === 'TimeoutError';
  const title = late ? `The server did not answer in ${seconds} s.` : 'The server cannot be reached.';
  return new ApiError(0, '/problems/no-answer', `${title} What you typed is kept on this machine.`, [], {}, { cause });
}

async function readProblem(response: Response): Promise<Record<string, unknown>> {
  try {
    const body: unknown = await response.json();
    return typeof body === 'object' && body !== null ? (body as Record<string, unknown>) : {};
  } catch {
    return {};
  }
}
