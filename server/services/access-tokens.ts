import jwt from 'jsonwebtoken';

export const accessTokenAlgorithm = 'HS256';
export const accessTokenAudience = 'keepstep-api';

/** Life of an access token in seconds. */
export const accessTokenLife = 600;

export interface AccessClaims {
  /** Id of the person, as text. */
  sub: string;
  /** Id of the session. */
  sid: number;
}

export function accessToken(personId: number, sessionId: number, secret: string, at: Date): string {
  const issuedAt = Math.floor(at.getTime() / 1000);
  const claims = { sub: String(personId), sid: sessionId, iat: issuedAt, exp: issuedAt + accessTokenLife };
  return jwt.sign(claims, secret, { algorithm: accessTokenAlgorithm, audience: accessTokenAudience });
}
