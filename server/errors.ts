/** Every kind of refusal and its HTTP status: the closed set of problem types. */
export const statusOf = {
  malformed: 400,
  unauthenticated: 401,
  forbidden: 403,
  'not-found': 404,
  conflict: 409,
  stale: 412,
  'too-large': 413,
  'unsupported-media': 415,
  invalid: 422,
  'version-missing': 428,
  'too-many': 429,
  internal: 500,
} as const;

export type Kind = keyof typeof statusOf;

export interface Fault {
  /** JSON pointer to the value at fault; empty: the whole. */
  pointer: string;
  detail: string;
}

/** A refusal that the caller can act on. */
export class AppError extends Error {
  override readonly name = 'AppError';
  readonly faults: readonly Fault[];
  /** What is stored now, where somebody else was first. */
  readonly current: object | undefined;

  constructor(
    readonly kind: Kind,
    title: string,
    { faults = [], current, cause }: { faults?: readonly Fault[]; current?: object | undefined; cause?: unknown } = {},
  ) {
    super(title, { cause });
    this.faults = faults;
    this.current = current;
  }
}

export const malformed = (title: string, cause?: unknown) => new AppError('malformed', title, { cause });

export const unauthenticated = (title = 'Sign in first.') => new AppError('unauthenticated', title);

export const forbidden = (title = 'Your role does not include this.') => new AppError('forbidden', title);

export const notFound = (noun: string) => new AppError('not-found', `There is no such ${noun}.`);

export const conflict = (title: string, cause?: unknown) => new AppError('conflict', title, { cause });

export const stale = (noun: string, current?: object) =>
  new AppError('stale', `Somebody else has changed this ${noun} meanwhile.`, { current });

export const versionMissing = () =>
  new AppError('version-missing', 'The If-Match header must carry the version that the change starts from.');

export const unsupportedMedia = (expected: string) =>
  new AppError('unsupported-media', `The body must be sent as ${expected}.`);

export function invalid(faults: readonly Fault[], cause?: unknown): AppError {
  const title = faults.length === 1 ? 'One value cannot be accepted.' : `${faults.length} values cannot be accepted.`;
  return new AppError('invalid', title, { faults, cause });
}

export const invalidAt = (pointer: string, detail: string) => invalid([{ pointer, detail }]);
