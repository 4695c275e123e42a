import { Ajv2020 } from 'ajv/dist/2020';
import planSchema from '../../../schemas/plan.schema.json';
import { workOut } from '../../../shared/design';
import type { Design } from '../../../shared/model/design';
import type { Plan } from '../../../shared/model/plan';
import type { DraftPlan } from '../../../src/api/plans';
import { examplePlan } from '../../../src/components/plans/example-plan';

/** The published 27.5 MBd link: QPSK, ζ = 1/√2, BnT 0.01 acquiring and 0.004 tracking, delay 3. */
export const plan = (): DraftPlan => examplePlan('corvid-c2');

const fillDefaults = new Ajv2020({ useDefaults: true, strict: false }).compile(planSchema);

/** The design of a plan as the server would answer it, all but the digest. */
export function design(of: Plan = examplePlan('corvid-c2')): Design {
  const complete = structuredClone(of);
  fillDefaults(complete);
  return { ...workOut(complete), digest: '0'.repeat(64) };
}
