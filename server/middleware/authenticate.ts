import { createSecretKey } from 'node:crypto';
import type { Request, RequestHandler } from 'express';
import passportModule from 'passport';
import { ExtractJwt, Strategy, type StrategyOptionsWithoutRequest, type VerifiedCallback } from 'passport-jwt';
import { accessTokenAlgorithm, accessTokenAudience, type AccessClaims } from '../services/access-tokens';
import type { SessionsService, SignedIn } from '../services/sessions';

/**
 * Puts the person of a valid access token into the request. A request without one passes: whether it may go on is
 * for requireRole to say.
 */
export function authenticate(sessions: SessionsService, secret: string): RequestHandler {
  const passport = new passportModule.Passport();
  const options: StrategyOptionsWithoutRequest = {
    jwtFromRequest: ExtractJwt.fromAuthHeaderAsBearerToken(),
    // A string would be tried as a public key first, with every request.
    secretOrKey: createSecretKey(secret, 'utf8') as unknown as Buffer,
    algorithms: [accessTokenAlgorithm],
    audience: accessTokenAudience,
  };
  const identify = (claims: unknown, done: VerifiedCallback) => {
    sessions.identify(claims as AccessClaims).then((person) => done(null, person ?? false), done);
  };
  passport.use(new Strategy(options, identify));
  return (req, res, next) => {
    const answer = (error: unknown, person: SignedIn | false) => {
      if (person) (req as Request).user = person;
      next(error);
    };
    (passport.authenticate('jwt', { session: false }, answer) as RequestHandler)(req, res, next);
  };
}
