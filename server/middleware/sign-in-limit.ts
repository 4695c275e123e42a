import type { RequestHandler } from 'express';
import { ipKeyGenerator, rateLimit } from 'express-rate-limit';
import { AppError } from '../errors';

const windowMs = 15 * 60_000;
/** Failed attempts from one address at one e-mail address in a window. */
const mostFailures = 10;

const emailOf = (body: unknown): string =>
  typeof body === 'object' && body !== null && 'email' in body && typeof body.email === 'string'
    ? body.email.toLowerCase()
    : '';

/** Slows down guessing of a password; sign-ins that succeed do not count. Stands behind the check of the body. */
export const signInLimit = (): RequestHandler =>
  rateLimit({
    windowMs,
    limit: mostFailures,
    skipSuccessfulRequests: true,
    standardHeaders: 'draft-8',
    legacyHeaders: false,
    keyGenerator: (req) => `${ipKeyGenerator(req.ip ?? '')} ${emailOf(req.body)}`,
    handler: (_req, _res, next) =>
      next(new AppError('too-many', 'Too many failed sign-ins. Wait a quarter of an hour and try again.')),
  });
