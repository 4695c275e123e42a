import { isUtf8 } from 'node:buffer';
import type { IncomingMessage } from 'node:http';
import express, { type RequestHandler } from 'express';
import { invalid, malformed, unsupportedMedia } from '../errors';
import { schemaFaults } from '../schema-faults';
import { validatorOf, type SchemaName } from '../schemas';
import { storageFault } from '../storable';

/** Largest body that is read, unpacked, in bytes. */
const largestBody = 1_000_000;

const requireMedia =
  (types: string[]): RequestHandler =>
  (req, _res, next) =>
    next(req.is(types) ? undefined : unsupportedMedia(types.join(' or ')));

/** Decoding would put U+FFFD in the place of what is no UTF-8, and store that. */
function verify(_req: IncomingMessage, _res: unknown, body: Buffer): void {
  if (!isUtf8(body)) throw malformed('The body is not UTF-8.');
}

const jsonBody = express.json({ limit: largestBody, verify });

/**
 * Reads a JSON body, checks it against a schema and fills in the defaults.
 *
 * @param within key of the body that faults point into, see schemaFaults
 */
export function validateBody(name: SchemaName, within?: string): RequestHandler[] {
  const validate = validatorOf(name);
  const check: RequestHandler = (req, _res, next) => {
    const fault = storageFault(req.body);
    if (fault) throw invalid([fault]);
    if (!validate(req.body)) throw invalid(schemaFaults(validate.errors ?? [], within));
    next();
  };
  return [requireMedia(['application/json']), jsonBody, check];
}

export const yamlTypes = ['application/yaml', 'text/yaml', 'application/x-yaml', 'text/x-yaml'];

const yamlText = express.text({ type: yamlTypes, limit: largestBody, verify });

/** Takes YAML as the body itself or as `{ yaml }`; either way the handler finds `{ yaml }`. */
export function yamlBody(): RequestHandler[] {
  const validate = validatorOf('plan-yaml');
  const check: RequestHandler = (req, _res, next) => {
    if (typeof req.body === 'string') req.body = { yaml: req.body };
    const body: unknown = req.body ?? { yaml: '' };
    const fault = storageFault(body);
    if (fault) throw invalid([fault]);
    if (!validate(body)) throw invalid(schemaFaults(validate.errors ?? []));
    req.body = body;
    next();
  };
  return [requireMedia(['application/json', ...yamlTypes]), jsonBody, yamlText, check];
}
