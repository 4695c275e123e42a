import Ajv2020 from 'ajv/dist/2020';
import { describe, expect, it } from 'vitest';
import schema from '../../../../schemas/plan.schema.json';
import { examplePlan } from '../../../../src/components/plans/example-plan';

describe('examplePlan', () => {
  it('is a plan by the published schema', () => {
    const validate = new Ajv2020({ allErrors: true }).compile(schema);
    validate(examplePlan('corvid-c2'));
    expect(validate.errors).toBeNull();
  });
});
