import type { ErrorRequestHandler } from 'express';
import { ParameterError } from '../../shared/parameter-error';
import { asDatabaseRefusal } from '../database-refusal';
import { AppError, invalidAt, malformed, statusOf } from '../errors';

interface HttpError {
  type?: string;
  status: number;
}

const isHttpError = (error: unknown): error is HttpError =>
  error instanceof Error && 'status' in error && typeof error.status === 'number';

/** What express, its body parsers and its router refuse by themselves: all of it is the caller's. */
function asHttpRefusal(error: unknown): AppError | undefined {
  if (!isHttpError(error) || error.status < 400 || error.status > 499) return undefined;
  if (error.type === 'entity.parse.failed') return malformed('The body is not JSON.', error);
  if (error.status === 413) return new AppError('too-large', 'The body is larger than 1 MB.', { cause: error });
  if (error.status === 415) {
    return new AppError('unsupported-media', 'The encoding of the body is not supported.', { cause: error });
  }
  return malformed('The request could not be read.', error);
}

const asParameterRefusal = (error: unknown): AppError | undefined =>
  error instanceof ParameterError ? invalidAt(error.parameter, error.message) : undefined;

const asRefusal = (error: unknown): AppError | undefined =>
  error instanceof AppError ? error : (asParameterRefusal(error) ?? asDatabaseRefusal(error) ?? asHttpRefusal(error));

const unexpected = new AppError('internal', 'Something went wrong on the server. It has been written down.');

/** Answers every error as problem details; what nobody foresaw is logged whole and shows nothing of itself. */
export const errorHandler: ErrorRequestHandler = (error: unknown, req, res, next) => {
  if (res.headersSent) return next(error);
  const refusal = asRefusal(error);
  if (!refusal) req.log.error(error);
  const { kind, message: title, faults, current } = refusal ?? unexpected;
  const status = statusOf[kind];
  res
    .status(status)
    .type('application/problem+json')
    .json({ type: `/problems/${kind}`, title, status, faults, current });
};
