import { describe, expect, it } from 'vitest';
import { understoodText } from '../../../src/composables/use-plan-import';

describe('understoodText', () => {
  it('names each quantity by its number on the sheet and as it was read', () => {
    const text = understoodText([
      { pointer: '/signal/symbolRateBd', written: '1200 kBd', text: '1.2 MBd' },
      { pointer: '/somewhere', written: '3', text: '3' },
    ]);
    expect(text).toBe('Understood: 1.2 Symbol rate: 1.2 MBd; /somewhere: 3.');
  });
});
