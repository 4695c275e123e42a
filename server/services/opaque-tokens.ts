import { createHash, randomBytes } from 'node:crypto';

/** 256 random bits, safe in addresses and cookies. */
export const newToken = (): string => randomBytes(32).toString('base64url');

/** What is stored of a token. It is random, so a plain SHA-256 cannot be turned back. */
export const tokenHash = (token: string): string => createHash('sha256').update(token).digest('hex');
