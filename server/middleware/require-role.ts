import type { RequestHandler } from 'express';
import { forbidden, unauthenticated } from '../errors';
import { personOf } from '../request';
import type { Allowed } from '../roles';

/** Lets through whom a route allows; everybody else gets 401 when signed out and 403 when signed in. */
export const requireRole =
  (allowed: Allowed): RequestHandler =>
  (req, res, next) => {
    if (allowed === 'open') return next();
    if (!req.user) {
      res.set('WWW-Authenticate', 'Bearer');
      throw unauthenticated();
    }
    if (!allowed.includes(personOf(req).role)) throw forbidden();
    next();
  };
