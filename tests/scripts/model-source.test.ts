import { describe, expect, it } from 'vitest';
import { modelSource } from '../../scripts/support/model-source.mjs';

const schemas = new Map<string, object>([
  ['loop.schema.json', { title: 'Loop', type: 'object', properties: {}, $defs: { gain: { title: 'Gain' } } }],
  [
    'plan.schema.json',
    {
      $id: 'plan.schema.json',
      title: 'Plan',
      type: 'object',
      additionalProperties: false,
      required: ['loop'],
      properties: {
        loop: { $ref: 'loop.schema.json', description: 'The loop.' },
        gain: { $ref: 'loop.schema.json#/$defs/gain' },
      },
    },
  ],
  ['broken.schema.json', { title: 'Broken', properties: { a: { $ref: 'absent.schema.json' } } }],
]);

describe('modelSource', () => {
  it('imports the types of other schemas instead of repeating them', async () => {
    expect(await modelSource('plan.schema.json', schemas)).toBe(
      `// Generated from schemas/plan.schema.json; do not edit.

import type { Gain } from './loop';
import type { Loop } from './loop';

export interface Plan {
  /**
   * The loop.
   */
  loop: Loop;
  gain?: Gain;
}
`,
    );
  });

  it('names a reference that leads nowhere', async () => {
    await expect(modelSource('broken.schema.json', schemas)).rejects.toThrow('absent.schema.json names no schema');
  });
});
