import type { Request, RequestHandler, Response } from 'express';
import type { Allowed } from '../roles';
import type { SchemaName } from '../schemas';

/** One route of the API: all that mounting, describing and testing it needs. */
export interface Route {
  method: 'get' | 'post' | 'put' | 'patch' | 'delete';
  /** Below /api/v1, as Express writes it. */
  path: string;
  allowed: Allowed;
  /** One line for the API description. */
  summary: string;
  /** Schema of the body; absent: the body is not read. */
  body?: SchemaName;
  /** Key of the body that faults point into. */
  faultsWithin?: string;
  /** Media types of a body that is text, for the API description. */
  textBody?: readonly string[];
  /** Handlers between the check of roles and the route's own, where validateBody is not enough. */
  before?: RequestHandler[];
  query?: readonly string[];
  /** Needs the If-Match header. */
  ifMatch?: boolean;
  /** Status of success; 200 when absent. */
  status?: 201 | 202 | 204;
  /** Media type of success; JSON when absent. */
  answers?: string;
  handle: (req: Request, res: Response) => Promise<void> | void;
}

/** The version of what is sent, for the If-Match of its next change. */
export const tagged = (res: Response, version: number): Response => res.set('ETag', `"${version}"`);

/** Parameters of a list that comes in pages. */
export const paging = ['cursor', 'limit'] as const;
