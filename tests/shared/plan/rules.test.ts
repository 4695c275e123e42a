import { describe, expect, it } from 'vitest';
import { defaultsAt, ruleAt } from '../../../shared/plan/rules';
import { planFields } from '../../../shared/plan/fields';

describe('ruleAt', () => {
  it('knows every numbered field of the sheet', () => {
    expect(planFields.filter(({ pointer }) => !ruleAt(pointer)).map(({ no }) => no)).toEqual([]);
  });

  // Ranges of the datapath contract: NCO 8 to 64 bits, delay 0 to 64 updates.
  it('gives range and default', () => {
    expect(ruleAt('/carrier/nco/widthBits')).toMatchObject({ minimum: 8, maximum: 64, default: 32 });
    expect(ruleAt('/carrier/delay')).toMatchObject({ minimum: 0, maximum: 64, default: 0 });
  });

  it('looks through the stages', () => {
    expect(ruleAt('/clock/stages/3/noiseBandwidth')).toMatchObject({ maximum: 0.5, exclusiveMinimum: 0 });
  });

  it('has nothing for a key that a plan does not have', () => {
    expect(ruleAt('/carrier/colour')).toBeUndefined();
  });
});

describe('defaultsAt', () => {
  it('fills nested objects', () => {
    expect(defaultsAt('/carrier')).toMatchObject({
      detector: 'sign',
      delay: 0,
      nco: { widthBits: 32, phaseBits: 12 },
      arithmetic: { errorBits: 12, rounding: 'nearest', overflow: 'saturate' },
    });
  });

  it('leaves out what has no default', () => {
    expect(defaultsAt('/signal')).not.toHaveProperty('symbolRateBd');
    expect(defaultsAt('/carrier/arithmetic')).not.toHaveProperty('integratorLimitHz');
  });
});
