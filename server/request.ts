import type { Request } from 'express';
import { AppError, invalidAt, notFound, versionMissing } from './errors';
import type { Page } from './page';
import type { SignedIn } from './services/sessions';

/** Fifteen digits stay below 2^53; no table will ever number more rows. */
const idPattern = /^[1-9]\d{0,14}$/;

const paramOf = (req: Request, name: string): string => {
  const value = req.params[name];
  return typeof value === 'string' ? value : '';
};

/** An id of the path. One that no row can have is answered like one that no row has. */
export function idOf(req: Request, noun: string, name = 'id'): number {
  const text = paramOf(req, name);
  if (!idPattern.test(text)) throw notFound(noun);
  return Number(text);
}

/** Names that rows are looked up by are ASCII; the database cannot compare others with them. */
const namePattern = /^[\x20-\x7e]{1,100}$/;

/** A name of the path that rows are looked up by. One that no row can have is answered like one that no row has. */
export function nameOf(req: Request, noun: string, name: string): string {
  const text = paramOf(req, name);
  if (!namePattern.test(text)) throw notFound(noun);
  return text;
}

/**
 * The version that a change starts from, of the If-Match header.
 *
 * @returns 0, which no row has, for a tag that was never given out
 * @throws {AppError} version-missing
 */
export function versionOf(req: Request): number {
  const tag = req.get('if-match');
  if (tag === undefined) throw versionMissing();
  const version = /^"?(\d{1,10})"?$/.exec(tag.trim())?.[1];
  return Number(version ?? 0);
}

/** The person whom the access token names. */
export function personOf(req: Request): SignedIn {
  if (!req.user) throw new AppError('unauthenticated', 'Sign in first.');
  return req.user as SignedIn;
}

/** A parameter of the query that is given at most once; empty counts as absent. */
export function queryOf(req: Request, name: string): string | undefined {
  const value = req.query[name];
  if (value === undefined || value === '') return undefined;
  if (typeof value === 'string') return value;
  throw invalidAt(`/${name}`, 'must be given once');
}

/** A name of the query that rows are looked up by. */
export function nameQueryOf(req: Request, name: string): string | undefined {
  const text = queryOf(req, name);
  if (text === undefined || namePattern.test(text)) return text;
  throw invalidAt(`/${name}`, 'must be a name of printable ASCII characters');
}

/** A whole number of the query, 0 or more. */
export function countOf(req: Request, name: string): number | undefined {
  const text = queryOf(req, name);
  if (text === undefined) return undefined;
  if (!/^\d{1,15}$/.test(text)) throw invalidAt(`/${name}`, 'must be a whole number');
  return Number(text);
}

const largestPage = 100;

/** Which part of a list is asked for: `?cursor=&limit=`. */
export function pageOf(req: Request): Page {
  const limit = countOf(req, 'limit') ?? largestPage;
  if (limit < 1 || limit > largestPage) throw invalidAt('/limit', `must be a whole number from 1 to ${largestPage}`);
  const cursor = queryOf(req, 'cursor');
  if (cursor === undefined) return { limit, after: undefined };
  const after = Buffer.from(cursor, 'base64url').toString('latin1');
  if (!idPattern.test(after)) throw invalidAt('/cursor', 'must be the cursor that the page before gave');
  return { limit, after: Number(after) };
}
