import { Ajv2020, type ValidateFunction } from 'ajv/dist/2020.js';
import designRequest from '../schemas/design-request.schema.json';
import design from '../schemas/design.schema.json';
import draft from '../schemas/draft.schema.json';
import passwordChange from '../schemas/password-change.schema.json';
import passwordLink from '../schemas/password-link.schema.json';
import personChange from '../schemas/person-change.schema.json';
import personInvite from '../schemas/person-invite.schema.json';
import planCreate from '../schemas/plan-create.schema.json';
import planYaml from '../schemas/plan-yaml.schema.json';
import plan from '../schemas/plan.schema.json';
import problem from '../schemas/problem.schema.json';
import registerMap from '../schemas/register-map.schema.json';
import releaseCreate from '../schemas/release-create.schema.json';
import releaseEntry from '../schemas/release-entry.schema.json';
import releaseFreeze from '../schemas/release-freeze.schema.json';
import replayCreate from '../schemas/replay-create.schema.json';
import replayPoint from '../schemas/replay-point.schema.json';
import revisionCreate from '../schemas/revision-create.schema.json';
import setPassword from '../schemas/set-password.schema.json';
import signIn from '../schemas/sign-in.schema.json';
import target from '../schemas/target.schema.json';
import toleranceCheck from '../schemas/tolerance-check.schema.json';
import words from '../schemas/words.schema.json';

/** Every schema by the name of its file. */
export const schemas = {
  design,
  'design-request': designRequest,
  draft,
  'password-change': passwordChange,
  'password-link': passwordLink,
  'person-change': personChange,
  'person-invite': personInvite,
  plan,
  'plan-create': planCreate,
  'plan-yaml': planYaml,
  problem,
  'register-map': registerMap,
  'release-create': releaseCreate,
  'release-entry': releaseEntry,
  'release-freeze': releaseFreeze,
  'replay-create': replayCreate,
  'replay-point': replayPoint,
  'revision-create': revisionCreate,
  'set-password': setPassword,
  'sign-in': signIn,
  target,
  'tolerance-check': toleranceCheck,
  words,
} as const;

export type SchemaName = keyof typeof schemas;

// strictSchema would refuse the defaults of the overflow nodes: Ajv does not fill defaults below anyOf, completePlan does.
const ajv = new Ajv2020({ allErrors: true, useDefaults: true, strictSchema: false, allowUnionTypes: true });
ajv.addSchema(Object.values(schemas));

/** Checks a value against a schema and fills in its defaults, in place. */
export function validatorOf(name: SchemaName): ValidateFunction {
  const validate = ajv.getSchema(`${name}.schema.json`);
  if (!validate) throw new Error(`there is no schema ${name}`);
  return validate;
}

/**
 * A copy of a value with its defaults filled in, for values that did not come over the wire.
 *
 * @throws {Error} when it does not fit its schema
 */
export function withDefaults<T extends object>(name: SchemaName, value: T): T {
  const copy = structuredClone(value);
  const validate = validatorOf(name);
  if (!validate(copy)) throw new Error(`${name}: ${ajv.errorsText(validate.errors)}`);
  return copy;
}
