import { describe, expect, it } from 'vitest';
import { slotName, slotPattern } from '../../../../src/components/releases/slot-name';

describe('slotName', () => {
  it.each([
    ['Beacon, BPSK 9.6 k', 'beacon_bpsk_9_6_k'],
    ['17th transponder', 'th_transponder'],
    ['Ü 64', 'slot'],
    ['Transponder 17, QPSK 27.5 at high elevation', 'transponder_17_qpsk_27_5_at_hig'],
  ])('makes an identifier of “%s”', (plan, slot) => {
    expect(slotName(plan, [])).toBe(slot);
    expect(slot).toMatch(slotPattern);
  });

  it('numbers a name that is taken, within the length', () => {
    expect(slotName('Beacon', ['beacon', 'beacon_2'])).toBe('beacon_3');
    expect(slotName('a'.repeat(40), ['a'.repeat(31)])).toBe(`${'a'.repeat(29)}_2`);
  });
});
